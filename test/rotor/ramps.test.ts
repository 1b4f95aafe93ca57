import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findRamps, swingingDoor, type Ramp } from '../../src/rotor/index.ts';

const MINUTE = 60_000;
const HOUR = { name: 'hour', share: 0.2, withinS: 3600 };
const rampsIn = (powerKw: readonly number[], definitions = [HOUR]): Ramp[] =>
  findRamps({ timeMs: powerKw.map((_, k) => k * 10 * MINUTE), powerKw }, 1000, definitions);
const level = (value: number, count: number): number[] => Array<number>(count).fill(value);

describe('findRamps', () => {
  it('finds a ramp with its corners', () => {
    const ramps = rampsIn([...level(200, 12), 300, 400, 500, 600, ...level(600, 12)]);
    expect(ramps).toEqual([
      {
        definition: 'hour',
        sense: 'up',
        startMs: 110 * MINUTE,
        endMs: 150 * MINUTE,
        changeKw: 400,
        changeShare: 0.4,
        ratePerHourKw: 600,
      },
    ]);
  });

  it('is not misled by noise on the level ground around it', () => {
    const noise = (k: number): number => 12 * Math.sin(12.9898 * k);
    const [ramp, ...others] = rampsIn(
      [...level(700, 20), 600, 480, 350, ...level(350, 20)].map((value, k) => value + noise(k)),
    );
    expect(others).toEqual([]);
    expect(ramp!.sense).toBe('down');
    expect(Math.abs(ramp!.startMs - 190 * MINUTE)).toBeLessThanOrEqual(10 * MINUTE);
    expect(Math.abs(ramp!.endMs - 220 * MINUTE)).toBeLessThanOrEqual(10 * MINUTE);
  });

  it('tells a spike as a rise and a fall', () => {
    const ramps = rampsIn([...level(200, 6), 500, ...level(200, 6)]);
    expect(ramps.map((ramp) => ramp.sense)).toEqual(['up', 'down']);
    expect(ramps.map((ramp) => ramp.changeKw)).toEqual([300, -300]);
    expect(ramps[0]!.endMs).toBe(ramps[1]!.startMs);
  });

  it('takes a rise that goes on for hours as one event, and no rise slower than asked', () => {
    const long = Array.from({ length: 19 }, (_, k) => 50 * k);
    expect(rampsIn([...level(0, 6), ...long, ...level(900, 6)])).toHaveLength(1);
    const slow = Array.from({ length: 60 }, (_, k) => 15 * k);
    expect(rampsIn(slow)).toEqual([]);
  });

  it('answers several definitions at once', () => {
    const power = [
      ...level(100, 6),
      250,
      ...level(250, 6),
      ...Array.from({ length: 12 }, (_, k) => 250 + 30 * (k + 1)),
    ];
    const ramps = rampsIn(power, [
      { name: 'quick', share: 0.1, withinS: 600 },
      { name: 'slow', share: 0.3, withinS: 7200 },
    ]);
    expect(ramps.map((ramp) => ramp.definition)).toEqual(['quick', 'slow']);
  });

  it('crosses no gap in the data', () => {
    const timeMs = [0, 10, 20, 30, 200, 210, 220, 230].map((minute) => minute * MINUTE);
    const powerKw = [100, 100, 100, 100, 900, 900, 900, 900];
    expect(findRamps({ timeMs, powerKw }, 1000, [{ name: 'long', share: 0.2, withinS: 86_400 }])).toEqual([]);
    expect(rampsIn([...level(100, 6), NaN, 900, ...level(900, 6)])).toHaveLength(1);
  });

  it('has nothing to find without capacity, samples or values', () => {
    expect(findRamps({ timeMs: [0, MINUTE], powerKw: [0, 900] }, 0, [HOUR])).toEqual([]);
    expect(rampsIn([])).toEqual([]);
    expect(rampsIn(level(NaN, 9))).toEqual([]);
    expect(rampsIn([500])).toEqual([]);
  });

  it('misses no qualifying change and invents none (property)', () => {
    const step = fc.integer({ min: -150, max: 150 });
    fc.assert(
      fc.property(fc.array(step, { minLength: 2, maxLength: 80 }), (steps) => {
        let at = 500;
        const power = steps.map((by) => (at = Math.max(0, Math.min(1000, at + by))));
        const ramps = rampsIn(power);
        const timeOf = (k: number): number => k * 10 * MINUTE;
        for (let to = 0; to < power.length; to++) {
          for (let from = Math.max(0, to - 6); from < to; from++) {
            const change = power[to]! - power[from]!;
            if (Math.abs(change) < 200) continue;
            const covering = ramps.filter(
              (ramp) => (ramp.sense === 'up') === change > 0 && ramp.startMs < timeOf(to) && ramp.endMs > timeOf(from),
            );
            expect(covering.length, `${from} to ${to}`).toBeGreaterThan(0);
          }
        }
        for (const ramp of ramps) {
          expect(Math.abs(ramp.changeShare)).toBeGreaterThanOrEqual(0.2 - 1e-9);
          expect(Math.sign(ramp.changeKw)).toBe(ramp.sense === 'up' ? 1 : -1);
        }
      }),
    );
  });

  it('gives a mirrored output the mirrored ramps (property)', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 1000 }), { minLength: 2, maxLength: 60 }), (power) => {
        const mirrored = rampsIn(power.map((value) => 1000 - value));
        expect(mirrored.map((ramp) => -ramp.changeKw)).toEqual(rampsIn(power).map((ramp) => ramp.changeKw));
      }),
    );
  });
});

describe('swingingDoor', () => {
  it('keeps the ends and the corners of straight pieces', () => {
    const value = [0, 0, 0, 1, 2, 3, 3, 3];
    expect(
      swingingDoor(
        value.map((_, k) => k),
        value,
        0.1,
      ),
    ).toEqual([0, 2, 5, 7]);
  });

  it('misses no sample by more than the door is wide (property)', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 100, noNaN: true }), { minLength: 1, maxLength: 60 }), (value) => {
        const time = value.map((_, k) => k);
        const corners = swingingDoor(time, value, 5);
        for (let c = 1; c < corners.length; c++) {
          const [from, to] = [corners[c - 1]!, corners[c]!];
          for (let k = from; k <= to; k++) {
            const straight = value[from]! + ((value[to]! - value[from]!) * (k - from)) / Math.max(1, to - from);
            // The doors bound the line from the hinge within a width either side, and the end itself lies on it.
            expect(Math.abs(straight - value[k]!)).toBeLessThanOrEqual(10 + 1e-9);
          }
        }
      }),
    );
  });
});
