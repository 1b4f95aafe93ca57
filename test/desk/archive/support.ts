// Blocks of made profiles for the archive's tests: jets by a formula, with gaps and rejected levels here and there.

import { BlockBuilder, MARK, type ProfileBlock, type Station } from '../../../src/profile/index.ts';
import { CRITERIA } from '../../../src/jet/index.ts';
import { PLAIN_SITE } from '../../../src/site/index.ts';
import type { ArchiveQuestion } from '../../../src/desk/index.ts';

export const PLAIN: Station = { id: 'plain', name: 'Plain', latitude: 40, longitude: -100, elevation: 300 };

export const QUESTION: ArchiveQuestion = {
  site: PLAIN_SITE,
  criteria: CRITERIA['whiteman-1997'],
  discs: [
    { name: 'North row', hubHeight: 110, rotorDiameter: 130, groundElevation: NaN },
    { name: 'South row', hubHeight: 90, rotorDiameter: 100, groundElevation: 320 },
  ],
  source: 'made.nc',
};

export interface Made {
  readonly timeMs: number;
  readonly station?: Station;
  /** m/s that the nose stands out; 0 for no jet */
  readonly jet: number;
  readonly noseHeight?: number;
  readonly direction?: number;
  /** Levels to lose, by index. */
  readonly lost?: readonly number[];
  readonly levels?: number;
}

/** Heights 30, 60, … m; a plain 8 m/s with a nose on it. */
export function blockOf(made: readonly Made[]): ProfileBlock {
  const builder = new BlockBuilder();
  for (const { timeMs, station = PLAIN, jet, noseHeight = 300, direction = 200, lost = [], levels = 40 } of made) {
    const heightAgl = Array.from({ length: levels }, (_, k) => 30 + 30 * k);
    const speed = heightAgl.map((z, k) =>
      lost.includes(k) ? NaN : 8 + jet * Math.exp(-(((z - noseHeight) / 200) ** 2)) - z / 1000,
    );
    builder.add({
      station,
      source: 'made.nc',
      instrument: 'lidar',
      timeMs,
      levels: {
        heightAgl,
        speed,
        direction: heightAgl.map((z) => (direction + z / 50) % 360),
        mark: heightAgl.map((_, k) => (k === 7 && levels > 20 ? MARK['low-signal'] : 0)),
      },
    });
  }
  return builder.finish();
}
