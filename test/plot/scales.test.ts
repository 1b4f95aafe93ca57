import { describe, expect, it } from 'vitest';
import { bytesOf, colourDifference, contrastOf, type Bytes } from '../../src/plot/colour.ts';
import {
  colourScale,
  scaleColour,
  scaleIndex,
  SCALE_STEPS,
  THEMES,
  type ScaleName,
  type ThemeName,
} from '../../src/plot/index.ts';
import { DEFICIENCIES, greyOf, lightnessOf, seenWith } from './colour-vision.ts';

const RISING: ScaleName[] = ['speed', 'moisture', 'warmth', 'share'];
const THEME_NAMES: ThemeName[] = ['dark', 'light', 'red'];
const COLOURED: ThemeName[] = ['dark', 'light'];

const coloursOf = (name: ScaleName, theme: ThemeName): Bytes[] => {
  const { rgba } = colourScale(name, theme);
  return Array.from({ length: SCALE_STEPS }, (_, k) => [rgba[4 * k]!, rgba[4 * k + 1]!, rgba[4 * k + 2]!] as const);
};
/** Differences over sixteen equal pieces of the scale. */
const steps = (colours: Bytes[]): number[] =>
  Array.from({ length: 16 }, (_, k) => colourDifference(colours[16 * k]!, colours[Math.min(16 * k + 16, 255)]!));
const slopes = (colours: Bytes[]): number[] => {
  const lightness = colours.map(lightnessOf);
  return Array.from({ length: 31 }, (_, k) => lightness[8 * k + 8]! - lightness[8 * k]!);
};

describe.each(RISING)('the rising scale %s', (name) => {
  it.each(THEME_NAMES)('has lightness even in the value, away from the ground (%s)', (theme) => {
    const lightness = coloursOf(name, theme).map(lightnessOf);
    const [first, last] = [lightness[0]!, lightness[255]!];
    expect(Math.sign(last - first)).toBe(theme === 'light' ? -1 : 1);
    lightness.forEach((value, k) => expect(value).toBeCloseTo(first + (k / 255) * (last - first), 1.7));
  });

  it.each(COLOURED)('makes equal steps look equal (%s)', (theme) => {
    const sizes = steps(coloursOf(name, theme));
    expect(Math.max(...sizes) / Math.min(...sizes)).toBeLessThan(1.35);
  });

  it.each(COLOURED)('keeps its order for every kind of colour vision and in grey (%s)', (theme) => {
    const way = theme === 'light' ? -1 : 1;
    const colours = coloursOf(name, theme);
    for (const seen of [greyOf, ...DEFICIENCIES.map((kind) => (bytes: Bytes) => seenWith(kind, bytes))]) {
      const changed = colours.map(seen);
      for (const slope of slopes(changed)) expect(slope * way).toBeGreaterThan(0.008);
      for (const size of steps(changed)) expect(size).toBeGreaterThan(0.03);
    }
  });
});

describe('every scale', () => {
  const all: ScaleName[] = [...RISING, 'signed', 'compass'];
  it.each(all)('%s is never taken for the ground, so that a calm is no gap', (name) => {
    for (const theme of THEME_NAMES) {
      const nearest = Math.min(...coloursOf(name, theme).map((c) => colourDifference(c, THEMES[theme].groundBytes)));
      expect(nearest, theme).toBeGreaterThan(0.05);
    }
  });
});

describe('the signed scale', () => {
  it.each(COLOURED)('steps equally on both sides of a neutral middle (%s)', (theme) => {
    const lightness = coloursOf('signed', theme).map(lightnessOf);
    for (let k = 0; k < 128; k++) expect(lightness[k]!).toBeCloseTo(lightness[255 - k]!, 1.7);
    const way = theme === 'light' ? -1 : 1;
    for (let k = 128; k < 248; k += 8) expect((lightness[k + 8]! - lightness[k]!) * way).toBeGreaterThan(0.02);
  });

  it.each(COLOURED)('tells sign from sign for every kind of colour vision (%s)', (theme) => {
    const colours = coloursOf('signed', theme);
    for (const kind of DEFICIENCIES) {
      for (let k = 0; k < 100; k++) {
        const apart = colourDifference(seenWith(kind, colours[k]!), seenWith(kind, colours[255 - k]!));
        // Over a quarter of the way out; nearer the middle the values are nearly equal anyway.
        expect(apart, `${kind} ${k}`).toBeGreaterThan(k < 96 ? 0.055 : 0.04);
      }
    }
  });
});

describe('the compass scale', () => {
  it.each(COLOURED)('goes round without a seam in equal steps (%s)', (theme) => {
    const colours = coloursOf('compass', theme);
    const sizes = Array.from({ length: 32 }, (_, k) => colourDifference(colours[8 * k]!, colours[(8 * k + 8) % 256]!));
    expect(Math.max(...sizes) / Math.min(...sizes)).toBeLessThan(1.2);
  });

  it.each(COLOURED)('keeps opposite winds apart for every kind of colour vision (%s)', (theme) => {
    const colours = coloursOf('compass', theme);
    for (const kind of DEFICIENCIES) {
      for (let k = 0; k < 128; k++) {
        const apart = colourDifference(seenWith(kind, colours[k]!), seenWith(kind, colours[k + 128]!));
        expect(apart, `${kind} ${k}`).toBeGreaterThan(0.1);
      }
    }
  });
});

describe('scaleIndex', () => {
  const range = { low: 0, high: 24 };
  it('clamps at the ends and knows nothing of NaN', () => {
    const scale = colourScale('speed', 'dark');
    expect(scaleIndex(scale, range, -3)).toBe(0);
    expect(scaleIndex(scale, range, 24)).toBe(255);
    expect(scaleIndex(scale, range, Infinity)).toBe(255);
    expect(scaleIndex(scale, range, 12)).toBe(128);
    expect(scaleIndex(scale, range, NaN)).toBe(-1);
    expect(scaleColour(scale, range, NaN)).toBeNull();
  });
  it('goes round on the compass', () => {
    const scale = colourScale('compass', 'dark');
    expect(scaleIndex(scale, { low: 0, high: 360 }, 360)).toBe(0);
    expect(scaleIndex(scale, { low: 0, high: 360 }, -90)).toBe(192);
  });
});

describe('the themes', () => {
  it('keep text legible: 7:1 for ink, 4.5:1 for labels (WCAG 2.2)', () => {
    for (const name of COLOURED) {
      const { ground, ink, soft, call } = THEMES[name];
      expect(contrastOf(parse(ground), parse(ink))).toBeGreaterThan(7);
      expect(contrastOf(parse(ground), parse(soft))).toBeGreaterThan(4.5);
      expect(contrastOf(parse(ground), parse(call))).toBeGreaterThan(4.5);
    }
    expect(contrastOf(parse(THEMES.dark.ground), parse(THEMES.dark.soft))).toBeGreaterThan(7);
  });
  it('are the tokens of the look', () => {
    expect(parse(THEMES.dark.ground)).toEqual(bytesOf([0.165, 0.018, 255]));
  });
});

function parse(hex: string): Bytes {
  return [1, 3, 5].map((at) => parseInt(hex.slice(at, at + 2), 16)) as unknown as Bytes;
}
