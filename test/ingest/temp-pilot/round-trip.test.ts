// Soundings over the whole range of the code, encoded apart from the reader and read back; and spoiled bytes.

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { KNOT, specificHumidityOfDewPoint } from '../../../src/air/index.ts';
import { readProfiles } from '../../../src/ingest/index.ts';
import { profileAt } from '../../../src/profile/index.ts';
import {
  celsiusOf,
  depressionOf,
  encodeTemp,
  type CodedSounding,
  type CodedTemperature,
  type CodedValues,
  type CodedWind,
} from '../../support/encode-temp.ts';
import { bytesOf, pieces, readToEnd } from '../../support/sources.ts';

const STANDARD = [1000, 925, 850, 700, 500, 400, 300, 250, 200, 150, 100, 70, 50, 30, 20, 10];
/** Heights of those in the US Standard Atmosphere 1976, m. */
const USUAL = [111, 762, 1457, 3012, 5574, 7185, 9164, 10363, 11784, 13608, 16180, 18442, 20576, 23849, 26481, 31055];

const wind: fc.Arbitrary<CodedWind | null> = fc.oneof(
  {
    arbitrary: fc.record({
      direction: fc.integer({ min: 1, max: 72 }).map((k) => 5 * k),
      speed: fc.integer({ min: 1, max: 499 }),
    }),
    weight: 8,
  },
  { arbitrary: fc.constantFrom(null, { direction: 0, speed: 0 }), weight: 1 },
);
const depression = fc.option(fc.oneof(fc.integer({ min: 0, max: 50 }), fc.integer({ min: 56, max: 99 })), { freq: 6 });
/** Temperatures that the figure can hold, within what air at the surface can be. */
const coded = (celsius: number): CodedTemperature => {
  const tenths = Math.round(Math.abs(celsius) * 10);
  const figure = tenths % 10;
  // An odd figure means below zero: the neighbouring tenth is written.
  const fits = (figure % 2 === 1) === celsius < 0;
  const fitted = fits ? figure : figure === 0 ? 1 : figure - 1;
  return { degrees: Math.floor(tenths / 10), figure: fitted };
};

interface Drawn {
  knots: boolean;
  day: number;
  hour: number;
  surfacePressure: number;
  lowest: number | null;
  celsius: number;
  steps: number[];
  values: { depression: number | null; wind: CodedWind | null }[];
  significant: { pressure: number; depression: number | null }[];
  winds: { pressure: number; wind: CodedWind | null }[];
}

const drawn: fc.Arbitrary<Drawn> = fc.record({
  knots: fc.boolean(),
  day: fc.integer({ min: 1, max: 29 }),
  hour: fc.integer({ min: 0, max: 23 }),
  surfacePressure: fc.integer({ min: 560, max: 1060 }),
  lowest: fc.constantFrom(null, ...STANDARD),
  celsius: fc.double({ min: -60, max: 45, noNaN: true }),
  steps: fc.array(fc.double({ min: -0.9, max: 0.25, noNaN: true }), { minLength: 17, maxLength: 17 }),
  values: fc.array(fc.record({ depression, wind }), { minLength: 17, maxLength: 17 }),
  significant: fc.array(fc.record({ pressure: fc.integer({ min: 100, max: 1059 }), depression }), { maxLength: 12 }),
  winds: fc.array(fc.record({ pressure: fc.integer({ min: 100, max: 1059 }), wind }), { maxLength: 12 }),
});

/** A sounding in balance: heights by the weight of dry air between the levels, temperatures linear in ln p. */
function soundingOf(draw: Drawn): { sounding: CodedSounding; elevation: number; celsiusAt: (p: number) => number } {
  const { surfacePressure } = draw;
  const knots: [number, number][] = [[surfacePressure, draw.celsius]];
  STANDARD.filter((p) => p < surfacePressure).forEach((p, k) => {
    const [below, celsius] = knots.at(-1)!;
    // Up to some 9 K a kilometre colder, or warmer, from level to level, within what air can be.
    const kilometres = 7.5 * Math.log(below / p);
    // Warmer air than this is not up there, and its figures could be taken for the next surface.
    const warmest = p <= 300 ? -33 : 45;
    knots.push([p, Math.max(-92, Math.min(warmest, celsius + draw.steps[k]! * 9 * Math.min(kilometres, 3)))]);
  });
  const celsiusAt = (p: number): number => {
    const above = Math.max(
      1,
      knots.findIndex(([pressure]) => pressure <= p),
    );
    const [[p1, t1], [p2, t2]] = [knots[above - 1]!, knots[above]!];
    return t1 + ((t2 - t1) * Math.log(p1 / p)) / Math.log(p1 / p2);
  };
  const start = STANDARD.findIndex((p) => p < surfacePressure);
  const elevation = Math.round(USUAL[start]! - 29.27 * 273 * Math.log(surfacePressure / STANDARD[start]!));
  let height = elevation;
  const heights = knots.slice(1).map(([p, celsius], k) => {
    const [below, celsiusBelow] = knots[k]!;
    height += 29.27 * (273.15 + (celsius + celsiusBelow) / 2) * Math.log(below / p);
    return p > 500 ? Math.round(height) : 10 * Math.round(height / 10);
  });
  const nothing: CodedValues = { temperature: null, depression: null, wind: null };
  const standard = STANDARD.map((pressure, k) => {
    if (k < start) return { pressure, height: USUAL[k]!, ...nothing };
    return { pressure, height: heights[k - start]!, temperature: coded(celsiusAt(pressure)), ...draw.values[k]! };
  });
  const below = <T extends { pressure: number }>(levels: readonly T[]): T[] =>
    [
      ...new Map(
        levels.filter(({ pressure }) => pressure < surfacePressure).map((level) => [level.pressure, level]),
      ).values(),
    ].sort((a, b) => b.pressure - a.pressure);
  const surface = { pressure: surfacePressure, temperature: coded(draw.celsius), ...draw.values[16]! };
  const sounding: CodedSounding = {
    station: '10999',
    day: draw.day,
    hour: draw.hour,
    knots: draw.knots,
    surface,
    standard,
    significant: [
      { pressure: surfacePressure, temperature: surface.temperature, depression: surface.depression },
      ...below(draw.significant)
        .filter(({ pressure }) => !STANDARD.includes(pressure))
        .map((level) => ({ ...level, temperature: coded(celsiusAt(level.pressure)) })),
    ],
    winds: [
      { pressure: surfacePressure, wind: surface.wind },
      ...below(draw.winds).filter(({ pressure }) => !STANDARD.includes(pressure)),
    ],
    lowestWindPressure: draw.lowest,
  };
  return { sounding, elevation, celsiusAt };
}

describe('TEMP, encoded and read back', () => {
  it('gives every value that was coded, and every height in full (property)', async () => {
    await fc.assert(
      fc.asyncProperty(drawn, fc.boolean(), async (draw, known) => {
        const { sounding, elevation } = soundingOf(draw);
        const text = encodeTemp(sounding).join('');
        const stationList = [
          { id: '10999', name: 'x', latitude: 50, longitude: 8, elevation: known ? elevation : NaN },
        ];
        const { block, problems } = await readToEnd(
          readProfiles(pieces('feed', bytesOf(text), 50), { referenceTimeMs: Date.UTC(2024, 5, 30, 12), stationList }),
        );
        expect(problems, text).toEqual([]);
        expect(block.timeMs[0]).toBe(Date.UTC(2024, 5, draw.day, draw.hour));
        const { pressure, temperature, specificHumidity, speed, direction, heightAgl } = profileAt(block, 0);
        const find = (p: number): number => [...pressure!].findIndex((value) => Math.abs(value - 100 * p) < 1);
        const unit = draw.knots ? KNOT : 1;
        const checkWind = (p: number, wanted: CodedWind | null): void => {
          const k = find(p);
          if (wanted === null) return;
          expect(speed[k], `wind at ${p} in ${text}`).toBeCloseTo(wanted.speed * unit, 4);
          if (wanted.speed > 0) expect(direction[k]).toBe(wanted.direction);
        };
        const checkAir = (p: number, celsius: CodedTemperature, figure: number | null): void => {
          const k = find(p);
          expect(temperature![k], `temperature at ${p} in ${text}`).toBeCloseTo(celsiusOf(celsius) + 273.15, 3);
          if (figure === null) return;
          const wanted = specificHumidityOfDewPoint(celsiusOf(celsius) + 273.15 - depressionOf(figure), 100 * p);
          // So thin that the vapour would be all there is: no such air, and no number.
          if (Number.isNaN(wanted)) return;
          expect(Math.abs(specificHumidity![k]! - wanted)).toBeLessThanOrEqual(1e-5 * wanted + 1e-12);
        };
        for (const { pressure: p, temperature: celsius, depression: figure, wind: blown } of sounding.standard) {
          if (p >= draw.surfacePressure) continue;
          checkAir(p, celsius!, figure);
          if (draw.lowest !== null && p >= draw.lowest) checkWind(p, blown);
        }
        for (const level of sounding.significant) checkAir(level.pressure, level.temperature, level.depression);
        for (const level of sounding.winds) checkWind(level.pressure, level.wind);
        if (known) {
          for (const { pressure: p, height } of sounding.standard.filter(
            (level) => level.pressure < draw.surfacePressure,
          )) {
            expect(Math.abs(heightAgl[find(p)]! + elevation - height), `height of ${p} in ${text}`).toBeLessThan(0.01);
          }
        }
        for (let k = 1; k < heightAgl.length; k++) expect(heightAgl[k]! >= heightAgl[k - 1]!).toBe(true);
      }),
      { numRuns: 150 },
    );
  });

  it('lets no exception out and stays within bounds on spoiled bulletins (property)', async () => {
    const flips = fc.array(
      fc.tuple(
        fc.nat(),
        fc.nat({ max: 15 }).map((k) => '0123456789/= \nAT'.charCodeAt(k)),
      ),
      { maxLength: 10 },
    );
    await fc.assert(
      fc.asyncProperty(drawn, flips, fc.nat(), async (draw, changes, cut) => {
        const bytes = bytesOf(encodeTemp(soundingOf(draw).sounding).join(''));
        for (const [place, letter] of changes) bytes[place % bytes.length] = letter;
        const { block } = await readToEnd(
          readProfiles(pieces('feed', bytes.subarray(0, cut % 2 === 0 ? cut % bytes.length : bytes.length), 512), {
            referenceTimeMs: Date.UTC(2024, 5, 30),
          }),
        );
        for (const value of block.speed) expect(Number.isNaN(value) || (value >= 0 && value < 500)).toBe(true);
      }),
      { numRuns: 150 },
    );
  });

  it('does not mind 100 MB without a line end, a group end or a report end', async () => {
    const endless = (text: string): Promise<{ problems: { code: string }[] }> => {
      const piece = bytesOf(text.repeat(Math.floor(2 ** 20 / text.length)));
      const source = {
        name: 'feed',
        size: undefined,
        // eslint-disable-next-line @typescript-eslint/require-await -- nothing to wait for
        async *stream() {
          yield bytesOf('TTAA 15121 10999 99995 14656 18005 ');
          for (let k = 0; k < 100; k++) yield piece;
        },
      };
      return readToEnd(readProfiles(source, { referenceTimeMs: Date.UTC(2024, 5, 30) }));
    };
    await endless('A');
    expect((await endless('92745 10620 ')).problems.map(({ code }) => code)).toContain('ingest/bulletin-overlong');
  }, 60_000);
});
