// Warm or cold air on its way, as the wind's turn with height above the friction of the ground implies.

import { advectionBetweenHeights, directionOf, speedOf, veerBetween, ZERO_CELSIUS } from '../air/index.ts';
import { gatherWind, REJECTING_AIR, windColumn, type Profile } from '../profile/index.ts';
import { windAtHeights } from './wind-at.ts';

export interface ThermalTurn {
  readonly status: 'told' | 'not-assessable';
  /** Reason in words; empty when told. */
  readonly why: string;
  /** m above ground: the layer looked at. */
  readonly bottom: number;
  readonly top: number;
  /** Turn of the wind from bottom to top, degrees, clockwise positive. */
  readonly veer: number;
  /** Temperature advection of the layer, K an hour, warming positive. */
  readonly kelvinPerHour: number;
  readonly sense: 'warm' | 'cold' | 'neither' | null;
  /** A sentence, with the caution that belongs to it; empty when not assessable. */
  readonly words: string;
}

/** Friction turns the wind below this, m; the layer above the core is taken where that is higher. */
const ABOVE_FRICTION = 800;
/** m: the layer is so deep at least and at most. */
const LEAST_DEPTH = 500;
const MOST_DEPTH = 1500;
/** Nearer to the equator than this, degrees, the wind does not follow the pressure field. Our own choice. */
const LEAST_LATITUDE = 10;
/** K an hour; less is neither. Our own choice. */
const LEAST_ADVECTION = 0.1;
/** Taken where no temperature is known, K: the advection goes with it in proportion, 10 K are 4 %. */
const USUAL_TEMPERATURE = ZERO_CELSIUS + 5;
const CAUTION = 'Friction and the jet itself also turn the wind.';

/**
 * What the turn of the wind above the friction layer says of temperature.
 * @param above m above ground: top of the jet's core, or 0
 * @param latitude degrees
 */
export function thermalTurn(profile: Profile, above: number, latitude: number): ThermalTurn {
  gatherWind(profile, wind);
  const bottom = Math.max(ABOVE_FRICTION, above);
  const highest = wind.count > 0 ? wind.heightAgl[wind.count - 1]! : NaN;
  const top = Math.min(highest, bottom + MOST_DEPTH);
  const untold = (why: string): ThermalTurn => ({
    status: 'not-assessable',
    why,
    bottom,
    top,
    veer: NaN,
    kelvinPerHour: NaN,
    sense: null,
    words: '',
  });
  if (Number.isNaN(latitude)) return untold('The latitude of the station is not known.');
  if (Math.abs(latitude) < LEAST_LATITUDE) {
    return untold('So near the equator the turn of the wind says nothing of temperature.');
  }
  if (!(top - bottom >= LEAST_DEPTH)) {
    return untold(
      `Winds end at ${Math.round(highest)} m; ${LEAST_DEPTH} m above the jet and the friction layer are needed.`,
    );
  }
  const lower = meanWind(profile, bottom, bottom + (top - bottom) / 3);
  const upper = meanWind(profile, top - (top - bottom) / 3, top);
  if (Number.isNaN(lower.speed + upper.speed)) {
    return untold(`Too few winds from ${Math.round(bottom)} to ${Math.round(top)} m.`);
  }
  const meanTemperature = meanTemperatureOf(profile, bottom, top);
  const kelvinPerHour = 3600 * advectionBetweenHeights(lower, upper, { latitude, meanTemperature });
  const veer = veerBetween(lower.direction, upper.direction);
  const sense = Math.abs(kelvinPerHour) < LEAST_ADVECTION ? 'neither' : kelvinPerHour > 0 ? 'warm' : 'cold';
  const degrees = Math.round(Math.abs(veer));
  const turn = `The wind ${veer >= 0 ? 'veers' : 'backs'} by ${degrees} ${degrees === 1 ? 'degree' : 'degrees'}`;
  const where = `from ${Math.round(lower.height)} to ${Math.round(upper.height)} m`;
  const meaning =
    sense === 'neither'
      ? 'which means neither warmer nor colder air'
      : `which in this hemisphere means ${sense === 'warm' ? 'warmer' : 'colder'} air on its way, about ${Math.abs(kelvinPerHour).toFixed(1)} K an hour`;
  return {
    status: 'told',
    why: '',
    bottom,
    top,
    veer,
    kelvinPerHour,
    sense,
    words: `${turn} ${where}, ${meaning}. ${CAUTION}`,
  };
}

const wind = windColumn();
const SAMPLES = 5;
const LEAST_SAMPLES = 3;

/** Vector mean of the wind over a stretch, at its middle height. */
function meanWind(profile: Profile, from: number, to: number): { height: number; speed: number; direction: number } {
  const heights = Array.from({ length: SAMPLES }, (_, k) => from + ((to - from) * k) / (SAMPLES - 1));
  const known = windAtHeights(profile, heights).filter(({ u, v }) => Number.isFinite(u + v));
  if (known.length < LEAST_SAMPLES) return { height: NaN, speed: NaN, direction: NaN };
  const u = known.reduce((sum, one) => sum + one.u, 0) / known.length;
  const v = known.reduce((sum, one) => sum + one.v, 0) / known.length;
  return { height: (from + to) / 2, speed: speedOf(u, v), direction: directionOf(u, v) };
}

/** Mean of the temperatures measured in the layer, K. */
function meanTemperatureOf({ temperature, heightAgl, mark }: Profile, bottom: number, top: number): number {
  const known = [...(temperature ?? [])].filter(
    (value, k) => value > 0 && heightAgl[k]! >= bottom && heightAgl[k]! <= top && (mark[k]! & REJECTING_AIR) === 0,
  );
  return known.length > 0 ? known.reduce((sum, value) => sum + value, 0) / known.length : USUAL_TEMPERATURE;
}
