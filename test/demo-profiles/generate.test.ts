import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { demoFiles } from '../../demo-profiles/generate.ts';

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

  it('names only files that exist', () => {
    interface Manifest {
      readonly opens: string;
      readonly nights: { id: string; site: string; files: string[]; now: string }[];
    }
    const manifest = JSON.parse(new TextDecoder().decode(made.get('manifest.json'))) as Manifest;
    expect(manifest.nights.map((night) => night.id)).toContain(manifest.opens);
    for (const night of manifest.nights) {
      for (const path of [night.site, ...night.files]) expect(made.has(path), path).toBe(true);
      expect(Date.parse(night.now)).not.toBeNaN();
    }
  });
});
