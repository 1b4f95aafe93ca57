export type { FileFormat, Reading, ReadOptions, ReadProgress } from './format.ts';
export { FORMATS } from './formats.ts';
export { readProfiles } from './read-profiles.ts';
export { bytesSource, DEFAULT_LIMITS, type ByteSource, type ReadLimits } from './source.ts';
