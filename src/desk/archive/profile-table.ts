// The archive's table of profiles.

import { nightsOfRows } from './night-number.ts';
import { jetOffsets, STATUSES, type DiscColumns, type FeedRows } from './rows.ts';
import {
  BOUND,
  CATEGORY,
  CONFIDENCE,
  datesOf,
  discPrefixes,
  EVENING,
  feedColumns,
  IEC,
  knownCategories,
  type NamedDisc,
} from './table-parts.ts';
import { TRANSPORT_COLUMN } from './transport-table.ts';
import {
  numberColumn,
  textColumn,
  timeColumn,
  wholeColumn,
  yesNoColumn,
  type FilledColumn,
  type Table,
} from './table.ts';

/** A row a profile. @param rows ascending in time */
export function profileTable(rows: FeedRows, discs: readonly NamedDisc[]): Table {
  const { feed, profiles, jets, reasons, sources } = rows;
  const count = profiles.timeMs.length;
  const { number, dark } = nightsOfRows(profiles.timeMs, feed.station);
  const offsets = jetOffsets(profiles);
  const ofStrongest = (values: ArrayLike<number>): Float32Array =>
    Float32Array.from(profiles.jetCount, (jetCount, row) => (jetCount === 0 ? NaN : values[offsets[row]!]!));
  return {
    rowCount: count,
    columns: [
      ...feedColumns(rows, count),
      timeColumn('time', 'valid time: end of the averaging period, launch of a sounding', profiles.timeMs),
      textColumn('night', EVENING, datesOf(number)),
      yesNoColumn('sun_down', 'whether the sun is down; yes where its times are not known', dark),
      textColumn(
        'status',
        'jet, no-jet or not-assessable',
        Array.from(profiles.status, (status) => STATUSES[status]!),
      ),
      textColumn(
        'why',
        'why the profile is not assessable; empty when it is',
        Array.from(profiles.why, (why) => reasons[why]!),
      ),
      wholeColumn('jets', 'jets found in the profile', profiles.jetCount),
      wholeColumn('category', `of the strongest jet: ${CATEGORY}`, knownCategories(ofStrongest(jets.category))),
      numberColumn(
        'nose_height_agl_m',
        'm 1',
        'height of the strongest jet’s nose above ground',
        ofStrongest(jets.noseHeight),
      ),
      numberColumn('nose_speed_mps', 'm/s 2', 'speed at the nose', ofStrongest(jets.noseSpeed)),
      numberColumn(
        'nose_direction_deg',
        'degrees 1',
        'direction the wind at the nose comes from',
        ofStrongest(jets.noseDirection),
      ),
      numberColumn(
        'falloff_mps',
        'm/s 2',
        'nose speed less the minimum above, as the criteria define it',
        ofStrongest(jets.falloff),
      ),
      yesNoColumn('falloff_is_bound', BOUND, ofStrongest(jets.falloffIsBound)),
      numberColumn('confidence', '3', CONFIDENCE, profiles.confidence),
      numberColumn(
        TRANSPORT_COLUMN,
        'kg/(m s) 1',
        'vapour carried below 3 km or the top of data, with the profile’s own humidity; empty where it has none',
        profiles.below3Km,
        'Peixoto & Oort 1992',
      ),
      wholeColumn('wind_levels', 'levels that came with a speed', profiles.windLevels),
      wholeColumn('usable_levels', 'levels left after screening', profiles.usableLevels),
      numberColumn('top_agl_m', 'm 1', 'height of the highest usable level above ground', profiles.top),
      ...discs.flatMap((disc, i) => discColumnsOf(discPrefixes(discs)[i]!, disc, rows.discs[i]!)),
      textColumn(
        'file',
        'file the profile came from',
        Array.from(profiles.source, (source) => sources[source]!),
      ),
    ],
  };
}

function discColumnsOf(prefix: string, disc: NamedDisc, wind: DiscColumns): FilledColumn[] {
  const at = `${disc.name}, hub ${disc.hubHeight} m, diameter ${disc.rotorDiameter} m`;
  return [
    numberColumn(
      `${prefix}_coverage`,
      '3',
      `share of the disc within the data, 0 to 1 (${at}); too little of it leaves the next columns empty`,
      wind.coverage,
    ),
    numberColumn(`${prefix}_hub_speed_mps`, 'm/s 2', 'speed of the wind vector interpolated to the hub', wind.hubSpeed),
    numberColumn(`${prefix}_hub_direction_deg`, 'degrees 1', 'direction it comes from', wind.hubDirection),
    numberColumn(`${prefix}_rews_mps`, 'm/s 2', 'rotor-equivalent speed', wind.equivalentSpeed, IEC),
    numberColumn(`${prefix}_rews_veer_mps`, 'm/s 2', 'rotor-equivalent speed with veer', wind.equivalentSpeedVeer, IEC),
    numberColumn(
      `${prefix}_shear_exponent`,
      '4',
      'exponent of the power law fitted from tip to tip',
      wind.shearExponent,
      'IEC 61400-1',
    ),
    numberColumn(`${prefix}_veer_deg`, 'degrees 2', 'turn from lower to upper tip, clockwise positive', wind.veer),
  ];
}
