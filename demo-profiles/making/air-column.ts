// The wind of an invented night: one column of air in which each level turns about the wind that pressure alone would
// give, and friction holds back what lies within reach of the ground. After Blackadar (1957, Bull. Amer. Meteor. Soc. 38)
// and van de Wiel et al. (2010, J. Atmos. Sci. 67): by day a mixed layer, slowed and turned toward low pressure; after
// sunset it comes loose and swings at the inertial rate; below, a shallow layer stays bound by friction.

import { EARTH_ROTATION, eastward, northward } from '../../src/air/index.ts';

/** Eastward and northward, m/s. */
export interface Wind {
  readonly u: number;
  readonly v: number;
}

/** Wind of a speed, m/s, from a direction, degrees. */
export function windFrom(speed: number, direction: number): Wind {
  return { u: eastward(speed, direction), v: northward(speed, direction) };
}

export interface Weather {
  readonly latitude: number;
  /** Wind that the pressure gradient alone would give at a height (m above ground) and time (UTC, ms). */
  pressureWind(heightAgl: number, timeMs: number): Wind;
  /** Depth of the layer mixed by day's heating, m; 0 by night. */
  mixedDepth(timeMs: number): number;
  /** Scale of the night's friction layer, m. */
  frictionDepth: number;
}

const COLUMN_STEP_M = 20;
const LEVELS = 201;
const TOP = COLUMN_STEP_M * (LEVELS - 1);
const STEP_S = 60;
/** Mixed layer: share of the pressure wind that friction leaves, and turn toward low pressure, degrees. */
const MIXED_SHARE = 0.6;
const MIXED_TURN = 22;
/** Roughness length of open farmland, m. */
const ROUGHNESS = 0.05;
/** How fast day's eddies bring a level to the mixed wind, and night's friction binds the lowest air, s. */
const MIXING_S = 1500;
const BINDING_S = 1200;

/** The wind of the column as it stands at the asked times (ascending, UTC ms); above its top the pressure wind. */
export function* columnWinds(weather: Weather, timesMs: readonly number[]): Generator<(heightAgl: number) => Wind> {
  const coriolis = 2 * EARTH_ROTATION * Math.sin((weather.latitude * Math.PI) / 180);
  // Begun half a day early, so that no trace of the beginning is left.
  let nowMs = timesMs[0]! - 12 * 3_600_000;
  const column = Array.from({ length: LEVELS }, (_, k) => weather.pressureWind(k * COLUMN_STEP_M, nowMs));
  for (const timeMs of timesMs) {
    for (; nowMs < timeMs; nowMs += STEP_S * 1000) step(column, weather, coriolis, nowMs);
    const now = column.map((wind) => ({ ...wind }));
    yield (heightAgl) => (heightAgl < TOP ? windAt(now, heightAgl) : weather.pressureWind(heightAgl, timeMs));
  }
}

function step(column: Wind[], weather: Weather, coriolis: number, timeMs: number): void {
  const depth = weather.mixedDepth(timeMs);
  const mixed = mixedWind(weather, depth, coriolis, timeMs);
  for (let k = 0; k < column.length; k++) {
    const height = k * COLUMN_STEP_M;
    const pressure = weather.pressureWind(height, timeMs);
    // Turning about the pressure wind is exact, so that speed is neither made nor lost by the step.
    const cos = Math.cos(-coriolis * STEP_S);
    const sin = Math.sin(-coriolis * STEP_S);
    const du = column[k]!.u - pressure.u;
    const dv = column[k]!.v - pressure.v;
    let u = pressure.u + du * cos - dv * sin;
    let v = pressure.v + du * sin + dv * cos;
    for (const { toward, perSecond } of [
      byDay(mixed, height, depth),
      byNight(pressure, height, depth, weather.frictionDepth, coriolis),
    ]) {
      const kept = Math.exp(-STEP_S * perSecond);
      u = toward.u + (u - toward.u) * kept;
      v = toward.v + (v - toward.v) * kept;
    }
    column[k] = { u, v };
  }
}

/** The wind of the whole mixed layer: its mean pressure wind, slowed and turned toward low pressure. */
function mixedWind(weather: Weather, depth: number, coriolis: number, timeMs: number): Wind {
  let u = 0;
  let v = 0;
  const steps = 10;
  for (let k = 0; k < steps; k++) {
    const wind = weather.pressureWind(((k + 0.5) * depth) / steps, timeMs);
    u += wind.u / steps;
    v += wind.v / steps;
  }
  const turn = (Math.sign(coriolis) * MIXED_TURN * Math.PI) / 180;
  return {
    u: MIXED_SHARE * (u * Math.cos(turn) - v * Math.sin(turn)),
    v: MIXED_SHARE * (u * Math.sin(turn) + v * Math.cos(turn)),
  };
}

interface Friction {
  readonly toward: Wind;
  readonly perSecond: number;
}

/** Depth of the zone in which day's mixing ends, m. */
const LID_ZONE = 1200;

function byDay(mixed: Wind, height: number, depth: number): Friction {
  const share = Math.min(1, Math.log(Math.max(height, 1) / ROUGHNESS) / Math.log(200 / ROUGHNESS));
  const reached = depth === 0 ? 0 : Math.min(1, Math.max(0, (depth - height) / LID_ZONE));
  return { toward: { u: mixed.u * share, v: mixed.v * share }, perSecond: (reached * reached) / MIXING_S };
}

/** After Ekman, with eddies that grow with height: toward the pressure wind with height, turned below it. */
function byNight(
  pressure: Wind,
  height: number,
  mixedDepth: number,
  frictionDepth: number,
  coriolis: number,
): Friction {
  const depth = Math.pow(height / frictionDepth, 0.7);
  const damp = Math.exp(-depth);
  const real = 1 - damp * Math.cos(depth);
  const imaginary = Math.sign(coriolis) * damp * Math.sin(depth);
  return {
    toward: { u: real * pressure.u - imaginary * pressure.v, v: imaginary * pressure.u + real * pressure.v },
    perSecond: mixedDepth > 0 ? 0 : Math.exp((-1.7 * height) / frictionDepth) / BINDING_S,
  };
}

/** The wind of a column between its steps. */
function windAt(column: readonly Wind[], heightAgl: number): Wind {
  const position = heightAgl / COLUMN_STEP_M;
  const below = Math.floor(position);
  const share = position - below;
  const mix = (a: number, b: number): number => a + share * (b - a);
  return { u: mix(column[below]!.u, column[below + 1]!.u), v: mix(column[below]!.v, column[below + 1]!.v) };
}
