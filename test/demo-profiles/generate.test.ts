import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { demoFiles } from '../../demo-profiles/generate.ts';
import { bytesSource, readOutputSeries, readProfiles } from '../../src/ingest/index.ts';
import { readSite, siteStation } from '../../src/site/index.ts';

const folder = fileURLToPath(new URL('../../demo-profiles/', import.meta.url));
const WRITTEN_BY_HAND = /^(README\.md|generate\.ts|write\.mjs|making(\/.*)?)$/;
const made = demoFiles();

describe('the demo', () => {
  it.each([...made.keys()])('%s lies there as the generator makes it', (path) => {
    const committed = readFileSync(join(folder, path));
    expect(Buffer.compare(committed, made.get(path)!), `${path}: run npm run demo`).toBe(0);
  });

  it('holds nothing that the generator does not make', () => {
    const there = readdirSync(folder, { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile())
      .map((entry) => join(entry.parentPath, entry.name).slice(folder.length).replaceAll('\\', '/'))
      .filter((path) => !WRITTEN_BY_HAND.test(path));
    expect(there.sort()).toEqual([...made.keys()].sort());
  });

  it('is small enough to live in the checkout', () => {
    const bytes = [...made.values()].reduce((sum, file) => sum + file.length, 0);
    expect(bytes).toBeLessThan(2e6);
  });

  interface Manifest {
    readonly opens: string;
    readonly nights: { id: string; site: string; files: string[]; outputs?: string[]; now: string }[];
  }
  const text = (path: string): string => new TextDecoder().decode(made.get(path));
  const manifest = JSON.parse(text('manifest.json')) as Manifest;

  it('opens at a night that is there', () => {
    expect(manifest.nights.map((night) => night.id)).toContain(manifest.opens);
  });

  it.each(manifest.nights)('$id: the site file and every file of profiles read without a problem', async (night) => {
    const { site, problems } = readSite(text(night.site), night.site);
    expect(problems).toEqual([]);
    for (const path of night.files) {
      let profiles = 0;
      for await (const reading of readProfiles(bytesSource(path, made.get(path)!), { site: site! })) {
        expect(reading.problems, path).toEqual([]);
        profiles += reading.block.profileCount;
        for (const station of reading.block.stations) expect(siteStation(site!, station.id), path).toBeDefined();
      }
      expect(profiles, path).toBeGreaterThan(0);
    }
    for (const path of night.outputs ?? []) {
      const { timeMs, powerKw, problems, notes } = readOutputSeries(path, text(path));
      expect([...problems, ...notes], path).toEqual([]);
      expect(timeMs.length, path).toBeGreaterThan(100);
      expect(Math.max(...powerKw), path).toBeGreaterThan(10_000);
    }
    expect(Date.parse(night.now)).not.toBeNaN();
  });
});
