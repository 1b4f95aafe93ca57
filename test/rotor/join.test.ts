import { describe, expect, it } from 'vitest';
import {
  BlockBuilder,
  profilesOf,
  unplacedStation,
  type Instrument,
  type LevelInput,
  type Profile,
} from '../../src/profile/index.ts';
import { joinProfiles, measureDisagreement, pairInTime, windOnDisc } from '../../src/rotor/index.ts';
import { sharedIsHere } from '../support/shared.ts';
import { nightLevels, type NightSource } from './support.ts';

const station = unplacedStation('site');
const series = (instrument: Instrument, times: readonly { timeMs: number; levels: LevelInput }[]): Profile[] => {
  const builder = new BlockBuilder();
  for (const { timeMs, levels } of times) builder.add({ station, source: instrument, instrument, timeMs, levels });
  return [...profilesOf(builder.finish())];
};
const MAST = [20, 40, 60, 80, 100, 120];
const LIDAR = Array.from({ length: 20 }, (_, k) => 50 + 25 * k);
const night = (offset: (k: number) => number) =>
  Array.from({ length: 20 }, (_, k) => ({
    mast: { heightAgl: MAST, speed: MAST.map((z) => 6 + z / 40), direction: MAST.map(() => 350 + (k % 5)) },
    lidar: {
      heightAgl: LIDAR,
      speed: LIDAR.map((z) => 6 + z / 40),
      direction: LIDAR.map(() => (350 + (k % 5) + offset(k)) % 360),
    },
  }));
const both = (offset: (k: number) => number): { mast: Profile[]; lidar: Profile[] } => ({
  mast: series(
    'mast',
    night(offset).map(({ mast }, k) => ({ timeMs: k * 600_000, levels: mast })),
  ),
  lidar: series(
    'lidar',
    night(offset).map(({ lidar }, k) => ({ timeMs: k * 600_000 + 60_000, levels: lidar })),
  ),
});

describe('measureDisagreement', () => {
  it('finds a steady offset through north', () => {
    const { mast, lidar } = both(() => 12);
    const found = measureDisagreement(pairInTime(mast, lidar, 120_000));
    expect(found).toMatchObject({ times: 20, bottom: 50, top: 125, steadyDirection: true, steadySpeed: false });
    expect(found.direction).toBeCloseTo(12, 4);
    expect(found.beyondUncertainty).toBe(true);
    expect(found.byHeight.map((at) => at.height)).toEqual([50, 75, 100, 125]);
  });

  it('calls a scatter to both sides no offset', () => {
    const { mast, lidar } = both((k) => (k % 2 === 0 ? 12 : -12));
    expect(measureDisagreement(pairInTime(mast, lidar, 120_000)).steadyDirection).toBe(false);
  });

  it('calls nothing steady after a few times', () => {
    const { mast, lidar } = both(() => 12);
    expect(measureDisagreement(pairInTime(mast, lidar, 120_000).slice(0, 5)).steadyDirection).toBe(false);
  });

  it('has nothing to compare where clocks are apart or heights do not meet', () => {
    const { mast, lidar } = both(() => 12);
    expect(pairInTime(mast, lidar, 30_000)).toHaveLength(0);
    expect(measureDisagreement([]).times).toBe(0);
    expect(measureDisagreement([]).steadyDirection).toBe(false);
  });
});

describe('joinProfiles', () => {
  it('lets the better one win by height, keeps clear of its end, and shows the join', () => {
    const { mast, lidar } = both(() => 0);
    const { profile, joins, levels } = joinProfiles([lidar[0]!, mast[0]!]);
    // 125 m lies within half a lidar gate of the mast's top.
    expect([...profile.heightAgl]).toEqual([...MAST, ...LIDAR.filter((z) => z > 132.5)]);
    expect(levels.filter((level) => level.profile === mast[0])).toHaveLength(MAST.length);
    expect(joins).toHaveLength(1);
    expect(joins[0]).toMatchObject({ height: 135, below: 'mast', above: 'lidar', turned: 0 });
    expect(profile.instrument).toBe('merged');
    expect(profile.notes).toContain('mast up to 120 m, lidar above');
  });

  it('does not read a steady disagreement as veer', () => {
    const { mast, lidar } = both(() => 12);
    const known = measureDisagreement(pairInTime(mast, lidar, 120_000));
    const disc = { hubHeight: 120, rotorDiameter: 150 };
    const plain = windOnDisc(joinProfiles([mast[3]!, lidar[3]!]).profile, disc);
    expect(plain.veer).toBeCloseTo(12, 3);
    const joined = joinProfiles([mast[3]!, lidar[3]!], { disagreement: () => known });
    expect(windOnDisc(joined.profile, disc).veer).toBeCloseTo(0, 3);
    expect(joined.joins[0]!.turned).toBeCloseTo(-12, 4);
    expect(joined.joins[0]!.words).toContain('directions differ by +12.0°');
    expect(joined.joins[0]!.words).toContain('not read as veer');
  });

  it('fills holes of the better one from the worse one and keeps temperature that has no wind', () => {
    const [mast] = series('mast', [{ timeMs: 0, levels: { heightAgl: [20, 400], speed: [5, 9], direction: [0, 0] } }]);
    const [sodar] = series('sodar', [
      {
        timeMs: 0,
        levels: {
          heightAgl: [2, 100, 200, 300],
          speed: [NaN, 6, 7, 8],
          direction: [NaN, 0, 0, 0],
          temperature: [280, 281, 282, 283],
        },
      },
    ]);
    const { profile } = joinProfiles([mast!, sodar!]);
    expect([...profile.heightAgl]).toEqual([2, 20, 100, 200, 300, 400]);
    expect([...profile.temperature!]).toEqual([280, NaN, 281, 282, 283, NaN]);
  });

  it('leaves a lone profile as it is and refuses none', () => {
    const { mast } = both(() => 0);
    expect(joinProfiles([mast[0]!]).profile).toBe(mast[0]);
    expect(() => joinProfiles([])).toThrow('no profile to join');
  });
});

describe.skipIf(!sharedIsHere)('the real night: mast and radar', () => {
  const read = (wanted: NightSource, instrument: Instrument): Profile[] =>
    series(
      instrument,
      [...nightLevels([wanted])].map(([time, levels]) => ({
        timeMs: Date.parse(`${time.replace(' ', 'T')}Z`),
        levels,
      })),
    );

  it('finds the radar 9 to 11 degrees beyond the mast at 150 to 200 m, steadily, and joins without that turn', () => {
    const mast = read('tower', 'mast');
    const low = read('low-mode', 'radar');
    const high = read('high-mode', 'radar');
    const mastLow = measureDisagreement(pairInTime(mast, low, 1000));
    const [at151, at206] = mastLow.byHeight;
    expect(at151).toMatchObject({ height: 151, count: 111 });
    expect(at206).toMatchObject({ height: 206, count: 99 });
    // The data's own note: 10.8 degrees at 151 m (there against the mast at 158.2 m, here against the mast interpolated).
    expect(Math.abs(at151!.direction - 10.8)).toBeLessThan(0.5);
    expect(Math.abs(at206!.direction - 8.7)).toBeLessThan(0.1);
    expect(mastLow.steadyDirection).toBe(true);
    expect(mastLow.steadySpeed).toBe(false);

    const lowHigh = measureDisagreement(pairInTime(low, high, 1000));
    expect(Math.abs(lowHigh.speed)).toBeLessThan(0.6);
    const known = new Map([
      [low, mastLow],
      [high, lowHigh],
    ]);
    const timeMs = Date.UTC(2013, 10, 8, 12);
    const parts = [mast, low, high].map((profiles) => profiles.find((profile) => profile.timeMs === timeMs)!);
    const joined = joinProfiles(parts, {
      disagreement: (better, worse) => {
        if (better === parts[0] && worse === parts[1]) return known.get(low);
        return better === parts[1] && worse === parts[2] ? known.get(high) : undefined;
      },
    });
    expect(joined.joins[0]).toMatchObject({ below: 'mast', above: 'radar' });
    expect(joined.joins[0]!.turned).toBeCloseTo(-mastLow.direction, 9);
    expect(joined.profile.heightAgl.filter((z) => z > 196 && z < 240)).toHaveLength(1);
    // A disc across the join: the turn from 150 to 260 m without the instruments' own difference of some ten degrees.
    const disc = { hubHeight: 205, rotorDiameter: 110 };
    const raw = windOnDisc(joinProfiles(parts).profile, disc).veer;
    expect(raw - windOnDisc(joined.profile, disc).veer).toBeCloseTo(mastLow.direction, 0);
  });
});
