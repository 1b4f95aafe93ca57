// The screens on real data and on the simulated nights beside this checkout, against what is known of them.

import { describe, expect, it } from 'vitest';
import { bytesSource, readProfiles } from '../../src/ingest/index.ts';
import { MARK, REJECTING, type ProfileBlock } from '../../src/profile/index.ts';
import { screen } from '../../src/quality/index.ts';
import { readShared, sharedIsHere } from '../support/shared.ts';
import { readNight } from './nights.ts';

async function blocksOf(path: string): Promise<ProfileBlock[]> {
  const blocks: ProfileBlock[] = [];
  for await (const { block } of readProfiles(bytesSource(path, readShared(path)))) blocks.push(block);
  return blocks.filter((block) => block.profileCount > 0);
}

describe.skipIf(!sharedIsHere)('real data', () => {
  it('a lidar day: the two lowest gates are not wind and go, all others stay', async () => {
    const [raw] = await blocksOf('real/lidar-netcdf/doppler-lidar-wind.nc');
    const { block } = screen(raw!);
    let others = 0;
    for (let k = 0; k < block.mark.length; k++) {
      if (Number.isNaN(block.speed[k]!)) continue;
      const rejected = (block.mark[k]! & REJECTING) !== 0;
      if (block.heightAgl[k]! < 50) expect((block.mark[k]! & MARK.clutter) !== 0).toBe(true);
      else if (rejected) others++;
    }
    expect(others).toBeLessThanOrEqual(4);
  });

  it('a night of mast and radar merged loses one level in a hundred, not those on which the two differ', async () => {
    // Quality-controlled by its makers; mast and radar differ by 10 degrees where they meet (../shared/real/README.md).
    const [raw] = await blocksOf('real/night/combined_radar_data_qc.csv');
    const { mark } = screen(raw!).block;
    expect(mark).toHaveLength(3790);
    expect(mark.filter((bits) => (bits & REJECTING) !== 0).length).toBeLessThan(45);
  });

  it('soundings and PILOTs lose almost nothing', async () => {
    for (const path of [
      'bufr/temp-part1.bufr',
      'bufr/temp_hires.bufr',
      'bufr/pilo_91-part1.bufr',
      'bufr/IUSD40_OKLI.bufr',
    ]) {
      for (const raw of await blocksOf(`real/${path}`)) {
        const before = raw.mark.filter((bits) => (bits & REJECTING) !== 0).length;
        const after = screen(raw).block.mark.filter((bits) => (bits & REJECTING) !== 0).length;
        expect((after - before) / raw.mark.length, path).toBeLessThan(0.005);
      }
    }
  });
});

const BIRD_NIGHTS = ['006', '010', '015', '022', '030', '031', '057'];

/** A gate is bad when it is off by more, m/s; good when off by less. */
const BAD = 4;
const GOOD = 3;

function score(number: string): { caught: number; bad: number; lost: number; good: number } {
  const { block, error } = readNight(number);
  const { mark } = screen(block).block;
  const sum = { caught: 0, bad: 0, lost: 0, good: 0 };
  error.forEach((off, k) => {
    const rejected = (mark[k]! & REJECTING) !== 0;
    if (off > BAD) {
      sum.bad++;
      if (rejected) sum.caught++;
    } else if (off < GOOD) {
      sum.good++;
      if (rejected) sum.lost++;
    }
  });
  return sum;
}

describe.skipIf(!sharedIsHere)('simulated nights against the true wind', () => {
  it.each(BIRD_NIGHTS)('night %s: hours of birds', (number) => {
    const { caught, bad, lost, good } = score(number);
    expect(caught / bad).toBeGreaterThan(0.7);
    expect(lost / good).toBeLessThan(0.012);
  });

  it('all nights together', () => {
    const total = { caught: 0, bad: 0, lost: 0, good: 0 };
    for (let n = 1; n <= 60; n++) {
      const night = score(String(n).padStart(3, '0'));
      for (const key of Object.keys(total) as (keyof typeof total)[]) total[key] += night[key];
    }
    expect(total.caught / total.bad).toBeGreaterThan(0.9);
    expect(total.lost / total.good).toBeLessThan(0.001);
  });
});
