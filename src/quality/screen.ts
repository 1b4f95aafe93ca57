// The one entry to the screens: a block in, the same block with a new mark column out, and what each feed lost to what.

import { PLAIN_SITE, type Site } from '../site/index.ts';
import type { ProfileBlock } from '../profile/index.ts';
import { clockJumps } from './clock.ts';
import { clutter } from './clutter.ts';
import { duplicates } from './duplicates.ts';
import { grossLimits } from './gross-limits.ts';
import { migrants } from './migrants.ts';
import { timeContinuity } from './time-continuity.ts';
import { verticalContinuity } from './vertical-continuity.ts';
import { pendulum } from './pendulum.ts';
import { precipitation } from './precipitation.ts';
import { seriesOf, type Screened } from './series.ts';
import { weakSignal } from './signal.ts';
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

export type ScreenName =
  | 'gross-limits'
  | 'duplicates'
  | 'clock'
  | 'signal'
  | 'clutter'
  | 'precipitation'
  | 'pendulum'
  | 'time-continuity'
  | 'vertical-continuity'
  | 'migrants';

/** A screen reads the block and the marks set so far and adds bits; it never takes one away. */
export interface Screen {
  readonly name: ScreenName;
  /** What it does, for people. */
  readonly words: string;
  /** The published idea it follows, or that it is common practice. */
  readonly source: string;
  readonly apply: (screened: Screened, marks: Uint32Array) => void;
}

/** All screens in the order they run: a later one passes over what an earlier one has rejected. */
export const SCREENS: readonly Screen[] = [
  {
    name: 'gross-limits',
    words: 'rejects values that the atmosphere cannot have',
    source: 'common practice, without source',
    apply: grossLimits,
  },
  {
    name: 'duplicates',
    words: 'passes over profiles that came twice or were corrected later',
    source: 'common practice, without source',
    apply: duplicates,
  },
  {
    name: 'clock',
    words: 'doubts profiles off the beat at which their source reports',
    source: 'common practice, without source',
    apply: clockJumps,
  },
  {
    name: 'signal',
    words: 'rejects echoes as weak as those out of which the source took no wind, and averages without a consensus',
    source: 'common practice, without source',
    apply: weakSignal,
  },
  {
    name: 'clutter',
    words: 'rejects lowest gates that stand still or turn at random, profile after profile',
    source: 'common practice, without source',
    apply: clutter,
  },
  {
    name: 'precipitation',
    words: 'doubts layers that fall like rain or snow',
    source: 'fall speeds after Gunn & Kinzer 1949, J. Meteor. 6 (from memory)',
    apply: precipitation,
  },
  {
    name: 'pendulum',
    words: 'doubts layers in which a sonde swings or its balloon stalls',
    source: 'pendulum law; limits common practice, without source',
    apply: pendulum,
  },
  {
    name: 'time-continuity',
    words: 'rejects what contradicts the largest region of levels that agree in time and height',
    source: 'after the idea of Weber & Wuertz 1991, NOAA Tech. Memo. ERL WPL-206',
    apply: timeContinuity,
  },
  {
    name: 'vertical-continuity',
    words: 'rejects a level of a lone profile that stands out from those below and above',
    source: 'Brewster & Schlatter 1986 (from memory); limits common practice, without source',
    apply: verticalContinuity,
  },
  {
    name: 'migrants',
    words: 'doubts bands of a wind profiler in which gates err in one heading through a night of the birds’ passage',
    source: 'after Wilczak et al. 1995, J. Atmos. Oceanic Technol. 12 (from memory); limits our own',
    apply: migrants,
  },
];

/**
 * Runs the screens over all profiles of a block, which may hold several stations, instruments and feeds, in any order.
 * The marks of a profile depend on which profiles are in the block, not on their order. Marks that readers set stay. Give
 * the raw block each time: screening a screened block again may mark more.
 */
export function screen(block: ProfileBlock, context: Partial<ScreenContext> = {}): ScreenReport {
  const { site = PLAIN_SITE, without = [] } = context;
  const marks = block.mark.slice();
  const looked: Screened = { block, series: seriesOf(block), site };
  for (const { name, apply } of SCREENS) if (!without.includes(name)) apply(looked, marks);
  const screened = { ...block, mark: marks };
  return { block: screened, feeds: tallyFeeds(screened) };
}
