// Every format the house reads, in the order in which each is asked whether the bytes are its own: those with an
// unmistakable beginning first, tables of text last. A new format is a file or folder and one line here.

import { bufr } from './bufr/bufr.ts';
import { coverageJson } from './coverage-json/coverage-json.ts';
import { csvTable } from './csv/format.ts';
import type { FileFormat } from './format.ts';
import { igra } from './igra/format.ts';
import { netcdf4, netcdfClassic } from './netcdf/formats.ts';
import { stationListFormat } from './stations/format.ts';
import { tempPilot } from './temp-pilot/format.ts';

export const FORMATS: readonly FileFormat[] = [
  netcdfClassic,
  netcdf4,
  bufr,
  coverageJson,
  tempPilot,
  igra,
  stationListFormat,
  // Whatever looks like a table and is nothing else.
  csvTable,
];
