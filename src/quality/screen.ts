// The one entry to the screens: a block in, the same block with a new mark column out, and what each feed lost to what.

import { PLAIN_SITE, type Site } from '../site/index.ts';
import type { ProfileBlock } from '../profile/index.ts';
import { grossLimits } from './gross-limits.ts';
import { tallyFeeds, type FeedScreening } from './tally.ts';

export interface ScreenContext {
  readonly site: Site;
  /** Screens to leave out, by name. */
  readonly without: readonly ScreenName[];
}

export interface ScreenReport {
  /** The block given, sharing all its columns but the marks, which are new. Profiles keep their order and index. */
  readonly block: ProfileBlock;
  /** What was lost to which cause, a record for each source, station and instrument, in order of their names. */
  readonly feeds: readonly FeedScreening[];
}

export type ScreenName = 'gross-limits';

/** A screen reads the block and the marks set so far and adds bits; it never takes one away. */
export interface Screen {
  readonly name: ScreenName;
  /** What it does, for people. */
  readonly words: string;
  /** The published idea it follows, or that it is common practice. */
  readonly source: string;
  readonly apply: (block: ProfileBlock, marks: Uint32Array, context: ScreenContext) => void;
}

/** All screens in the order they run: a later one passes over what an earlier one has rejected. */
export const SCREENS: readonly Screen[] = [
  {
    name: 'gross-limits',
    words: 'rejects values that the atmosphere cannot have',
    source: 'common practice, without source',
    apply: grossLimits,
  },
];

/**
 * Runs the screens over all profiles of a block, which may hold several stations, instruments and feeds, in any order.
 * The marks of a profile depend on which profiles are in the block, not on their order. Marks that readers set stay. Give
 * the raw block each time: screening a screened block again may mark more.
 */
export function screen(block: ProfileBlock, context: Partial<ScreenContext> = {}): ScreenReport {
  const full: ScreenContext = { site: PLAIN_SITE, without: [], ...context };
  const marks = block.mark.slice();
  for (const { name, apply } of SCREENS) if (!full.without.includes(name)) apply(block, marks, full);
  const screened = { ...block, mark: marks };
  return { block: screened, feeds: tallyFeeds(screened) };
}
