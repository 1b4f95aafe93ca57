// What stands under the cursor, in words: time, height, wind.

import { WindLookup } from '../../plot/index.ts';
import type { Picture } from '../state/picture.svelte.ts';
import type { Preferences } from '../state/preferences.svelte.ts';
import { directionText, heightText, speedText } from './numbers.ts';
import type { TimeWords } from './time.ts';

/** Levels this far off, m, still answer for the height under the cursor. */
const WITHIN = 150;

export function cursorWords(
  picture: Picture,
  winds: WindLookup | null,
  { units }: Preferences,
  times: TimeWords,
): string {
  const { cursor, profile } = picture;
  if (cursor === null) return 'Point at the picture to read it; drag over a part to zoom in, double-click to go back.';
  const place = `${times.clock(cursor.timeMs)} ${times.zoneWords}, ${heightText(cursor.height, units)} ${units.height}`;
  const near = profile === null ? null : (winds?.profileNear(profile.timeMs, 0) ?? null);
  const wind = near === null ? null : WindLookup.levelNear(near.block, near.index, cursor.height, WITHIN);
  if (wind === null) return `${place}: no measurement`;
  const level = `${heightText(wind.height, units)} ${units.height} at ${times.clock(wind.timeMs)}`;
  return `${place}: ${speedText(wind.speed, units)} ${units.speed} from ${directionText(wind.direction)}, measured at ${level}`;
}
