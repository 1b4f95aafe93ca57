import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  archiveRows,
  ArchiveTally,
  csvHeading,
  csvRows,
  figureRows,
  jetTable,
  nightRows,
  profileTable,
  ROSE_SPEEDS,
  solarClock,
  textColumn,
  type FigureRows,
} from '../../../src/desk/index.ts';
import { blockOf, PLAIN, QUESTION, type Made } from './support.ts';

const START = Date.UTC(2024, 4, 21, 18, 40);
const MADE: Made[] = Array.from({ length: 144 }, (_, k) => ({
  timeMs: START + k * 600_000,
  jet: k >= 60 && k < 90 ? 8 + k / 20 : 0,
  direction: 340 + k / 4,
  lost: k % 10 === 9 ? Array.from({ length: 40 }, (_, level) => level) : [],
}));
const ROWS = archiveRows(blockOf(MADE), QUESTION)[0]!;
const DARK = Uint8Array.from(MADE, (_, k) => Number(k >= 45 && k < 100));

function tallyOf(rows: FigureRows): ArchiveTally {
  const tally = new ArchiveTally(2);
  tally.addRows(rows, solarClock(PLAIN.longitude));
  return tally;
}

describe('ArchiveTally', () => {
  it('counts frequencies per assessable profile by the sun’s own hour', () => {
    const { profiles, assessable, jets, byMonthHour, noseHeight, noseSpeed, rose } = tallyOf(
      figureRows(ROWS, DARK),
    ).figures();
    expect([profiles, assessable, jets]).toEqual([144, 130, 27]);
    const may = (hour: number): number[] =>
      (['profiles', 'assessable', 'jets'] as const).map((name) => byMonthHour[name][4 * 24 + hour]!);
    expect(may(12)).toEqual([6, 6, 0]);
    // 22 h: profiles 60 to 65 after noon, none lost; 23 h: one lost.
    expect(may(22)).toEqual([6, 6, 6]);
    expect(may(23)).toEqual([6, 5, 5]);
    expect(noseHeight).toMatchObject({ total: 27, mean: 300 });
    expect(noseSpeed.total).toBe(27);
    expect(rose.reduce((sum, count) => sum + count, 0)).toBe(27);
    // Directions at the nose run from 1 to 8.25 degrees: all north.
    expect(rose.slice(0, ROSE_SPEEDS.length + 1).reduce((sum, count) => sum + count, 0)).toBe(27);
  });

  it('tells the rotor with jets from the rotor without, in the dark only', () => {
    const [disc] = tallyOf(figureRows(ROWS, DARK)).figures().discs;
    expect(disc!.withJet.equivalentSpeed.total).toBe(27);
    expect(disc!.withoutJet.equivalentSpeed.total).toBe(55 - 6 - 27);
    expect(disc!.withJet.shearExponent.mean).toBeGreaterThan(disc!.withoutJet.shearExponent.mean);
  });

  it('gives the same to the last bit however the rows are parted', () => {
    const whole = figureRows(ROWS, DARK);
    const slice = (rows: FigureRows, pick: (k: number) => boolean): FigureRows => {
      const of = (values: ArrayLike<number>): number[] => Array.from(values).filter((_, k) => pick(k));
      return {
        timeMs: of(rows.timeMs),
        status: of(rows.status),
        category: of(rows.category),
        dark: of(rows.dark),
        noseHeight: of(rows.noseHeight),
        noseSpeed: of(rows.noseSpeed),
        noseDirection: of(rows.noseDirection),
        discs: rows.discs.map(({ equivalentSpeed, shearExponent, veer }) => ({
          equivalentSpeed: of(equivalentSpeed),
          shearExponent: of(shearExponent),
          veer: of(veer),
        })),
      };
    };
    const expected = tallyOf(whole).figures();
    fc.assert(
      fc.property(fc.array(fc.nat(2), { minLength: 144, maxLength: 144 }), (part) => {
        const tallies = [2, 0, 1].map((wanted) => tallyOf(slice(whole, (k) => part[k] === wanted)));
        const joined = new ArchiveTally(2);
        for (const tally of tallies) joined.merge(tally);
        expect(joined.figures()).toEqual(expected);
      }),
      { numRuns: 20 },
    );
  });

  it('counts nights that could be judged, onset and end against the sun', () => {
    const tally = new ArchiveTally(2);
    const nights = nightRows(ROWS);
    tally.addNights(nights);
    tally.addNights([{ ...nights[0]!, darkAssessable: 0 }]);
    const figures = tally.figures();
    expect([figures.nights, figures.nightsWithJet]).toEqual([1, 1]);
    expect(figures.onset.mean).toBeCloseTo((nights[0]!.onsetMs - nights[0]!.sunsetMs) / 3_600_000, 3);
    expect(figures.end.total).toBe(1);
  });

  it('has nothing to say of nothing', () => {
    const figures = new ArchiveTally(0).figures();
    expect(figures).toMatchObject({ profiles: 0, nights: 0, discs: [] });
    expect(figures.noseSpeed.mean).toBeNaN();
  });
});

describe('tables as CSV', () => {
  it('has a cell for every column in every row, empty where missing', () => {
    const table = profileTable(ROWS, QUESTION.discs);
    const lines = csvRows(table).trimEnd().split('\n');
    expect(lines).toHaveLength(144);
    for (const line of lines) expect(line.split(',')).toHaveLength(table.columns.length);
    expect(csvHeading(table)).toContain('north_row_rews_mps');
    expect(lines[9]).toContain('not-assessable,');
    expect(lines[60]).toContain('2024-05-22T04:40:00Z,2024-05-21,yes,jet,');
    expect(csvRows(jetTable(ROWS, QUESTION.discs)).trimEnd().split('\n')).toHaveLength(27);
  });

  it('quotes what needs it', () => {
    const columns = [textColumn('a,b', '', ['plain', 'say "so"', 'two\nlines'])];
    expect(csvHeading({ columns, rowCount: 3 })).toBe('"a,b"\n');
    expect(csvRows({ columns, rowCount: 3 })).toBe('plain\n"say ""so"""\n"two\nlines"\n');
  });
});
