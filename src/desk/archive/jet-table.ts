// The archive's table of jets.

import { noseInDisc } from '../../rotor/index.ts';
import { nightsOfRows } from './night-number.ts';
import type { FeedRows } from './rows.ts';
import {
  BOUND,
  CATEGORY,
  CONFIDENCE,
  datesOf,
  discAtStation,
  discPrefixes,
  EVENING,
  feedColumns,
  knownCategories,
  type NamedDisc,
} from './table-parts.ts';
import { numberColumn, textColumn, timeColumn, wholeColumn, yesNoColumn, type Table } from './table.ts';

/** A row a jet. @param rows ascending in time */
export function jetTable(rows: FeedRows, discs: readonly NamedDisc[]): Table {
  const { feed, profiles, jets } = rows;
  const { number, dark } = nightsOfRows(profiles.timeMs, feed.station);
  const owner = Uint32Array.from({ length: jets.category.length });
  const rank = new Uint8Array(jets.category.length);
  for (let row = 0, at = 0; row < profiles.jetCount.length; row++) {
    for (let k = 0; k < profiles.jetCount[row]!; k++, at++) {
      owner[at] = row;
      rank[at] = k + 1;
    }
  }
  const prefixes = discPrefixes(discs);
  return {
    rowCount: owner.length,
    columns: [
      ...feedColumns(rows, owner.length),
      timeColumn(
        'time',
        'valid time of the profile',
        Float64Array.from(owner, (row) => profiles.timeMs[row]!),
      ),
      textColumn('night', EVENING, datesOf(Int32Array.from(owner, (row) => number[row]!))),
      yesNoColumn(
        'sun_down',
        'whether the sun is down; yes where its times are not known',
        owner.map((row) => dark[row]!),
      ),
      wholeColumn('rank', '1 for the strongest jet of the profile', rank),
      wholeColumn('category', CATEGORY, knownCategories(jets.category)),
      numberColumn('nose_height_agl_m', 'm 1', 'height of the nose above ground', jets.noseHeight),
      numberColumn('nose_speed_mps', 'm/s 2', 'speed at the nose', jets.noseSpeed),
      numberColumn('nose_direction_deg', 'degrees 1', 'direction the wind at the nose comes from', jets.noseDirection),
      numberColumn(
        'falloff_mps',
        'm/s 2',
        'nose speed less the minimum above, as the criteria define it',
        jets.falloff,
      ),
      yesNoColumn('falloff_is_bound', BOUND, jets.falloffIsBound),
      numberColumn('confidence', '3', CONFIDENCE, jets.confidence),
      ...discs.map((disc, i) =>
        yesNoColumn(
          `${prefixes[i]!}_nose_in_rotor`,
          `whether the nose lies between the tips of ${disc.name}`,
          Uint8Array.from(jets.noseHeight, (height) =>
            Number(noseInDisc(discAtStation(disc, feed.station.elevation), height)),
          ),
        ),
      ),
    ],
  };
}
