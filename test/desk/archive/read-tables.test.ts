import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { archiveOf } from '../../../src/desk/archive/view.ts';
import {
  archiveRows,
  ArchiveTableReader,
  archiveTableKind,
  csvHeading,
  csvRows,
  jetTable,
  nightRows,
  nightTable,
  profileTable,
  readArchiveAbout,
  type ArchiveView,
  type FeedRows,
  type Table,
} from '../../../src/desk/index.ts';
import type { Station } from '../../../src/profile/index.ts';
import { screen } from '../../../src/quality/index.ts';
import { blockOf, PLAIN, QUESTION, type Made } from './support.ts';

const HOUR = 3_600_000;
// Mean noon at 100 W is 18:40 UTC.
const NOON = Date.UTC(2024, 4, 21, 18, 40);
const MADE: Made[] = Array.from({ length: 5 * 144 }, (_, k) => {
  const hours = (k / 6) % 24;
  const night = Math.floor(k / 144);
  return {
    timeMs: NOON + k * 600_000,
    jet: hours >= 9 && hours < 16 && night !== 3 ? 5 + 3 * night : 0,
    noseHeight: 300 + 30 * night,
    direction: 190 + 5 * night,
    // The last night cannot be judged at all, and now and then a profile is lost.
    lost: night === 4 || k % 17 === 5 ? Array.from({ length: 40 }, (_, level) => level) : [],
  };
});
const BLOCK = blockOf(MADE);
const ROWS = archiveRows(BLOCK, QUESTION)[0]!;
const PROFILES = profileTable(ROWS, QUESTION.discs);
const NIGHTS = nightTable(nightRows(ROWS), QUESTION.discs);
const ABOUT = { criteria: 'whiteman-1997', discs: QUESTION.discs.map(({ name }) => name) };

const cellsOf = (text: string): string[][] => Papa.parse<string[]>(text, { skipEmptyLines: true }).data;

function give(reader: ArchiveTableReader, table: Table, from = 0, to = Infinity): void {
  reader.begin(cellsOf(csvHeading(table))[0]!);
  reader.take(cellsOf(csvRows(table)).slice(from, to));
}

function readBack(...tables: Table[]): ArchiveView[] {
  const reader = new ArchiveTableReader();
  for (const table of tables) give(reader, table);
  expect(reader.broken).toBe(0);
  return reader.views(ABOUT);
}

function openView(): ArchiveView {
  const steps = archiveOf(screen(BLOCK).block, ROWS.feed, QUESTION);
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
    expect(step.value).toBeLessThan(1);
  }
}

describe('an archive out of open profiles and out of its tables', () => {
  it('says the same either way', () => {
    const [tables] = readBack(NIGHTS, PROFILES);
    const open = openView();
    expect(tables).toMatchObject({ key: 'plain/lidar', stationName: 'Plain', criteria: open.criteria });
    expect([tables!.discs, tables!.longitude]).toEqual([open.discs, open.longitude]);
    expect(tables!.figures).toHaveLength(4);
    tables!.figures.forEach((figures, least) => {
      const other = open.figures[least]!;
      for (const name of ['profiles', 'assessable', 'jets', 'nights', 'nightsWithJet', 'byMonthHour'] as const) {
        expect(figures[name], name).toEqual(other[name]);
      }
      expect(figures.noseSpeed.total).toBe(other.noseSpeed.total);
      expect(figures.onset.counts).toEqual(other.onset.counts);
      figures.discs.forEach((disc, i) => {
        const [written, known] = [disc.withoutJet, other.discs[i]!.withoutJet];
        expect(written.veer.total).toBe(known.veer.total);
        // Tables carry two decimals of a speed and four of an exponent.
        expect(written.equivalentSpeed.mean).toBeCloseTo(known.equivalentSpeed.mean, 2);
        expect(written.shearExponent.mean).toBeCloseTo(known.shearExponent.mean, 3);
      });
    });
    tables!.nights.forEach((night, k) => {
      const { files, sunsetMs, peakSpeed, ...rest } = night;
      const known = open.nights[k]!;
      expect(files).toEqual(['made.nc']);
      expect(rest).toMatchObject({
        night: known.night,
        jets: known.jets,
        onsetMs: known.onsetMs,
        category: known.category,
      });
      // Sun times are written to the second.
      expect(Math.abs(sunsetMs - known.sunsetMs)).toBeLessThanOrEqual(500);
      if (known.jets > 0) expect(peakSpeed).toBeCloseTo(known.peakSpeed, 2);
    });
  });

  it('counts per assessable profile: what is lost is no night without a jet', () => {
    const [all] = openView().figures;
    const lost = MADE.filter(({ lost = [] }) => lost.length > 0).length;
    expect([all!.profiles, all!.assessable]).toEqual([720, 720 - lost]);
    // Five nights, of which the last shows nothing and the fourth has no jet.
    expect([all!.nights, all!.nightsWithJet]).toEqual([4, 3]);
    // Twenty-two hours by the sun is ten after noon.
    const cell = 4 * 24 + 22;
    const shown = MADE.filter(({ timeMs, lost = [] }) => {
      const hours = ((timeMs - NOON) / HOUR) % 24;
      return hours >= 10 && hours < 11 && lost.length === 0;
    });
    expect(all!.byMonthHour.assessable[cell]).toBe(shown.length);
    expect(all!.byMonthHour.jets[cell]).toBe(shown.filter(({ jet }) => jet > 0).length);
  });

  it('counts by least category, weaker jets as none', () => {
    const { figures, nights } = openView();
    figures.forEach(({ jets, assessable, nightsWithJet }, least) => {
      expect(assessable).toBe(figures[0]!.assessable);
      expect(nightsWithJet).toBe(nights.filter(({ category }) => category >= least).length);
      if (least > 0) expect(jets).toBeLessThanOrEqual(figures[least - 1]!.jets);
    });
  });
});

describe('ArchiveTableReader', () => {
  it('counts a table that is given twice once, in any portions', () => {
    const reader = new ArchiveTableReader();
    give(reader, NIGHTS);
    give(reader, PROFILES, 0, 301);
    give(reader, PROFILES, 200);
    give(reader, NIGHTS);
    expect(reader.views(ABOUT)).toEqual(readBack(NIGHTS, PROFILES));
  });

  it('keeps feeds apart', () => {
    const hill: Station = { ...PLAIN, id: 'hill', name: 'Hill' };
    const other: FeedRows = archiveRows(blockOf(MADE.map((one) => ({ ...one, station: hill, jet: 0 }))), QUESTION)[0]!;
    const views = readBack(
      NIGHTS,
      PROFILES,
      nightTable(nightRows(other), QUESTION.discs),
      profileTable(other, QUESTION.discs),
    );
    expect(views.map(({ key, stationName, figures }) => [key, stationName, figures[0]!.nightsWithJet])).toEqual([
      ['hill/lidar', 'Hill', 0],
      ['plain/lidar', 'Plain', 3],
    ]);
  });

  it('tells nights without profiles, and profiles without nights by UTC', () => {
    const [nights] = readBack(NIGHTS);
    expect(nights!.figures[0]).toMatchObject({ profiles: 0, nights: 4, nightsWithJet: 3 });
    expect(nights!.nights[0]!.files).toEqual([]);
    const [profiles] = readBack(PROFILES);
    expect(profiles!.longitude).toBeNaN();
    expect(profiles!.stationName).toBe('plain');
    expect(profiles!.figures[0]!.byMonthHour.profiles[4 * 24 + 18]).toBe(5 * 6);
    expect(profiles!.nights).toEqual([]);
  });

  it('names turbine types by their columns where nothing else names them', () => {
    const reader = new ArchiveTableReader();
    give(reader, PROFILES);
    expect(reader.views(null)[0]).toMatchObject({ discs: ['north row', 'south row'], criteria: '' });
  });

  it('leaves out rows that are cut short or tell no time, and counts them', () => {
    const reader = new ArchiveTableReader();
    give(reader, PROFILES, 0, 10);
    const [whole] = cellsOf(csvRows(PROFILES));
    const time = cellsOf(csvHeading(PROFILES))[0]!.indexOf('time');
    reader.take([whole!.slice(0, 5), whole!.map((cell, k) => (k === time ? 'soon' : cell))]);
    expect(reader.broken).toBe(2);
    expect(reader.views(null)[0]!.figures[0]!.profiles).toBe(10);
  });

  it('takes values as a Parquet file holds them', () => {
    const reader = new ArchiveTableReader();
    const columns = PROFILES.columns.map(({ name }) => name);
    reader.begin(columns);
    reader.take(
      Array.from({ length: PROFILES.rowCount }, (_, row) =>
        PROFILES.columns.map(({ kind, values }) => {
          const value = values[row]!;
          if (typeof value === 'string') return value;
          if (Number.isNaN(value)) return null;
          return kind === 'time' ? new Date(value) : kind === 'yes-no' ? value === 1 : value;
        }),
      ),
    );
    const [parquet] = reader.views(ABOUT);
    const [csv] = readBack(PROFILES);
    expect(parquet!.figures[0]!.byMonthHour).toEqual(csv!.figures[0]!.byMonthHour);
    expect(parquet!.figures[2]!.jets).toBe(csv!.figures[2]!.jets);
    expect(parquet!.figures[0]!.discs[0]!.withJet.veer.total).toBe(csv!.figures[0]!.discs[0]!.withJet.veer.total);
  });
});

describe('archiveTableKind', () => {
  const columnsOf = (table: Table): string[] => table.columns.map(({ name }) => name);

  it('knows the tables of a scan by their columns', () => {
    expect(archiveTableKind(columnsOf(PROFILES))).toBe('profiles');
    expect(archiveTableKind(columnsOf(NIGHTS))).toBe('nights');
    expect(archiveTableKind(columnsOf(jetTable(ROWS, QUESTION.discs)))).toBe('other');
    expect(archiveTableKind(['file', 'place', 'code', 'what', 'mend', 'unread'])).toBe('other');
  });

  it('takes no table of profiles for one of its own', () => {
    expect(archiveTableKind(['station', 'time', 'height_agl_m', 'speed_mps', 'direction_deg'])).toBeNull();
    expect(archiveTableKind([])).toBeNull();
  });
});

describe('readArchiveAbout', () => {
  it('reads what the scan says of its tables', () => {
    const text = JSON.stringify({
      criteria: { name: 'duskveer' },
      turbines: [{ name: 'North row' }],
      tables: { profiles: [] },
    });
    expect(readArchiveAbout(text)).toEqual({ criteria: 'duskveer', discs: ['North row'] });
  });

  it.each(['', '{', '[]', '{"stations":[]}', '{"tables":{"profiles":[]},"criteria":{"name":3}}', 'null'])(
    'makes nothing of %j',
    (text) => expect(readArchiveAbout(text)).toBeNull(),
  );
});
