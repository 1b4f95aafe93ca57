// A line of the station list that goes with the IGRA archive, version 2, in fixed columns (from memory of the archive's own
// description): identifier 1-11, latitude 13-20, longitude 22-30, elevation 32-37, state 39-40, name 42-71, first and last
// year 73-81, count of soundings 83-88. Beyond +-90, beyond +-180 and -998.8 or less: ships and stations without a record.

import type { Station } from '../../profile/index.ts';

const LINE = /^[A-Z]{2}[A-Z0-9]{9} {1,5}-?\d{1,3}\.\d{4} {1,6}-?\d{1,3}\.\d{4} {1,6}-?\d{1,4}\.\d /u;

/** Whether the line has the columns of the archive's list. */
export function isArchiveLine(line: string): boolean {
  return LINE.test(line) && line[11] === ' ' && line[20] === ' ' && line[30] === ' ';
}

/** The station of such a line; the numbers NaN where the archive has none. */
export function archiveStation(line: string): Station {
  const number = (from: number, to: number): number => Number(line.slice(from - 1, to));
  const within = (value: number, least: number, most: number): number =>
    value >= least && value <= most ? value : NaN;
  const id = line.slice(0, 11);
  const name = line.slice(41, 71).trim();
  return {
    id,
    name: name === '' ? id : name,
    latitude: within(number(13, 20), -90, 90),
    longitude: within(number(22, 30), -180, 180),
    elevation: within(number(32, 37), -500, 9000),
  };
}
