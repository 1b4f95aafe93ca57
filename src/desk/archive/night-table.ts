// The archive's table of nights.

import type { NightRow, RotorMean } from './nights.ts';
import { CATEGORY, discPrefixes, EVENING, IEC, knownCategories, type NamedDisc } from './table-parts.ts';
import { numberColumn, textColumn, timeColumn, wholeColumn, type FilledColumn, type Table } from './table.ts';

const HOUR_MS = 3_600_000;

/** A row a feed and night. */
export function nightTable(nights: readonly NightRow[], discs: readonly NamedDisc[]): Table {
  const text = (of: (night: NightRow) => string): string[] => nights.map(of);
  const numbers = (of: (night: NightRow) => number): Float64Array => Float64Array.from(nights, of);
  const prefixes = discPrefixes(discs);
  return {
    rowCount: nights.length,
    columns: [
      textColumn(
        'station',
        'identifier of the station',
        text(({ feed }) => feed.station.id),
      ),
      textColumn(
        'instrument',
        'kind of instrument',
        text(({ feed }) => feed.instrument),
      ),
      textColumn(
        'station_name',
        'name of the station',
        text(({ feed }) => feed.station.name),
      ),
      numberColumn(
        'latitude_deg',
        'degrees 5',
        'north positive',
        numbers(({ feed }) => feed.station.latitude),
      ),
      numberColumn(
        'longitude_deg',
        'degrees 5',
        'east positive',
        numbers(({ feed }) => feed.station.longitude),
      ),
      numberColumn(
        'elevation_m',
        'm 1',
        'ground above sea level',
        numbers(({ feed }) => feed.station.elevation),
      ),
      textColumn(
        'night',
        EVENING,
        text(({ night }) => night),
      ),
      textColumn(
        'kind',
        'night, polar-day, polar-night, or unknown where the station has no position',
        text(({ kind }) => kind),
      ),
      timeColumn(
        'sunset',
        'upper limb on a level horizon',
        numbers(({ sunsetMs }) => wholeSecond(sunsetMs)),
      ),
      timeColumn(
        'sunrise',
        'the same in the morning',
        numbers(({ sunriseMs }) => wholeSecond(sunriseMs)),
      ),
      wholeColumn(
        'profiles',
        'profiles from mean noon to mean noon',
        numbers(({ profiles }) => profiles),
      ),
      wholeColumn(
        'assessable',
        'of these, the ones that could be judged',
        numbers(({ assessable }) => assessable),
      ),
      wholeColumn(
        'with_jet',
        'of these, the ones with a jet',
        numbers(({ jets }) => jets),
      ),
      wholeColumn(
        'dark_profiles',
        'profiles while the sun is down; all where its times are not known',
        numbers(({ darkProfiles }) => darkProfiles),
      ),
      wholeColumn(
        'dark_assessable',
        'of these, the ones that could be judged',
        numbers(({ darkAssessable }) => darkAssessable),
      ),
      wholeColumn(
        'dark_with_jet',
        'of these, the ones with a jet',
        numbers(({ darkJets }) => darkJets),
      ),
      timeColumn(
        'first_jet',
        'first profile with a jet',
        numbers(({ firstJetMs }) => firstJetMs),
      ),
      timeColumn(
        'last_jet',
        'last profile with a jet',
        numbers(({ lastJetMs }) => lastJetMs),
      ),
      numberColumn(
        'first_jet_after_sunset_h',
        'h 2',
        'negative before sunset',
        numbers(({ firstJetMs, sunsetMs }) => (firstJetMs - sunsetMs) / HOUR_MS),
      ),
      numberColumn(
        'last_jet_after_sunrise_h',
        'h 2',
        'negative before sunrise',
        numbers(({ lastJetMs, sunriseMs }) => (lastJetMs - sunriseMs) / HOUR_MS),
      ),
      timeColumn(
        'onset',
        'first of at least three profiles with a jet in a row',
        numbers(({ onsetMs }) => onsetMs),
      ),
      timeColumn(
        'end',
        'last of at least three profiles with a jet in a row',
        numbers(({ endMs }) => endMs),
      ),
      wholeColumn(
        'category',
        `highest of the night: ${CATEGORY}`,
        knownCategories(numbers(({ category }) => category)),
      ),
      timeColumn(
        'peak_time',
        'when the nose was fastest',
        numbers(({ peakMs }) => peakMs),
      ),
      numberColumn(
        'peak_speed_mps',
        'm/s 2',
        'the fastest nose of the night',
        numbers(({ peakSpeed }) => peakSpeed),
      ),
      numberColumn(
        'peak_height_agl_m',
        'm 1',
        'its height above ground',
        numbers(({ peakHeight }) => peakHeight),
      ),
      numberColumn(
        'peak_direction_deg',
        'degrees 1',
        'direction it comes from',
        numbers(({ peakDirection }) => peakDirection),
      ),
      ...discs.flatMap((disc, i) => [
        ...meanColumns(
          `${prefixes[i]!}_with_jet`,
          `${disc.name}, dark profiles with a jet`,
          nights,
          (night) => night.discs[i]!.withJet,
        ),
        ...meanColumns(
          `${prefixes[i]!}_without_jet`,
          `${disc.name}, dark assessable profiles without a jet`,
          nights,
          (night) => night.discs[i]!.withoutJet,
        ),
      ]),
    ],
  };
}

function meanColumns(
  prefix: string,
  of: string,
  nights: readonly NightRow[],
  mean: (night: NightRow) => RotorMean,
): FilledColumn[] {
  const numbers = (name: keyof RotorMean): Float64Array => Float64Array.from(nights, (night) => mean(night)[name]);
  return [
    wholeColumn(`${prefix}_profiles`, `profiles with a rotor-equivalent speed (${of})`, numbers('profiles')),
    numberColumn(`${prefix}_hub_speed_mps`, 'm/s 2', `mean speed at the hub (${of})`, numbers('hubSpeed')),
    numberColumn(`${prefix}_rews_mps`, 'm/s 2', `mean rotor-equivalent speed (${of})`, numbers('equivalentSpeed'), IEC),
    numberColumn(
      `${prefix}_shear_exponent`,
      '4',
      `mean shear exponent (${of})`,
      numbers('shearExponent'),
      'IEC 61400-1',
    ),
    numberColumn(`${prefix}_veer_deg`, 'degrees 2', `mean turn from lower to upper tip (${of})`, numbers('veer')),
  ];
}

/** Sun times are good to a minute; their milliseconds are none worth writing. */
function wholeSecond(timeMs: number): number {
  return Math.round(timeMs / 1000) * 1000;
}
