// Section 1 of a report: who, when, where.

import { figures } from './groups.ts';
import type { Report } from './reports.ts';

export interface ReportHead {
  /** Station number or call sign. */
  readonly id: string;
  /** Day of the month and hour, UTC. */
  readonly day: number;
  readonly hour: number;
  readonly knots: boolean;
  /** Last figure of the day-and-hour group: highest level with winds in TEMP A and C, equipment in PILOT. */
  readonly indicator: string;
  /** Degrees; NaN where the report does not say, as the elevation, m. */
  readonly latitude: number;
  readonly longitude: number;
  readonly elevation: number;
  /** The groups after the head. */
  readonly groups: readonly string[];
  /** The station says that there is no sounding. */
  readonly nil: boolean;
}

/** The head of a report; null where it makes no sense. */
export function headOfReport({ groups, platform }: Report): ReportHead | null {
  const named = platform === 'ship' || platform === 'mobile';
  // Without a call sign the day and hour come first.
  const sign = named && !/^\d{4}[\d/]$/u.test(groups[0] ?? '') ? groups[0] : undefined;
  let at = sign === undefined ? 0 : 1;
  const when = /^(\d{2})(\d{2})([\d/])$/u.exec(groups[at] ?? '');
  const nilAt = groups.slice(0, at + 3).findIndex((group) => /^NIL\.?$/u.test(group));
  if (when === null) {
    const id = sign ?? groups.slice(0, 2).find((group) => /^\d{5}$/u.test(group)) ?? '';
    return nilAt < 0
      ? null
      : { ...NOWHERE, id, day: NaN, hour: NaN, knots: false, indicator: '/', groups: [], nil: true };
  }
  at++;
  const coded = Number(when[1]);
  const day = coded > 50 ? coded - 50 : coded;
  const hour = Number(when[2]);
  if (day < 1 || day > 31 || hour > 24) return null;
  const time = { day, hour, knots: coded > 50, indicator: when[3]! };
  if (platform === 'land') {
    const id = groups[at] ?? '';
    if (!/^\d{5}$/u.test(id)) return null;
    const nil = nilAt >= 0;
    return { id, ...time, ...NOWHERE, groups: nil ? [] : groups.slice(at + 1), nil };
  }
  const latitude = figures((groups[at] ?? '').slice(2));
  const quadrant = (groups[at + 1] ?? '').charAt(0);
  const longitude = figures((groups[at + 1] ?? '').slice(1));
  const placed = groups[at]?.startsWith('99') === true && latitude !== undefined && longitude !== undefined;
  if (!placed) return nilAt >= 0 ? { ...NOWHERE, id: sign ?? platform, ...time, groups: [], nil: true } : null;
  // The group with the Marsden square repeats the position.
  at += 3;
  let elevation = platform === 'mobile' ? NaN : 0;
  if (platform === 'mobile') elevation = mobileElevation(groups[at++] ?? '');
  return {
    id: sign ?? platform,
    ...time,
    latitude: signed(latitude / 10, quadrant === '3' || quadrant === '5', 90),
    longitude: signed(longitude / 10, quadrant === '5' || quadrant === '7', 180),
    elevation,
    groups: groups.slice(at),
    nil: nilAt >= 0,
  };
}

const NOWHERE = { latitude: NaN, longitude: NaN, elevation: NaN };

function signed(value: number, negative: boolean, most: number): number {
  if (!(value <= most)) return NaN;
  return negative ? -value : value;
}

/** `h0h0h0h0im`: 1 to 4 metres, 5 to 8 feet (code table 1845), from sure to doubtful. */
function mobileElevation(group: string): number {
  const height = figures(group.slice(0, 4));
  const unit = Number(group.charAt(4));
  if (height === undefined || !(unit >= 1 && unit <= 8)) return NaN;
  return unit <= 4 ? height : height * 0.3048;
}
