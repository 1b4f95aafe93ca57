// Small profiles for the tests of the rooms that compute from them.

import {
  BlockBuilder,
  profileAt,
  unplacedStation,
  type LevelInput,
  type Profile,
  type Station,
} from '../../src/profile/index.ts';

/** A profile of these levels. */
export function profileOf(levels: LevelInput, station: Station = unplacedStation('here')): Profile {
  const builder = new BlockBuilder();
  builder.add({ station, source: 'test', timeMs: 0, levels });
  return profileAt(builder.finish(), 0);
}
