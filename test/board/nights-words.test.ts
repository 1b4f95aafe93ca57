import { describe, expect, it } from 'vitest';
import { figureCsv } from '../../src/board/words/figure-table.ts';
import {
  discFigures,
  matrixFigure,
  noseFigures,
  roseFigure,
  timesFigures,
} from '../../src/board/words/nights-figures.ts';
import { siftNights } from '../../src/board/words/nights-list.ts';
import { mainDirection, nightsAnswers, nightsStory, oftenHours, shareWords } from '../../src/board/words/nights.ts';
import { quantile } from '../../src/board/words/spread.ts';
import { ArchiveTally, solarClock, type ArchiveNight, type ArchiveView } from '../../src/desk/index.ts';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const METRES = { speed: 'm/s', height: 'm' } as const;

interface MadeNight {
  readonly date: string;
  /** Hours after noon of the jet; none without. */
  readonly jet?: readonly [from: number, to: number];
  /** Whether the instrument told anything. */
  readonly lost?: boolean;
}

/** A profile an hour at longitude 0, sunset 8 h and sunrise 16 h after noon; a jet 320 m high of 15 m/s from 200 degrees. */
function viewOf(made: readonly MadeNight[], graded = true): ArchiveView {
  const hours = made.flatMap(({ date, jet, lost = false }) =>
    Array.from({ length: 24 }, (_, k) => ({
      timeMs: Date.parse(date) + (12 + k) * HOUR,
      jet: jet !== undefined && k >= jet[0] && k < jet[1],
      lost,
      dark: k >= 8 && k < 16,
    })),
  );
  const of = (value: (hour: (typeof hours)[number]) => number): number[] => hours.map(value);
  const ifJet = (value: number): number[] => of(({ jet }) => (jet ? value : NaN));
  const rows = {
    timeMs: of(({ timeMs }) => timeMs),
    status: of(({ jet, lost }) => (lost ? 0 : jet ? 2 : 1)),
    category: ifJet(1),
    dark: of(({ dark }) => Number(dark)),
    noseHeight: ifJet(320),
    noseSpeed: ifJet(15),
    noseDirection: ifJet(200),
    discs: [
      {
        equivalentSpeed: of(({ jet, lost }) => (lost ? NaN : jet ? 11 : 7)),
        shearExponent: of(({ jet, lost }) => (lost ? NaN : jet ? 0.4 : 0.15)),
        veer: of(({ jet, lost }) => (lost ? NaN : jet ? 12 : 3)),
      },
    ],
  };
  const nights = made.map(({ date, jet, lost = false }): ArchiveNight => {
    const noon = Date.parse(date) + DAY / 2;
    const at = (k: number | undefined): number => (k === undefined ? NaN : noon + k * HOUR);
    return {
      night: date,
      sunsetMs: at(8),
      sunriseMs: at(16),
      profiles: 24,
      assessable: lost ? 0 : 24,
      jets: jet === undefined ? 0 : jet[1] - jet[0],
      darkAssessable: lost ? 0 : 8,
      firstJetMs: at(jet?.[0]),
      lastJetMs: at(jet?.[1]),
      onsetMs: at(jet?.[0]),
      endMs: at(jet?.[1]),
      peakMs: at(jet?.[0]),
      peakSpeed: jet === undefined ? NaN : 15,
      peakHeight: jet === undefined ? NaN : 320,
      peakDirection: jet === undefined ? NaN : 200,
      category: jet === undefined ? -1 : 1,
      files: [],
    };
  });
  const figures = Array.from({ length: graded ? 4 : 1 }, (_, least) => {
    const tally = new ArchiveTally(1, least);
    tally.addRows(rows, solarClock(0));
    tally.addNights(nights);
    return tally.figures();
  });
  return {
    key: 'moor/lidar',
    stationName: 'Moor',
    instrument: 'lidar',
    longitude: 0,
    criteria: 'whiteman-1997',
    discs: ['North row'],
    figures,
    nights,
  };
}

const dates = (from: string, count: number): string[] =>
  Array.from({ length: count }, (_, k) => new Date(Date.parse(from) + k * DAY).toISOString().slice(0, 10));
/** Four months, 2023-04-01 to 2023-07-29, with a jet every fourth night, in June every second, from 23 to 03 h. */
const SEASON = viewOf(
  dates('2023-04-01', 120).map((date, k) =>
    k % (date.slice(5, 7) === '06' ? 2 : 4) === 0 ? { date, jet: [11, 15] as const } : { date },
  ),
);
const told = (view: ArchiveView, least = 0): string =>
  nightsStory(view, least, METRES)
    .map(({ text }) => text.replaceAll('\u00a0', ' '))
    .join('');

describe('nightsStory', () => {
  it('says how often, when, how high and from where', () => {
    // 30 nights of June bring 15, the other 90 bring 23.
    const withJet = SEASON.nights.filter(({ jets }) => jets > 0).length;
    expect(told(SEASON)).toBe(
      `In 120 assessable nights at Moor a jet blew in ${Math.round(withJet / 1.2)} of 100; ` +
        'most often in June between 23 and 03 h, nose near 320 m and 15.0 m/s, mostly from the south-southwest.',
    );
  });

  it('says of a few nights how little they are', () => {
    const [first, second, third] = dates('2024-05-21', 3) as [string, string, string];
    expect(told(viewOf([{ date: first, jet: [9, 14] }, { date: second }, { date: third, jet: [9, 12] }]))).toBe(
      '3 assessable nights at Moor: too few for a climate. A jet blew in 2 of them, ' +
        'nose near 320 m and 15.0 m/s, mostly from the south-southwest.',
    );
    expect(told(viewOf([{ date: first, jet: [9, 14] }]))).toContain('1 assessable night at Moor');
    expect(told(viewOf([{ date: first }]))).toBe('1 assessable night at Moor: too few for a climate. No jet blew.');
  });

  it('says that gaps are gaps', () => {
    const half = dates('2023-04-01', 80).map((date, k) =>
      k % 2 === 0 ? { date, lost: true } : { date, jet: [9, 14] as const },
    );
    expect(told(viewOf(half))).toMatch(
      /^In 40 assessable nights at Moor a jet blew in all;.*Only 50 in 100 of the profiles can be assessed; all shares are of those\.$/,
    );
    expect(told(viewOf([{ date: '2023-04-01', lost: true }]))).toBe(
      'None of 24 profiles at Moor can be assessed, so nothing can be said of jets.',
    );
  });

  it('counts by category where there are any', () => {
    expect(told(SEASON, 1)).toContain('a jet of category 1 or more blew in');
    expect(told(SEASON, 2)).toBe('In 120 assessable nights at Moor no jet of category 2 or more blew.');
    expect(told(viewOf([{ date: '2023-04-01' }], false), 3)).toContain('too few');
  });

  it('tells months only where enough of them can be compared', () => {
    const april = viewOf(dates('2023-04-01', 30).map((date) => ({ date, jet: [11, 14] as const })));
    expect(told(april)).toContain('; most often between 23 and 02 h, nose');
  });

  it('speaks of profiles where no table of nights is open', () => {
    const [figures] = SEASON.figures;
    const none = { ...SEASON, nights: [], figures: [{ ...figures!, nights: 0, nightsWithJet: 0 }] };
    expect(told(none)).toMatch(/^In 2.880 assessable profiles at Moor a jet showed in 5 of 100, nose near 320 m/);
  });
});

describe('nightsAnswers', () => {
  it('shows the share that can be assessed beside the share with a jet', () => {
    const view = viewOf([
      { date: '2024-05-21', jet: [9, 14] },
      { date: '2024-05-22' },
      { date: '2024-05-23', lost: true },
    ]);
    const [nights, nose, times, disc] = nightsAnswers(view, 0, 0, METRES);
    expect(nights).toMatchObject({
      figures: [{ value: '50', unit: 'in 100' }],
      age: '2 nights: too few for a climate',
    });
    expect(nights!.lines.map(({ text }) => text)).toEqual([
      '1 of 2 assessable nights with a jet; 1 more could not be assessed',
      'assessable: 67 in 100 of 72 profiles; a gap never counts as no jet',
    ]);
    expect(nose!.figures[0]).toEqual({ value: '320', unit: 'm' });
    // Onset 9 h after noon is 1 h after sunset, the end 14 h after noon 2 h before sunrise.
    expect(times!.figures).toEqual([
      { value: '1.0', unit: 'h after sunset' },
      { value: '2.0', unit: 'h before sunrise' },
    ]);
    expect(disc!.figures).toEqual([
      { value: '11.0', unit: 'm/s with' },
      { value: '7.0', unit: 'without' },
    ]);
  });

  it('says why where there is no figure', () => {
    for (const answer of nightsAnswers({ ...viewOf([{ date: '2024-05-21', lost: true }]), discs: [] }, 0, 1, METRES)) {
      expect(answer.figures).toEqual([]);
      expect(answer.none).not.toBe('');
    }
  });
});

describe('the pictures as tables', () => {
  it('tell frequencies per assessable profile', () => {
    const view = viewOf([
      { date: '2024-05-21', jet: [9, 14] },
      { date: '2024-05-22', lost: true },
    ]);
    const { table } = matrixFigure(view, 0);
    expect(table.columns.slice(0, 3)).toEqual(['month', '12 h', '13 h']);
    const [may] = table.rows;
    // 12 + 9 is 21 h: the tenth column of hours; every hour has one assessable profile of two.
    expect(may!.slice(9, 12)).toEqual(['0', '100', '100']);
    expect(may!.slice(-3)).toEqual(['21', '50', '48']);
  });

  it('hold every value of the histograms and the rose', () => {
    const rows = [...noseFigures(SEASON, 0, METRES), roseFigure(SEASON, 0, METRES), ...timesFigures(SEASON, 0)];
    const jets = SEASON.figures[0]!.jets;
    const sums = rows.map(({ table }) =>
      table.rows.reduce((sum, row) => sum + Number(row[1]!.replaceAll('\u2009', '')), 0),
    );
    const nights = SEASON.nights.filter((night) => night.jets > 0).length;
    expect(sums).toEqual([jets, jets, jets, nights, nights]);
    expect(discFigures(SEASON, 0, 0, METRES)[0]!.table.rows.map((row) => row[0])).toEqual([
      '7 to 8',
      '8 to 9',
      '9 to 10',
      '10 to 11',
      '11 to 12',
    ]);
    expect(discFigures(SEASON, 0, 5, METRES)).toEqual([]);
  });

  it('become CSV that a program reads', () => {
    expect(
      figureCsv({
        columns: ['a, b', 'c'],
        rows: [
          ['−1\u2009234', '–'],
          ['say "so"', '+2'],
        ],
      }),
    ).toBe('"a, b",c\n-1234,\n"say ""so""",+2\n');
  });
});

describe('words for numbers of an archive', () => {
  it('finds hours around midnight', () => {
    const at = (...often: number[]): number[] =>
      Array.from({ length: 24 }, (_, hour) => (often.includes(hour) ? 1 : 0.1));
    expect(oftenHours(at(23, 0, 1, 2))).toEqual({ from: 23, to: 3 });
    expect(oftenHours(at(5))).toEqual({ from: 5, to: 6 });
    expect(oftenHours(new Array<number>(24).fill(0.5))).toBeNull();
    expect(oftenHours(new Array<number>(24).fill(NaN))).toBeNull();
    expect(oftenHours(new Array<number>(24).fill(0))).toBeNull();
  });

  it('finds quantiles within classes', () => {
    const histogram = { start: 0, step: 10, counts: [0, 4, 0, 4], below: 0, above: 0, total: 8, mean: 0 };
    expect(quantile(histogram, 0.25)).toBe(15);
    expect(quantile(histogram, 0.5)).toBe(20);
    expect(quantile(histogram, 1)).toBe(40);
    expect(quantile({ ...histogram, below: 8, total: 16 }, 0.25)).toBe(0);
    expect(quantile({ ...histogram, above: 24, total: 32 }, 0.5)).toBe(40);
    expect(quantile({ ...histogram, counts: [], total: 0 }, 0.5)).toBeNaN();
  });

  it('counts in hundreds', () => {
    expect([shareWords(0, 7), shareWords(7, 7), shareWords(1, 3), shareWords(1, 300), shareWords(0, 0)]).toEqual([
      'none',
      'all',
      '33 in 100',
      '0.3 in 100',
      'unknown',
    ]);
    expect(mainDirection(viewOf([{ date: '2024-05-21' }]).figures[0]!)).toBe('');
  });
});

describe('siftNights', () => {
  const nights = viewOf([
    { date: '2024-05-21', jet: [9, 14] },
    { date: '2024-05-22' },
    { date: '2024-06-01', lost: true },
    { date: '2024-06-02', jet: [10, 12] },
  ]).nights;
  const sifted = (
    shown: 'all' | 'jet' | 'no-jet' | 'unassessable',
    month: number,
    least: number,
    by: 'night' | 'onset' | 'share' = 'night',
    falling = false,
  ): string[] => siftNights(nights, { shown, month, least }, { by, falling }).map(({ night }) => night.slice(5));

  it('keeps what is asked for', () => {
    expect(sifted('all', 0, 0)).toEqual(['05-21', '05-22', '06-01', '06-02']);
    expect(sifted('jet', 0, 0)).toEqual(['05-21', '06-02']);
    expect(sifted('jet', 0, 2)).toEqual([]);
    expect(sifted('no-jet', 0, 0)).toEqual(['05-22']);
    expect(sifted('no-jet', 0, 2)).toEqual(['05-21', '05-22', '06-02']);
    expect(sifted('unassessable', 6, 0)).toEqual(['06-01']);
  });

  it('sorts what is known before what is not, either way', () => {
    expect(sifted('all', 0, 0, 'onset')).toEqual(['05-21', '06-02', '05-22', '06-01']);
    expect(sifted('all', 0, 0, 'onset', true)).toEqual(['06-02', '05-21', '05-22', '06-01']);
    expect(sifted('all', 0, 0, 'share', true)).toEqual(['05-21', '06-02', '05-22', '06-01']);
  });
});
