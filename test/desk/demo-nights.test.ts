// The demo nights as the page opens them: the kind of jet that their README tells of.

import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { Desk } from '../../src/desk/index.ts';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { readSite } from '../../src/site/index.ts';

interface Manifest {
  readonly nights: readonly { id: string; site: string; files: readonly string[]; now: string }[];
}

const folder = join(import.meta.dirname, '../../demo-profiles');
const manifest = JSON.parse(readFileSync(join(folder, 'manifest.json'), 'utf8')) as Manifest;

async function openDemo(id: string): Promise<{ desk: Desk; nowMs: number }> {
  const night = manifest.nights.find((each) => each.id === id)!;
  const { site } = readSite(readFileSync(join(folder, night.site), 'utf8'), night.site);
  const desk = new Desk(site!);
  for (const name of night.files) {
    const source = bytesSource(name, readFileSync(join(folder, name)));
    for await (const { block } of readProfiles(source, { site: site! })) desk.accept(block);
  }
  return { desk, nowMs: Date.parse(night.now) };
}

describe('the demo nights at their moment', () => {
  it.each([
    ['plains', 'larkmoor-lidar', 'nocturnal'],
    ['barrier', 'garrow-profiler', 'barrier'],
    ['valley', 'quill-lidar', 'valley-exit'],
    ['storm', 'ashwillow', 'nocturnal'],
  ])('%s: %s sees a %s jet', async (id, station, kind) => {
    const { desk, nowMs } = await openDemo(id);
    const feed = desk.feeds().find((each) => each.station.id === station)!;
    const night = desk.night(nowMs, { feed: feed.key })!;
    const lasting = night.stories.filter(({ track }) => track.endedMs === null);
    expect(lasting.map((story) => story.kind)).toEqual([kind]);
  });
});
