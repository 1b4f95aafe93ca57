import { describe, expect, it } from 'vitest';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { profilesOf, type Profile } from '../../src/profile/index.ts';
import { joinProfiles, windOnDisc } from '../../src/rotor/index.ts';

async function read(heading: string, rows: readonly string[]): Promise<Profile> {
  const text = [heading, ...rows].join('\n');
  for await (const { block } of readProfiles(bytesSource('mast.csv', new TextEncoder().encode(text)))) {
    for (const profile of profilesOf(block)) return profile;
  }
  throw new Error('no profile');
}

const disc = { hubHeight: 100, rotorDiameter: 100 };
const T = '2024-01-01T00:00:00Z';

describe('turbulence and gust at the hub', () => {
  it('are those of the level nearest to the hub that measures them', async () => {
    const profile = await read('time,height_m,speed_mps,direction_deg,speed_std_mps,gust_mps', [
      `${T},40,8,270,1.6,13`,
      `${T},80,10,270,1,14`,
      `${T},120,12,270,,15`,
      `${T},160,13,270,,`,
    ]);
    const wind = windOnDisc(profile, disc);
    // 1 of 10 m/s at 80 m; the gust at 120 m is as near as that at 80 m.
    expect(wind.turbulence).toBeCloseTo(0.1, 6);
    expect([14, 15]).toContain(wind.gust);
    const joined = windOnDisc(joinProfiles([profile, profile]).profile, disc);
    expect(joined.turbulence).toBeCloseTo(0.1, 6);
  });

  it('are read from columns of one height each, in knots too', async () => {
    const profile = await read('time,ws_60m (kt),wd_60m,ws_std_60m (kt),ws_90m (kt),wd_90m,wind_gust_90m (kt),ti_90m', [
      `${T},10,200,1,12,200,20,0.1`,
    ]);
    expect(profile.speedDeviation![0]).toBeCloseTo(0.514444, 5);
    expect(profile.gust![1]).toBeCloseTo(10.28889, 4);
    expect(profile.speedDeviation![1]).toBeNaN();
  });

  it('are not known where nothing near the hub tells, nor out of other deviations', async () => {
    const profile = await read('time,height_m,speed_mps,direction_deg,direction_std_deg,temperature_std_c', [
      `${T},40,8,270,3,0.1`,
      `${T},100,9,270,3,0.1`,
      `${T},160,10,270,3,0.1`,
    ]);
    expect([profile.speedDeviation, profile.gust]).toEqual([null, null]);
    const { turbulence, gust } = windOnDisc(profile, disc);
    expect([turbulence, gust]).toEqual([NaN, NaN]);
  });
});
