export type { FileFormat, Reading, ReadOptions, ReadProgress } from './format.ts';
export { FORMATS } from './formats.ts';
export { readOutputSeries, type OutputReading } from './output-series.ts';
export { readProfiles } from './read-profiles.ts';
export { isStationList, readStationList, type StationList } from './stations/station-list.ts';
export { bytesSource, DEFAULT_LIMITS, type ByteSource, type ReadLimits } from './source.ts';
export { writeCoverageJson } from './write/coverage-json.ts';
export { writeCsv } from './write/csv.ts';
export { writeNetcdf } from './write/netcdf.ts';
