import { describe, expect, it } from 'vitest';
import { directionOf, eastward, northward, speedOf } from '../../src/air/index.ts';
import { BlockBuilder, INSTRUMENTS, MARK, type Instrument, type ProfileBlock } from '../../src/profile/index.ts';
import { screen } from '../../src/quality/index.ts';
import { PLAIN_SITE, type Site } from '../../src/site/index.ts';

const STEP = 600_000;
/** Evening of 20 April at 40 N, 90 W: the sun sets near 00:45 UTC. */
const APRIL = Date.UTC(2024, 3, 21, 2);
const JANUARY = Date.UTC(2024, 0, 21, 2);
const heights = Array.from({ length: 30 }, (_, k) => 150 + 60 * k);

interface Told {
  startMs: number;
  instrument: Instrument;
  /** degrees that the birds fly toward, 11 m/s through the air, from 400 to 900 m in profiles 8 to 15; null: no birds */
  toward: number | null;
  /** m/s: spectral width where birds fly; 1 elsewhere. */
  width?: number;
  /** dB: signal where birds fly; 10 elsewhere. */
  signal?: number;
}

/** Scatter of a gate, m/s, the same at every run. */
const scatter = (n: number): number => 0.8 * (((Math.abs(Math.sin(n * 12.9898)) * 43758.5453) % 1) - 0.5);

/** A night of 10 m/s from 200 degrees with some scatter, with or without birds. */
function night({ startMs, instrument, toward, width, signal }: Told, builder = new BlockBuilder()): BlockBuilder {
  for (let i = 0; i < 30; i++) {
    const birds = (z: number): boolean => toward !== null && i >= 8 && i < 16 && z >= 400 && z <= 900;
    const wind = heights.map((z, k) => {
      const [flightU, flightV] = birds(z) ? [eastward(-11, toward!), northward(-11, toward!)] : [0, 0];
      const n = 100 * i + 2 * k;
      return { u: eastward(10, 200) + flightU + scatter(n), v: northward(10, 200) + flightV + scatter(n + 1) };
    });
    builder.add({
      station: { id: 'a', name: 'a', latitude: 40, longitude: -90, elevation: 200 },
      source: `${instrument}.bufr`,
      instrument,
      timeMs: startMs + i * STEP,
      periodS: 600,
      levels: {
        heightAgl: heights,
        speed: wind.map(({ u, v }) => speedOf(u, v)),
        direction: wind.map(({ u, v }) => directionOf(u, v)),
        ...(width === undefined ? {} : { spectralWidth: heights.map((z) => (birds(z) ? width : 1)) }),
        ...(signal === undefined ? {} : { signal: heights.map((z) => (birds(z) ? signal : 10)) }),
      },
    });
  }
  return builder;
}

const count = (block: ProfileBlock, bit: number): number => block.mark.filter((mark) => (mark & bit) !== 0).length;
const likely = MARK['migrants-likely'];
const certain = MARK['migrants-certain'];
const screened = (told: Told, site: Site = PLAIN_SITE): ProfileBlock => screen(night(told).finish(), { site }).block;

describe('migrants', () => {
  const birds: Told = { startMs: APRIL, instrument: 'wind-profiler', toward: 300 };

  it('doubts the band in which birds fly by night and in season, and nothing else', () => {
    const block = screened(birds);
    // Eight profiles; gates of 450 to 870 m are eight.
    expect(count(block, likely)).toBeGreaterThan(0.8 * 64);
    for (let k = 0; k < block.mark.length; k++) {
      if ((block.mark[k]! & likely) === 0) continue;
      expect(block.heightAgl[k]!).toBeGreaterThanOrEqual(400);
      expect(block.heightAgl[k]!).toBeLessThanOrEqual(900);
    }
    expect(count(block, certain)).toBe(0);
  });

  it('leaves alone a quiet night, a month without passage, the day, and instruments that birds do not fill', () => {
    expect(count(screened({ ...birds, toward: null }), likely)).toBe(0);
    expect(count(screened({ ...birds, startMs: JANUARY }), likely)).toBe(0);
    expect(count(screened({ ...birds, startMs: APRIL + 14 * 3_600_000 }), likely)).toBe(0);
    expect(count(screened({ ...birds, instrument: 'lidar' }), likely)).toBe(0);
  });

  it('is certain where the heading is one the site file names for the month', () => {
    const named = (toward: number, months: number[]): Site => ({
      ...PLAIN_SITE,
      migration: [{ toward, spread: 30, months }],
    });
    expect(count(screened(birds, named(310, [4])), certain)).toBeGreaterThan(0);
    expect(count(screened(birds, named(120, [4])), certain)).toBe(0);
    expect(count(screened(birds, named(310, [9])), likely)).toBe(0);
  });

  it('is certain where the spectra are as wide as those of birds, and the echo no weaker than that of the air', () => {
    expect(count(screened({ ...birds, width: 2.5 }), certain)).toBeGreaterThan(30);
    expect(count(screened({ ...birds, width: 2.5, signal: 18 }), certain)).toBeGreaterThan(30);
    expect(count(screened({ ...birds, width: 2.5, signal: 4 }), certain)).toBe(0);
    expect(count(screened({ ...birds, width: 1.1 }), certain)).toBe(0);
    expect(count(screened({ ...birds, width: 1.1 }), likely)).toBeGreaterThan(30);
  });

  it('is certain where another instrument at the station contradicts the band', () => {
    const both = night({ ...birds, instrument: 'lidar', toward: null }, night(birds)).finish();
    const { block } = screen(both);
    const profiler = INSTRUMENTS.indexOf('wind-profiler');
    expect(count(block, certain)).toBeGreaterThan(0);
    for (let i = 0; i < block.profileCount; i++) {
      if (block.instrumentIndex[i] === profiler) continue;
      expect(block.mark.slice(block.offsets[i], block.offsets[i + 1]).some((mark) => (mark & certain) !== 0)).toBe(
        false,
      );
    }
  });
});
