export {
  buffersOf,
  profileAt,
  profilesOf,
  VALUE_COLUMNS,
  type Levels,
  type Profile,
  type ProfileBlock,
  type ValueColumn,
} from './block.ts';
export { BlockBuilder, type LevelInput, type ProfileInput } from './builder.ts';
export { blockOfColumns, type ColumnsInput } from './columns.ts';
export {
  DOUBTING,
  MARK,
  markNames,
  MARKS,
  REJECTING,
  REJECTING_AIR,
  type MarkMeaning,
  type MarkName,
} from './marks.ts';
export { concatBlocks } from './concat.ts';
export { pickProfiles, type Pick } from './pick.ts';
export { profileRange } from './range.ts';
export { withHeights, type HeightInput } from './heights.ts';
export { INSTRUMENTS, sameStation, unplacedStation, type Instrument, type Station } from './station.ts';
export { gatherWind, gatherWindAt, windColumn, type WindColumn } from './usable.ts';
