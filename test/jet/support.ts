// Profiles for the jet tests.

import {
  BlockBuilder,
  profileAt,
  unplacedStation,
  type Instrument,
  type LevelInput,
  type Profile,
} from '../../src/profile/index.ts';

/** One profile of these levels, invented station, at this time. */
export function profileOf(levels: LevelInput, timeMs = 0, instrument: Instrument = 'unknown'): Profile {
  const builder = new BlockBuilder();
  builder.add({ station: unplacedStation('testing'), source: 'test', instrument, timeMs, levels });
  return profileAt(builder.finish(), 0);
}
