import { describe, expect, it } from 'vitest';
import { nightOf } from '../../../src/air/index.ts';
import { archiveRows, NightGatherer, nightRows, nightTable, type FeedRows } from '../../../src/desk/index.ts';
import { unplacedStation, type Station } from '../../../src/profile/index.ts';
import { blockOf, PLAIN, QUESTION, type Made } from './support.ts';

const STEP = 600_000;
const HOUR = 3_600_000;
// Mean noon at 100 W is 18:40 UTC.
const NOON = Date.UTC(2024, 4, 21, 18, 40);

function rowsOf(made: readonly Made[]): FeedRows {
  return archiveRows(blockOf(made), QUESTION)[0]!;
}

/** Ten-minute profiles from noon on, with a jet where the test says so by hours after noon. */
function night(isJet: (hours: number) => boolean, station: Station = PLAIN, hours = 24): Made[] {
  return Array.from({ length: hours * 6 }, (_, k) => ({
    timeMs: NOON + k * STEP,
    jet: isJet(k / 6) ? 10 + k / 100 : 0,
    station,
  }));
}

describe('nightRows', () => {
  it('counts a night from noon to noon and its dark part by the sun', () => {
    const [row, ...more] = nightRows(rowsOf(night((hours) => hours >= 9 && hours < 15)));
    const sun = nightOf(NOON + 12 * HOUR, PLAIN.latitude, PLAIN.longitude);
    const dark = Array.from({ length: 144 }, (_, k) => NOON + k * STEP).filter(
      (timeMs) => timeMs >= sun.sunsetMs && timeMs <= sun.sunriseMs,
    ).length;
    expect(more).toHaveLength(0);
    expect(row).toMatchObject({ night: '2024-05-21', kind: 'night', profiles: 144, assessable: 144, jets: 36 });
    expect(row).toMatchObject({ sunsetMs: sun.sunsetMs, sunriseMs: sun.sunriseMs, darkProfiles: dark, darkJets: 36 });
    expect(row).toMatchObject({ firstJetMs: NOON + 9 * HOUR, onsetMs: NOON + 9 * HOUR });
    expect(row).toMatchObject({ lastJetMs: NOON + 15 * HOUR - STEP, endMs: NOON + 15 * HOUR - STEP });
    expect(row).toMatchObject({ peakMs: NOON + 15 * HOUR - STEP, peakHeight: 300 });
    expect(row!.discs[0]!.withJet.profiles).toBe(36);
    expect(row!.discs[0]!.withoutJet.profiles).toBe(dark - 36);
    expect(row!.discs[0]!.withJet.equivalentSpeed).toBeGreaterThan(row!.discs[0]!.withoutJet.equivalentSpeed);
  });

  it('takes a lone jet for first and last, but for no onset', () => {
    // So far apart that no screen holds them against each other.
    const made = Array.from({ length: 18 }, (_, k) => ({
      timeMs: NOON + k * 80 * 60_000,
      jet: [6, 10, 11].includes(k) ? 12 : 0,
    }));
    const [row] = nightRows(rowsOf(made));
    expect(row).toMatchObject({ jets: 3, firstJetMs: NOON + 8 * HOUR });
    expect(row!.onsetMs).toBeNaN();
    expect(row!.endMs).toBeNaN();
  });

  it('breaks a run at a silence of more than two hours', () => {
    const made = [9, 9.5, 12, 12.5].map((hours) => ({ timeMs: NOON + hours * HOUR, jet: 12 }));
    expect(nightRows(rowsOf(made))[0]!.onsetMs).toBeNaN();
    const closer = [9, 9.5, 11, 12.5].map((hours) => ({ timeMs: NOON + hours * HOUR, jet: 12 }));
    expect(nightRows(rowsOf(closer))[0]!).toMatchObject({ onsetMs: NOON + 9 * HOUR, endMs: NOON + 12.5 * HOUR });
  });

  it('says of a night without an assessable profile how many there were, and no more', () => {
    const lost = Array.from({ length: 40 }, (_, level) => level);
    const [row] = nightRows(rowsOf(night(() => true).map((one) => ({ ...one, lost }))));
    expect(row).toMatchObject({ profiles: 144, assessable: 0, jets: 0, category: -1 });
    expect(row!.firstJetMs).toBeNaN();
    expect(row!.discs[0]!.withoutJet.equivalentSpeed).toBeNaN();
  });

  it('counts by UTC and calls the sun unknown where the station has no position', () => {
    const nights = nightRows(rowsOf(night((hours) => hours < 12, unplacedStation('nowhere'))));
    expect(nights.map(({ night: date, kind, profiles }) => [date, kind, profiles])).toEqual([
      ['2024-05-21', 'unknown', 104],
      ['2024-05-22', 'unknown', 40],
    ]);
    expect(nights[0]).toMatchObject({ darkProfiles: 104, darkJets: 72 });
    expect(nights[0]!.sunsetMs).toBeNaN();
  });

  it('knows polar day and night, pole and equator', () => {
    const at = (latitude: number): Station => ({ ...PLAIN, latitude });
    const kind = (latitude: number): unknown[] => {
      const { kind, darkProfiles } = nightRows(rowsOf(night(() => true, at(latitude))))[0]!;
      return [kind, darkProfiles];
    };
    expect(kind(90)).toEqual(['polar-day', 0]);
    expect(kind(-90)).toEqual(['polar-night', 144]);
    expect(kind(0)[0]).toBe('night');
  });

  it('comes to the same in portions', () => {
    const made = night((hours) => hours % 24 > 8 && hours % 24 < 14, PLAIN, 72);
    const whole = nightRows(rowsOf(made));
    expect(whole).toHaveLength(3);
    const gatherer = new NightGatherer(rowsOf(made).feed);
    const nights = [0, 100, 101, 200, 300, 432].flatMap((from, k, all) =>
      k + 1 < all.length ? gatherer.add(rowsOf(made.slice(from, all[k + 1]))) : gatherer.finish(),
    );
    expect(nights).toEqual(whole);
  });

  it('writes hours after sunset and before sunrise into the table', () => {
    const nights = nightRows(rowsOf(night((hours) => hours >= 9 && hours < 15)));
    const { columns } = nightTable(nights, QUESTION.discs);
    const value = (name: string): unknown => columns.find((column) => column.name === name)!.values[0];
    expect(value('first_jet_after_sunset_h')).toBeCloseTo((NOON + 9 * HOUR - nights[0]!.sunsetMs) / HOUR, 9);
    expect(value('last_jet_after_sunrise_h')).toBeLessThan(0);
    expect(value('north_row_with_jet_profiles')).toBe(36);
    expect(new Set(columns.map(({ name }) => name)).size).toBe(columns.length);
  });
});
