// The moist night in words: the sentence, the answers, where each number comes from.

import type { MoistureState, TriangleState, UpstreamAir } from '../../desk/index.ts';
import type { Arrival, MoistureNumbers, Transport } from '../../moisture/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import { STALE_INTERVALS, type Answer } from './answers.ts';
import { compassWords, directionText, heightText, plain, signed, speedText } from './numbers.ts';
import type { Piece } from './story.ts';
import { durationWords, type TimeWords } from './time.ts';

/** Shown per hour and in g/kg: kg/kg a second times this. */
const GRAM_HOUR = 3.6e6;
/** Divergence is shown in this unit, 1/s. */
const DIVERGENCE_UNIT = 1e-5;
/** Standard errors by which a number stands clear of zero. */
const CLEAR = 2;
/** m above ground: how the streams run together is told of the air up to here. */
const LOW = 1000;
/** Air that passes further aside than this share of its way is told as passing by. */
const ASIDE = 0.5;

export const VAPOUR_UNIT = 'kg/m/s';

/** `466 ± 33`; the uncertainty of the humidity, which the number is proportional to. */
export function withShare(value: number, share: number, decimals = 0): string {
  if (!Number.isFinite(value)) return plain(value, decimals);
  return Number.isFinite(share)
    ? `${plain(value, decimals)} ± ${plain(value * share, decimals)}`
    : plain(value, decimals);
}

/** `toward the north, from 190°`. */
export function towardWords({ direction }: Transport): string {
  if (!Number.isFinite(direction)) return '';
  return `toward the ${compassWords((direction + 180) % 360)}, from ${directionText(direction)}`;
}

/** Whose humidity a number rests on, how old and how far. */
export function humidityWords(numbers: MoistureNumbers, nameOf: (id: string) => string): string {
  const { humidityFrom, humidityAgeS, humidityDistance, humidityUncertainty } = numbers;
  if (humidityFrom === '') return numbers.why;
  const sure = `± ${plain(100 * humidityUncertainty, 0)} %`;
  if (humidityAgeS === 0 && humidityDistance === 0) return `humidity of its own, just measured, ${sure}`;
  const age = humidityAgeS > 0 ? `${durationWords(1000 * humidityAgeS)} old` : 'of the same time';
  const far = Number.isNaN(humidityDistance)
    ? 'at an unknown distance'
    : humidityDistance < 1000
      ? 'same place'
      : `${plain(humidityDistance / 1000, 0)} km away`;
  return `humidity of ${nameOf(humidityFrom)}, ${age}, ${far}, ${sure}`;
}

export interface MoistContext {
  readonly state: MoistureState;
  readonly stepMs: number;
  readonly units: DisplayUnits;
  readonly times: TimeWords;
  readonly nameOf: (id: string) => string;
}

export function moistureStory(context: MoistContext): Piece[] {
  const { state, times, stepMs } = context;
  const numbers = state.numbers.at(-1);
  if (numbers === undefined) {
    return [{ text: `No profile of ${state.feed.station.name} in this night up to ${times.clock(state.atMs)}.` }];
  }
  const ageMs = state.atMs - state.timeMs.at(-1)!;
  const stale: Piece[] =
    ageMs > STALE_INTERVALS * stepMs
      ? [{ text: `The last profile is ${durationWords(ageMs)} old. `, weight: 'call' }]
      : [];
  return [...stale, ...transportPieces(context, numbers), ...arrivalPieces(context), ...convergencePieces(state)];
}

function transportPieces({ state, units, times, nameOf }: MoistContext, numbers: MoistureNumbers): Piece[] {
  const { below3Km } = numbers;
  if (!Number.isFinite(below3Km.size)) {
    return [
      {
        text: `What vapour the wind carries cannot be said: ${numbers.why}. Open a sounding, a radiometer or a mast with humidity. `,
      },
    ];
  }
  const { sinceMs, then, rate } = state.growth;
  const since =
    sinceMs < state.timeMs.at(-1)!
      ? `, ${changeWord(below3Km.size - then)} ${plain(then, 0)} at ${times.clock(sinceMs)}`
      : '';
  return [
    { text: 'The wind carries ' },
    { text: `${plain(below3Km.size, 0)} ${VAPOUR_UNIT}`, weight: 'strong' },
    {
      text: ` of vapour ${depthWords(below3Km.reaches, units)} toward the ${compassWords((below3Km.direction + 180) % 360)}${since}${rateWords(rate)} (${humidityWords(numbers, nameOf)}). `,
    },
  ];
}

/** Data that end this near to 3 km reach it, m. */
const NEARLY = 250;

/** `below 3 km`, or how far the data reach. */
function depthWords(reaches: number, units: DisplayUnits): string {
  if (reaches >= 3000 - NEARLY) return 'below 3 km';
  return `below ${heightText(reaches, units)} ${units.height}, where the data end,`;
}

function changeWord(change: number): string {
  return change > 0 ? 'up from' : 'down from';
}

function rateWords({ perHour, uncertainty }: MoistureState['growth']['rate']): string {
  if (!Number.isFinite(perHour)) return '';
  if (!(Math.abs(perHour) > uncertainty && Math.abs(perHour) >= 1)) return ', holding now';
  return ` and ${perHour > 0 ? 'growing' : 'easing'} by ${plain(Math.abs(perHour), 0)} an hour`;
}

/** The upstream station whose air passes nearest, those with a surge on its way first. */
function leadingArrival({ arrivals, atMs }: MoistureState): UpstreamAir | undefined {
  const passes = (air: UpstreamAir): boolean => !isAside(air);
  const pending = ({ surge }: UpstreamAir): boolean =>
    surge?.arrival.status === 'on-its-way' && surge.arrival.latestMs > atMs;
  const aside = ({ now, surge }: UpstreamAir): number => Math.abs((surge?.arrival ?? now).missBy);
  return arrivals.upstream
    .filter(passes)
    .sort((a, b) => Number(pending(b)) - Number(pending(a)) || aside(a) - aside(b))[0];
}

/** Whether the air of an upstream station goes by, on one side or because the wind blows elsewhere. */
function isAside({ now, surge }: UpstreamAir): boolean {
  return goesBy(surge?.arrival ?? now);
}

/** Whether air comes no nearer than half of its way. */
export function goesBy(arrival: Arrival): boolean {
  return arrival.status !== 'on-its-way' || Math.abs(arrival.missBy) > ASIDE * arrival.distance;
}

function arrivalPieces({ state, times }: MoistContext): Piece[] {
  const air = leadingArrival(state);
  if (air === undefined) {
    const { why, upstream } = state.arrivals;
    if (upstream.length === 0) return [];
    const first = upstream[0]!;
    return [{ text: `Nothing is on its way from ${first.station.name}: ${why === '' ? asideWords(first) : why}. ` }];
  }
  const { surge, now, station } = air;
  if (surge === null) {
    return [
      { text: `Air over ${station.name} now gets here at ${times.clock(now.arrivesMs)}, ${boundWords(now, times)}. ` },
    ];
  }
  const { arrival, came } = surge;
  const passed = `Moister air that passed ${station.name} at ${times.clock(surge.surge.timeMs)}`;
  if (came !== null) {
    return [
      { text: `${passed} was to come at ${times.clock(arrival.arrivesMs)} and came at ${times.clock(came.timeMs)}. ` },
    ];
  }
  if (arrival.arrivesMs > state.atMs) {
    return [
      { text: `${passed} gets here at ` },
      { text: times.clock(arrival.arrivesMs), weight: 'strong' },
      { text: `, in ${durationWords(arrival.arrivesMs - state.atMs)} (${boundWords(arrival, times)}). ` },
    ];
  }
  const due = `${passed} was due at ${times.clock(arrival.arrivesMs)} (${boundWords(arrival, times)})`;
  return [{ text: `${due}; whether it has come is not seen yet. ` }];
}

function asideWords({ now, surge }: UpstreamAir): string {
  const { status, why, missBy } = surge?.arrival ?? now;
  return status === 'on-its-way' ? `it ${missWords(missBy)}` : why;
}

/** `passes 33 km to the left, seen along its way`. */
export function missWords(missBy: number): string {
  if (!Number.isFinite(missBy)) return '';
  return `passes ${plain(Math.abs(missBy) / 1000, 0)} km to the ${missBy < 0 ? 'left' : 'right'}, seen along its way`;
}

export function boundWords(
  { earliestMs, latestMs }: { earliestMs: number; latestMs: number },
  times: TimeWords,
): string {
  const latest = Number.isFinite(latestMs) ? `and ${times.clock(latestMs)}` : 'and open';
  return `between ${times.clock(earliestMs)} ${latest}`;
}

/** What the streams do below a kilometre: mean over the layers, each error taken as that of a layer. */
interface LowField {
  readonly divergence: number;
  readonly divergenceUncertainty: number;
  readonly moisture: number;
  readonly moistureUncertainty: number;
  /** m/s at the top of the highest of the layers. */
  readonly lift: number;
  readonly liftUncertainty: number;
  readonly top: number;
}

/** Null where a layer up to a kilometre could not be had. */
function lowField({ layers }: TriangleState): LowField | null {
  const low = layers.filter(({ top }) => top <= LOW);
  if (low.length === 0 || low.some(({ field }) => field.status !== 'ok')) return null;
  const depth = low.reduce((sum, { top, bottom }) => sum + top - bottom, 0);
  const mean = (of: (layer: (typeof low)[number]) => number): number =>
    low.reduce((sum, layer) => sum + of(layer) * (layer.top - layer.bottom), 0) / depth;
  const top = low.at(-1)!;
  return {
    divergence: mean(({ field }) => field.divergence),
    divergenceUncertainty: mean(({ field }) => field.divergenceUncertainty),
    moisture: mean(({ field }) => field.moistureFluxDivergence),
    moistureUncertainty: mean(({ field }) => field.moistureFluxDivergenceUncertainty),
    lift: top.verticalMotion,
    liftUncertainty: top.verticalMotionUncertainty,
    top: top.top,
  };
}

export function gatherWord(value: number, uncertainty: number): string {
  if (!Number.isFinite(value)) return 'moisture flux divergence not known';
  if (!(Math.abs(value) > CLEAR * uncertainty)) return 'neither gathers nor spreads clearly';
  return value < 0 ? 'gathers' : 'spreads';
}

function convergencePieces({ triangles }: MoistureState): Piece[] {
  const field = triangles[0] === undefined ? null : lowField(triangles[0]);
  if (field === null) return [];
  const { moisture, moistureUncertainty } = field;
  const word = gatherWord(moisture, moistureUncertainty);
  if (word !== 'gathers' && word !== 'spreads')
    return [{ text: 'Between the stations moisture neither gathers nor spreads clearly below 1 km.' }];
  return [
    { text: `Between the stations moisture ${word} below 1 km, ` },
    { text: `${plain(Math.abs(moisture) * GRAM_HOUR, 1)} g/kg an hour`, weight: 'strong' },
    { text: '.' },
  ];
}

export function moistureAnswers(context: MoistContext): Answer[] {
  return [transportAnswer(context), growthAnswer(context), arrivalAnswer(context), convergenceAnswer(context)];
}

function ageOf({ state, stepMs }: MoistContext): { age: string; stale: boolean } {
  const ageMs = state.atMs - (state.timeMs.at(-1) ?? NaN);
  return {
    age: Number.isFinite(ageMs) ? `${durationWords(ageMs)} old` : 'no data',
    stale: !(ageMs <= STALE_INTERVALS * stepMs),
  };
}

function transportAnswer(context: MoistContext): Answer {
  const title = 'Transport below 3 km';
  const numbers = context.state.numbers.at(-1);
  const { age, stale } = ageOf(context);
  if (numbers === undefined || !Number.isFinite(numbers.below3Km.size)) {
    return {
      title,
      age,
      figures: [],
      none: 'Not assessable',
      lines: [{ text: numbers?.why ?? 'no profile in this night yet' }],
      stale,
    };
  }
  const { below3Km, humidityUncertainty, inJet } = numbers;
  const jet = Number.isFinite(inJet.size)
    ? `${withShare(inJet.size, humidityUncertainty)} of it in the jet’s layer`
    : 'no jet whose layer could be told apart';
  return {
    title,
    age,
    figures: [
      { value: plain(below3Km.size, 0), unit: `± ${plain(below3Km.size * humidityUncertainty, 0)} ${VAPOUR_UNIT}` },
    ],
    none: '',
    lines: [
      {
        text: `${depthWords(below3Km.reaches, context.units)} ${towardWords(below3Km)}; ${jet}`.replace(
          /^below 3 km /,
          '',
        ),
      },
      { text: `∫ ρ q V dz; ${humidityWords(numbers, context.nameOf)}` },
    ],
    stale,
  };
}

function growthAnswer(context: MoistContext): Answer {
  const title = 'Its growth';
  const { age, stale } = ageOf(context);
  const { now, then, sinceMs, rate } = context.state.growth;
  if (!Number.isFinite(now)) {
    return {
      title,
      age,
      figures: [],
      none: 'Not assessable',
      lines: [{ text: 'the newest profile has no transport' }],
      stale,
    };
  }
  const since = `${signed(now - then, 0)} ${VAPOUR_UNIT} since ${context.times.clock(sinceMs)}`;
  if (!Number.isFinite(rate.perHour)) {
    return {
      title,
      age,
      figures: [{ value: signed(now - then, 0), unit: `since ${context.times.clock(sinceMs)}` }],
      none: '',
      lines: [{ text: 'fewer than three profiles share one source of humidity: no rate yet' }],
      stale,
    };
  }
  return {
    title,
    age,
    figures: [{ value: signed(rate.perHour, 0), unit: `± ${plain(rate.uncertainty, 0)} an hour` }],
    none: '',
    lines: [
      { text: since },
      { text: 'median slope of the last 1 h 30 min (Theil 1950, Sen 1968), within one source of humidity' },
    ],
    stale,
  };
}

function arrivalAnswer({ state, times, units }: MoistContext): Answer {
  const title = 'Moist air gets here';
  const air = leadingArrival(state);
  const level = (each: UpstreamAir): string =>
    `wind at ${heightText(each.level, units)} ${units.height}, where the flux is greatest`;
  if (air === undefined) {
    const [first] = state.arrivals.upstream;
    const why = first === undefined ? state.arrivals.why : `${first.station.name}: ${asideWords(first)}`;
    return { title, age: '', figures: [], none: 'Nothing on its way', lines: [{ text: why }], stale: false };
  }
  const arrival = air.surge?.arrival ?? air.now;
  const left = arrival.arrivesMs - state.atMs;
  const came = air.surge?.came ?? null;
  const of =
    air.surge === null
      ? `air over ${air.station.name} now`
      : `surge of ${plain(1000 * air.surge.surge.rise, 1)} g/kg seen over ${air.station.name} at ${times.clock(air.surge.surge.timeMs)}`;
  const age = `wind ${durationWords(state.atMs - air.levelMs)} old`;
  const at = `at ${times.clock(arrival.arrivesMs)}, ${boundWords(arrival, times)}`;
  return {
    title,
    age,
    figures:
      came !== null
        ? [{ value: times.clock(came.timeMs), unit: 'it came' }]
        : left > 0
          ? [{ value: durationWords(left), unit: 'from now' }]
          : [{ value: durationWords(left), unit: 'overdue' }],
    none: '',
    lines: [
      { text: `${at}; ${of}` },
      {
        text: `${plain(arrival.distance / 1000, 0)} km at ${speedText(arrival.speed, units)} ${units.speed}, ${level(air)}`,
      },
    ],
    stale: false,
  };
}

function convergenceAnswer(context: MoistContext): Answer {
  const title = 'Convergence below 1 km';
  const { state } = context;
  const [triangle] = state.triangles;
  const nothing = (text: string): Answer => ({
    title,
    age: '',
    figures: [],
    none: 'Not assessable',
    lines: [{ text }],
    stale: false,
  });
  if (triangle === undefined)
    return nothing('three or more stations are needed; name them as neighbours in the site file');
  const age = Number.isFinite(triangle.timeMs) ? `${durationWords(state.atMs - triangle.timeMs)} old` : '';
  if (triangle.why !== '') return { ...nothing(triangle.why), age };
  const field = lowField(triangle);
  if (field === null)
    return { ...nothing(triangle.layers.find(({ field: { why } }) => why !== '')?.field.why ?? 'no layer'), age };
  const divergence = `divergence ${plain(field.divergence / DIVERGENCE_UNIT, 1)} ± ${plain(field.divergenceUncertainty / DIVERGENCE_UNIT, 1)} · 10⁻⁵/s`;
  const lift = `${field.lift < 0 ? 'sinking' : 'lift'} ${plain(Math.abs(field.lift) * 100, 1)} ± ${plain(field.liftUncertainty * 100, 1)} cm/s at ${heightText(field.top, context.units)} ${context.units.height}`;
  return {
    title,
    age,
    figures: Number.isFinite(field.moisture)
      ? [
          {
            value: plain(Math.abs(field.moisture) * GRAM_HOUR, 1),
            unit: `± ${plain(field.moistureUncertainty * GRAM_HOUR, 1)} g/kg an hour`,
          },
        ]
      : [{ value: plain(field.divergence / DIVERGENCE_UNIT, 1), unit: '· 10⁻⁵/s' }],
    none: '',
    lines: [
      { text: `${gatherWord(field.moisture, field.moistureUncertainty)}; ${divergence}` },
      {
        text: `${lift}; ${triangle.members.length === 3 ? 'Bellamy 1949' : 'linear fit'} through ${triangle.members.length} stations`,
      },
    ],
    stale: state.atMs - triangle.timeMs > STALE_INTERVALS * context.stepMs,
  };
}
