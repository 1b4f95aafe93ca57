// Which screens the profiles pass before anything is computed from them.

import type { ProfileBlock } from '../profile/index.ts';
import { screen, SCREENS } from '../quality/index.ts';
import type { Site } from '../site/index.ts';
import { UsageError } from './command.ts';

export const SCREENS_OPTION = { screens: { type: 'string' } } as const;

/** For the help of commands that screen. */
export const SCREENS_HELP = `  --screens all      leaves out levels that any screen rejects: what does not fit its neighbours in time and height too
  --screens gross    leaves out only what the source rejects and what the atmosphere cannot have`;

export type Screening = 'all' | 'gross';

const GROSS = { without: SCREENS.map(({ name }) => name).filter((name) => name !== 'gross-limits') };

/**
 * The screening asked for.
 * @param usual where nothing is asked
 * @throws UsageError when it is neither of the two
 */
export function screener(
  site: Site,
  asked: string | undefined,
  usual: Screening = 'all',
): (block: ProfileBlock) => ProfileBlock {
  const screening = asked ?? usual;
  if (screening !== 'all' && screening !== 'gross')
    throw new UsageError(`--screens is all or gross, not "${screening}".`);
  const context = screening === 'all' ? { site } : { site, ...GROSS };
  return (block) => screen(block, context).block;
}
