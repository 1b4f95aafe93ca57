import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bytesOf,
  colourDifference,
  contrastOf,
  hexOf,
  linearOfBytes,
  oklabOfLinear,
  oklchOf,
  type Bytes,
} from '../../src/plot/colour.ts';

describe('colour', () => {
  it('agrees with the published values of the sRGB primaries', () => {
    // CSS Color Module Level 4, sample conversions: red oklch(62.796% 0.25768 29.234), lime (86.644% 0.29483 142.495),
    // blue (45.201% 0.31321 264.052).
    const rows: [Bytes, number, number, number][] = [
      [[255, 0, 0], 0.62796, 0.25768, 29.234],
      [[0, 255, 0], 0.86644, 0.29483, 142.495],
      [[0, 0, 255], 0.45201, 0.31321, 264.052],
    ];
    for (const [bytes, lightness, chroma, hue] of rows) {
      const got = oklchOf(oklabOfLinear(linearOfBytes(bytes)));
      expect(got[0]).toBeCloseTo(lightness, 4);
      expect(got[1]).toBeCloseTo(chroma, 4);
      expect(got[2]).toBeCloseTo(hue, 1);
    }
  });

  it('comes back to the same bytes (property)', () => {
    const byte = fc.integer({ min: 0, max: 255 });
    fc.assert(
      fc.property(fc.tuple(byte, byte, byte), (bytes) => {
        expect(bytesOf(oklchOf(oklabOfLinear(linearOfBytes(bytes))))).toEqual(bytes);
      }),
    );
  });

  it('gives up chroma, not lightness or hue, beyond the screen', () => {
    const got = oklchOf(oklabOfLinear(linearOfBytes(bytesOf([0.6, 0.4, 150]))));
    expect(got[0]).toBeCloseTo(0.6, 2);
    expect(got[2]).toBeCloseTo(150, 0);
    expect(got[1]).toBeLessThan(0.25);
  });

  it('knows contrast and difference at the ends', () => {
    expect(contrastOf([0, 0, 0], [255, 255, 255])).toBeCloseTo(21, 5);
    expect(colourDifference([12, 34, 56], [12, 34, 56])).toBe(0);
    expect(hexOf([0, 10, 255])).toBe('#000aff');
  });
});
