// Profiles as a table of text: a line a level, every heading with its unit.

import { dewPointOf } from '../../air/index.ts';
import { INSTRUMENTS, markNames, profilesOf, type Profile, type ProfileBlock } from '../../profile/index.ts';

/** A float to as many digits as tell it from its neighbours; empty where missing. */
function text(value: number): string {
  if (!Number.isFinite(value)) return '';
  const short = Number(value.toPrecision(7));
  return String(Math.fround(short) === value ? short : Number(value.toPrecision(9)));
}

const LEVEL_COLUMNS: readonly (readonly [heading: string, value: (profile: Profile, k: number) => string])[] = [
  ['height_agl_m', ({ heightAgl }, k) => text(heightAgl[k]!)],
  ['pressure_pa', ({ pressure }, k) => text(pressure?.[k] ?? NaN)],
  ['speed_mps', ({ speed }, k) => text(speed[k]!)],
  ['direction_deg', ({ direction }, k) => text(direction[k]!)],
  ['vertical_speed_mps', ({ verticalSpeed }, k) => text(verticalSpeed?.[k] ?? NaN)],
  ['temperature_k', ({ temperature }, k) => text(temperature?.[k] ?? NaN)],
  ['dewpoint_k', (profile, k) => text(dewPointAt(profile, k))],
  ['specific_humidity (kg/kg)', ({ specificHumidity }, k) => text(specificHumidity?.[k] ?? NaN)],
  ['signal', ({ signal }, k) => text(signal?.[k] ?? NaN)],
  ['speed_uncertainty_mps', ({ speedUncertainty }, k) => text(speedUncertainty?.[k] ?? NaN)],
  ['mark', ({ mark }, k) => markNames(mark[k]!).join(' ')],
];

const PROFILE_COLUMNS = 'station,name,latitude_deg,longitude_deg,elevation_m,time,period_s,instrument';

/**
 * The table in pieces of text, heading line first, for files of any length; lines end as RFC 4180 says.
 * A profile without levels has no line.
 * @example new Blob([...writeCsv(blocks)])
 */
export function* writeCsv(blocks: Iterable<ProfileBlock>): Generator<string> {
  yield `${PROFILE_COLUMNS},${LEVEL_COLUMNS.map(([heading]) => heading).join(',')}\r\n`;
  for (const block of blocks) {
    for (const profile of profilesOf(block)) {
      const start = profileCells(profile);
      let lines = '';
      for (let k = 0; k < profile.levelCount; k++) {
        lines += `${start},${LEVEL_COLUMNS.map(([, value]) => value(profile, k)).join(',')}\r\n`;
      }
      yield lines;
    }
  }
}

function profileCells({ station, timeMs, periodS, instrument }: Profile): string {
  return [
    quoted(station.id),
    quoted(station.name),
    String(station.latitude).replace('NaN', ''),
    String(station.longitude).replace('NaN', ''),
    String(station.elevation).replace('NaN', ''),
    Number.isFinite(timeMs) ? new Date(timeMs).toISOString() : '',
    text(periodS),
    instrument === INSTRUMENTS[0] ? '' : instrument,
  ].join(',');
}

function dewPointAt({ specificHumidity, pressure }: Profile, k: number): number {
  if (specificHumidity === null || pressure === null) return NaN;
  return Math.fround(Number(dewPointOf(specificHumidity[k]!, pressure[k]!).toFixed(3)));
}

function quoted(value: string): string {
  return /[",\r\n]/u.test(value) ? `"${value.replaceAll('"', '""')}"` : value;
}
