// Day and hour are all the code gives: month and year come from a time not long after the report.

const DAY_MS = 86_400_000;
const HOUR_MS = 3_600_000;

/**
 * The latest time with this day of the month and hour that is at most six hours after the reference: a report names the
 * full hour after the launch, UTC ms.
 * @returns NaN where no month of the year before has the day
 */
export function reportTimeMs(day: number, hour: number, referenceMs: number): number {
  const reference = new Date(referenceMs);
  for (let back = -1; back <= 12; back++) {
    const month = Date.UTC(reference.getUTCFullYear(), reference.getUTCMonth() - back, 1);
    const time = month + (day - 1) * DAY_MS + hour * HOUR_MS;
    const sameMonth = new Date(month + (day - 1) * DAY_MS).getUTCMonth() === new Date(month).getUTCMonth();
    if (sameMonth && time <= referenceMs + 6 * HOUR_MS) return time;
  }
  return NaN;
}

/**
 * Time of release next to the time of observation, which is its full hour, UTC ms.
 * @returns the time of observation itself where the two lie more than three hours apart
 */
export function releaseTimeMs(nominalMs: number, release: { hour: number; minute: number } | null): number {
  if (release === null || release.hour > 23 || release.minute > 59) return nominalMs;
  const midnight = Math.floor(nominalMs / DAY_MS) * DAY_MS;
  const times = [-1, 0, 1].map((days) => midnight + days * DAY_MS + (release.hour * 60 + release.minute) * 60_000);
  return times.find((time) => Math.abs(time - nominalMs) <= 3 * HOUR_MS) ?? nominalMs;
}

/** The end of the day that the name of a file tells, as in `temp_20240601.txt`, UTC ms; undefined where it tells none. */
export function dayInName(name: string): number | undefined {
  const match = /(?<!\d)((?:19|20)\d{2})[-_]?(0[1-9]|1[0-2])[-_]?(0[1-9]|[12]\d|3[01])/u.exec(
    name.split('/').at(-1) ?? '',
  );
  return match === null ? undefined : Date.UTC(Number(match[1]), Number(match[2]) - 1, Number(match[3])) + DAY_MS - 1;
}
