export type { FileFormat, Reading, ReadOptions, ReadProgress } from './format.ts';
export { bytesSource, DEFAULT_LIMITS, type ByteSource, type ReadLimits } from './source.ts';
