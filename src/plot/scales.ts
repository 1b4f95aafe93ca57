// Colour scales: a value's place in its range becomes a colour whose lightness carries the value. They are laid in OKLCH
// so that equal steps look equal, and they lose nothing that matters to colour-vision deficiency or a grey print.

import { bytesOf, oklabOf, oklchOf, type Bytes, type Oklab, type Oklch } from './colour.ts';
import type { ThemeName } from './theme.ts';

/**
 * `speed`, `moisture`, `warmth`: rise from weak to strong. `share`: the same for how often, in one hue. `signed`: two hues about a neutral middle. `compass`: once
 * round the compass without a seam.
 */
export type ScaleName = 'speed' | 'moisture' | 'warmth' | 'share' | 'signed' | 'compass';
export type ScaleKind = 'rising' | 'two-sided' | 'cyclic';

export const SCALE_STEPS = 256;

export interface ColourScale {
  readonly name: ScaleName;
  readonly kind: ScaleKind;
  /** SCALE_STEPS colours of four bytes: red, green, blue, 255. */
  readonly rgba: Uint8ClampedArray;
}

/** Lowest and highest value a scale shows, SI; what lies beyond takes the end's colour. */
export interface ValueRange {
  readonly low: number;
  readonly high: number;
}

// Rising scales: lightness runs evenly from first to last stop; the stops between only say which hue belongs to which
// lightness. They begin clear of the ground, so that a calm is never taken for a gap.
const SPEED_DARK: readonly Oklch[] = [
  [0.25, 0.06, 290],
  [0.33, 0.085, 275],
  [0.45, 0.09, 243],
  [0.6, 0.095, 200],
  [0.78, 0.105, 145],
  [0.95, 0.1, 100],
];
const SPEED_LIGHT: readonly Oklch[] = [
  [0.92, 0.04, 110],
  [0.8, 0.085, 155],
  [0.66, 0.095, 200],
  [0.5, 0.1, 243],
  [0.36, 0.11, 275],
  [0.22, 0.085, 295],
];
const MOISTURE_DARK: readonly Oklch[] = [
  [0.25, 0.05, 60],
  [0.42, 0.05, 100],
  [0.6, 0.09, 165],
  [0.78, 0.1, 190],
  [0.95, 0.045, 215],
];
const MOISTURE_LIGHT: readonly Oklch[] = [
  [0.92, 0.03, 90],
  [0.76, 0.07, 150],
  [0.58, 0.09, 195],
  [0.4, 0.1, 245],
  [0.22, 0.09, 275],
];
const WARMTH_DARK: readonly Oklch[] = [
  [0.25, 0.06, 285],
  [0.42, 0.11, 325],
  [0.6, 0.14, 15],
  [0.78, 0.115, 50],
  [0.95, 0.06, 85],
];
const WARMTH_LIGHT: readonly Oklch[] = [
  [0.92, 0.035, 250],
  [0.76, 0.09, 290],
  [0.58, 0.14, 340],
  [0.4, 0.13, 15],
  [0.22, 0.07, 35],
];
const SHARE_DARK: readonly Oklch[] = [
  [0.25, 0.03, 255],
  [0.95, 0.03, 220],
];
const SHARE_LIGHT: readonly Oklch[] = [
  [0.92, 0.025, 220],
  [0.22, 0.06, 255],
];
// One hue, lightness only, for the deep-red theme: there a signed value rises from most negative to most positive.
const RED: readonly Oklch[] = [
  [0.2, 0.08, 27],
  [0.45, 0.17, 27],
  [0.68, 0.2, 27],
];

interface TwoSided {
  readonly middle: Oklch;
  readonly chroma: number;
  /** Lightness at either end. */
  readonly end: number;
  /** Hue below and above the middle: one bluish, one reddish, which no common deficiency confuses. */
  readonly hues: readonly [number, number];
}
const SIGNED_DARK: TwoSided = { middle: [0.3, 0.012, 270], chroma: 0.115, end: 0.9, hues: [238, 38] };
const SIGNED_LIGHT: TwoSided = { middle: [0.93, 0.008, 90], chroma: 0.125, end: 0.33, hues: [250, 32] };

/**
 * The compass is an ellipse that stands upright in OKLab: lightness tells north from south, and the axis from orange to
 * blue, which every common deficiency keeps, tells west from east.
 */
interface Compass {
  readonly middle: number;
  readonly lightness: number;
  readonly chroma: number;
  readonly hueEast: number;
}
const COMPASS: Compass = { middle: 0.6, lightness: 0.27, chroma: 0.115, hueEast: 62 };

const KINDS: Readonly<Record<ScaleName, ScaleKind>> = {
  speed: 'rising',
  moisture: 'rising',
  warmth: 'rising',
  share: 'rising',
  signed: 'two-sided',
  compass: 'cyclic',
};

const RISING: Readonly<
  Record<'speed' | 'moisture' | 'warmth' | 'share', Readonly<Record<ThemeName, readonly Oklch[]>>>
> = {
  speed: { dark: SPEED_DARK, light: SPEED_LIGHT, red: RED },
  moisture: { dark: MOISTURE_DARK, light: MOISTURE_LIGHT, red: RED },
  warmth: { dark: WARMTH_DARK, light: WARMTH_LIGHT, red: RED },
  share: { dark: SHARE_DARK, light: SHARE_LIGHT, red: RED },
};

const made = new Map<string, ColourScale>();

/** The scale of a name for a theme; made once. */
export function colourScale(name: ScaleName, theme: ThemeName): ColourScale {
  const key = `${name} ${theme}`;
  let scale = made.get(key);
  if (scale === undefined) {
    scale = { name, kind: KINDS[name], rgba: tableOf(coloursOf(name, theme)) };
    made.set(key, scale);
  }
  return scale;
}

/** Place of a value in a scale's table, 0 to SCALE_STEPS - 1; -1 for NaN. Cyclic scales go round. */
export function scaleIndex(scale: ColourScale, range: ValueRange, value: number): number {
  if (!(Math.abs(value) < Infinity)) return Number.isNaN(value) ? -1 : value > 0 ? SCALE_STEPS - 1 : 0;
  const position = ((value - range.low) / (range.high - range.low)) * SCALE_STEPS;
  if (scale.kind === 'cyclic') return ((Math.floor(position) % SCALE_STEPS) + SCALE_STEPS) % SCALE_STEPS;
  return Math.min(SCALE_STEPS - 1, Math.max(0, Math.floor(position)));
}

/** Colour of a value, or null for NaN. */
export function scaleColour(scale: ColourScale, range: ValueRange, value: number): Bytes | null {
  const index = scaleIndex(scale, range, value);
  return index < 0 ? null : [scale.rgba[4 * index]!, scale.rgba[4 * index + 1]!, scale.rgba[4 * index + 2]!];
}

function coloursOf(name: ScaleName, theme: ThemeName): (place: number) => Oklch {
  if (name === 'signed') {
    if (theme === 'red') return risingColours(RED);
    return twoSidedColours(theme === 'dark' ? SIGNED_DARK : SIGNED_LIGHT);
  }
  if (name === 'compass') {
    // One hue can tell north from south only; the barbs tell the rest.
    return theme === 'red' ? (place) => [0.24 + 0.42 * Math.abs(1 - 2 * place), 0.2, 27] : compassColours(COMPASS);
  }
  return risingColours(RISING[name][theme]);
}

/** Lightness even in the value; hue and chroma from the stops at that lightness, straight lines in OKLab between. */
function risingColours(stops: readonly Oklch[]): (place: number) => Oklch {
  const points = stops.map(oklabOf);
  const first = points[0]!;
  const last = points[points.length - 1]!;
  return (place) => {
    const lightness = first[0] + place * (last[0] - first[0]);
    const upper = Math.max(
      1,
      points.findIndex((point) => (point[0] - lightness) * (last[0] - first[0]) >= -1e-12),
    );
    const [from, to] = [points[upper - 1]!, points[upper]!];
    return oklchOf(between(from, to, (lightness - from[0]) / (to[0] - from[0])));
  };
}

function twoSidedColours({ middle, chroma, end, hues }: TwoSided): (place: number) => Oklch {
  const centre = oklabOf(middle);
  return (place) => {
    const away = Math.abs(2 * place - 1);
    const hue = place < 0.5 ? hues[0] : hues[1];
    // Chroma comes in early and then holds, so that the sign shows while the value is still small.
    const full = oklabOf([end, chroma, hue]);
    const lightness = middle[0] + away * (end - middle[0]);
    const strength = Math.min(1, away / 0.6);
    return oklchOf([
      lightness,
      centre[1] + strength * (full[1] - centre[1]),
      centre[2] + strength * (full[2] - centre[2]),
    ]);
  };
}

/** Equal angles get equal lengths of arc on the ellipse, hence equal steps. */
function compassColours({ middle, lightness, chroma, hueEast }: Compass): (place: number) => Oklch {
  const point = (angle: number): Oklch => {
    const east = chroma * Math.sin(angle);
    return [middle + lightness * Math.cos(angle), Math.abs(east), east >= 0 ? hueEast : (hueEast + 180) % 360];
  };
  const pieces = 1440;
  const lengths = new Float64Array(pieces + 1);
  for (let k = 1; k <= pieces; k++) {
    const [from, to] = [oklabOf(point((2 * Math.PI * (k - 1)) / pieces)), oklabOf(point((2 * Math.PI * k) / pieces))];
    lengths[k] = lengths[k - 1]! + Math.hypot(to[0] - from[0], to[1] - from[1], to[2] - from[2]);
  }
  return (place) => {
    const wanted = place * lengths[pieces]!;
    const upper = Math.max(
      1,
      lengths.findIndex((length) => length >= wanted),
    );
    const part = (wanted - lengths[upper - 1]!) / (lengths[upper]! - lengths[upper - 1]!);
    return point((2 * Math.PI * (upper - 1 + part)) / pieces);
  };
}

function between(from: Oklab, to: Oklab, part: number): Oklab {
  return [from[0] + part * (to[0] - from[0]), from[1] + part * (to[1] - from[1]), from[2] + part * (to[2] - from[2])];
}

function tableOf(colours: (place: number) => Oklch): Uint8ClampedArray {
  const rgba = new Uint8ClampedArray(4 * SCALE_STEPS);
  for (let k = 0; k < SCALE_STEPS; k++) rgba.set([...bytesOf(colours((k + 0.5) / SCALE_STEPS)), 255], 4 * k);
  return rgba;
}
