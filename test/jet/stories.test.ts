// The invented nights of the demo, from file to sentence.

import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { CRITERIA, findJets, storyOf, trackJets, type JetStory } from '../../src/jet/index.ts';
import { profilesOf, type Profile } from '../../src/profile/index.ts';
import { screen } from '../../src/quality/index.ts';
import { readSite, type Site } from '../../src/site/index.ts';

const HOUR_MS = 3600_000;
const demo = join(import.meta.dirname, '../../demo-profiles');

async function readNight(name: string): Promise<{ site: Site; profiles: Profile[] }> {
  const folder = join(demo, name);
  const { site } = readSite(readFileSync(join(folder, 'site.json'), 'utf8'), 'site.json');
  const profiles: Profile[] = [];
  for (const file of readdirSync(folder).filter((one) => one !== 'site.json')) {
    const source = bytesSource(file, readFileSync(join(folder, file)));
    for await (const { block } of readProfiles(source, { site: site! })) {
      profiles.push(...profilesOf(screen(block, { site: site! }).block));
    }
  }
  return { site: site!, profiles: profiles.sort((a, b) => a.timeMs - b.timeMs) };
}

/** Stories of one station as known at a moment, times on the site's clock. */
function storiesOf(night: { site: Site; profiles: Profile[] }, id: string, offsetH: number, untilMs = Infinity) {
  const seen = night.profiles.filter(({ timeMs }) => timeMs <= untilMs);
  const profiles = seen.filter(({ station, instrument }) => station.id === id && instrument !== 'mast');
  const { station } = profiles[0]!;
  const findings = profiles.map((profile) => ({
    stationId: id,
    timeMs: profile.timeMs,
    finding: findJets(profile, CRITERIA.duskveer),
  }));
  const setting = {
    station,
    profiles,
    findings,
    axes: night.site.terrainAxes.filter(({ stations }) => stations.includes(id)),
    undisturbed: seen.filter(({ instrument }) => instrument === 'radiosonde'),
    discs: night.site.turbines,
    geostrophicSpeed: NaN,
  };
  const time = (timeMs: number): string => new Date(timeMs + offsetH * HOUR_MS).toISOString().slice(11, 16);
  return trackJets(findings).map((track): JetStory => storyOf(track, setting, { time }));
}

describe.skipIf(!existsSync(demo))('stories of the demo nights', () => {
  const nights = new Map<string, Awaited<ReturnType<typeof readNight>>>();
  beforeAll(async () => {
    for (const name of ['plains', 'barrier', 'valley']) nights.set(name, await readNight(name));
  }, 60_000);

  it('tells a nocturnal jet over the plains that turns inertially', () => {
    // While the sinking air has not yet brought down the directions of other heights.
    const now = Date.UTC(2024, 4, 22, 7, 30);
    const [story, ...others] = storiesOf(nights.get('plains')!, 'larkmoor-lidar', -6, now);
    expect(others).toEqual([]);
    expect(story).toMatchObject({ kind: 'nocturnal' });
    expect(story!.track.endedMs).toBeNull();
    expect(story!.kinds.nocturnal).toBeGreaterThan(0.9);
    expect(story!.turning).toMatchObject({ status: 'told', verdict: 'inertial' });
    expect(story!.layer!.noseAgainstDiscs.length).toBeGreaterThan(0);
    expect(story!.words).toMatch(
      /^A nocturnal jet since 2[0-3]:\d\d: nose \d+ m, \d+ m\/s from \d+ degrees.* turning clockwise at the inertial rate\. /,
    );
  });

  it('tells a barrier jet about 45 % stronger than the undisturbed wind, with its evidence', () => {
    const [story, ...others] = storiesOf(nights.get('barrier')!, 'garrow-profiler', -8);
    expect(others).toEqual([]);
    expect(story!.kind).toBe('barrier');
    const value = (lookedAt: RegExp): number => story!.evidence.find((one) => lookedAt.test(one.lookedAt))!.value;
    expect(value(/strength/)).toBeGreaterThan(1.3);
    expect(value(/strength/)).toBeLessThan(1.6);
    expect(value(/Froude/)).toBeLessThan(1);
    expect(value(/crest/)).toBeLessThan(1);
    expect(story!.words).toMatch(/^A barrier jet from 1[89]:\d\d to 0[456]:\d\d: strongest .* It has ended\.$/);
  });

  it('tells a valley-exit jet in the southern hemisphere, within the rotors', () => {
    const now = Date.UTC(2024, 1, 9, 13, 20);
    const [story, ...others] = storiesOf(nights.get('valley')!, 'quill-lidar', 12, now);
    expect(others).toEqual([]);
    expect(story!.kind).toBe('valley-exit');
    expect(story!.kinds['valley-exit']).toBeGreaterThan(story!.kinds.nocturnal);
    expect(story!.words).toMatch(/^A valley-exit jet since 2[12]:\d\d: /);
    const noses = story!.track.points.map(({ noseHeight }) => noseHeight);
    expect(Math.min(...noses)).toBeGreaterThan(60);
    expect(Math.max(...noses)).toBeLessThan(200);
  });

  it('tells no jet in the calm night that follows', () => {
    const stories = storiesOf(nights.get('plains')!, 'larkmoor-lidar', -6);
    expect(stories.filter(({ track }) => track.points.at(-1)!.timeMs > Date.UTC(2024, 4, 22, 20))).toEqual([]);
  });
});
