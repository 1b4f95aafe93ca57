import { describe, expect, it } from 'vitest';
import { AirSources } from '../../src/desk/index.ts';
import { BlockBuilder, profileAt, type ProfileBlock, type Station } from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../src/site/index.ts';

const HOUR = 3_600_000;
const NOW = Date.UTC(2031, 6, 15, 5);
const station = (id: string, latitude: number): Station => ({ id, name: id, latitude, longitude: 0, elevation: 300 });

function air(at: Station, ageH: number, heights: number[]): ProfileBlock {
  const builder = new BlockBuilder();
  builder.add({
    station: at,
    source: 'test',
    timeMs: NOW - ageH * HOUR,
    levels: { heightAgl: heights, speed: heights.map(() => 5), specificHumidity: heights.map(() => 0.01) },
  });
  return builder.finish();
}
const DEEP = [10, 1000, 3000, 9000];
const wind = profileAt(air(station('WIND', 40), 0, [100, 500]), 0);

function lenders(site: Site, ...blocks: ProfileBlock[]): string[] {
  const sources = new AirSources(site);
  for (const block of blocks) sources.gather(block);
  return sources.for(wind).map((profile) => profile.station.id);
}

describe('AirSources', () => {
  it('takes stations within 150 km, and others only where the site file names them', () => {
    const near = air(station('NEAR', 41), 1, DEEP);
    const far = air(station('FAR', 45), 1, DEEP);
    expect(lenders(PLAIN_SITE, near, far)).toEqual(['NEAR']);
    const named = { ...station('FAR', 45), instrument: 'radiosonde', aliases: [], speedUncertainty: NaN } as const;
    expect(lenders({ ...PLAIN_SITE, stations: [named] }, near, far)).toEqual(['NEAR', 'FAR']);
  });

  it('takes of each station the newest at or before the wind, in whatever order they came', () => {
    const sources = new AirSources(PLAIN_SITE);
    for (const ageH of [3, 1, -1, 2]) sources.gather(air(station('SON', 40), ageH, DEEP));
    expect(sources.for(wind).map(({ timeMs }) => timeMs)).toEqual([NOW - HOUR]);
  });

  it('leaves a mast aside where a sounding reaches far higher, unless that is too old', () => {
    const mast = air(station('MAST', 40), 0, [10, 100]);
    expect(lenders(PLAIN_SITE, mast, air(station('SON', 40), 5, DEEP))).toEqual(['SON']);
    expect(lenders(PLAIN_SITE, mast, air(station('SON', 40), 20, DEEP))).toContain('MAST');
    expect(lenders(PLAIN_SITE, mast)).toEqual(['MAST']);
  });

  it('takes what is near before what is newer but further away', () => {
    const sources = new AirSources(PLAIN_SITE);
    sources.gather(air(station('NEAR', 40.1), 5, DEEP));
    sources.gather(air(station('AWAY', 41), 0, DEEP));
    expect(sources.nearest(wind).map((profile) => profile.station.id)).toEqual(['NEAR']);
  });
});
