export { AirSources } from './air-sources.ts';
export { Desk, type FeedState, type NightQuestion, type NightState } from './desk.ts';
export type { FeedName } from './feed-name.ts';
export { FeedStore, type Acceptance } from './feed-store.ts';
export type { NightWindow } from './night-window.ts';
export { archiveRows, judge, type ArchiveQuestion } from './archive/judge.ts';
export { mergeRows } from './archive/merge.ts';
export { NightGatherer, nightRows, type NightRow, type RotorMean } from './archive/nights.ts';
export { emptyRows, type FeedRows } from './archive/rows.ts';
export { compareStations } from './feed-name.ts';
export { profileTable } from './archive/profile-table.ts';
export { jetTable } from './archive/jet-table.ts';
export { nightTable } from './archive/night-table.ts';
export { csvHeading, csvRows } from './archive/csv.ts';
export { textColumn, yesNoColumn, type FilledColumn, type Table } from './archive/table.ts';
export type { NamedDisc } from './archive/table-parts.ts';
export {
  ArchiveTally,
  figureRows,
  ROSE_SECTORS,
  ROSE_SPEEDS,
  solarClock,
  type ArchiveFigures,
  type Clock,
  type FigureNight,
  type FigureRows,
  type RotorFigures,
} from './archive/figures.ts';
export type { Histogram } from './archive/histogram.ts';
export {
  USUAL_RAMPS,
  type DiscNight,
  type DiscSeries,
  type FarmActual,
  type FarmRamp,
  type FarmState,
  type WatchedLoad,
} from './farm.ts';
export { siteDiscWind } from './site-disc.ts';
export type { ArchiveNight, ArchiveView } from './archive/view.ts';
export {
  ArchiveTableReader,
  archiveTableKind,
  readArchiveAbout,
  type ArchiveAbout,
  type ArchiveTableKind,
  type TableCell,
} from './archive/read-tables.ts';
export type { AirColumns, AirUse, DrawnTrace, InflowQuestion, InflowState, NoInflow } from './inflow.ts';
export type { MoistureQuestion, MoistureState, Growth } from './moist-night.ts';
export type { ArrivalBoard, KeptScore, UpstreamAir } from './arrivals.ts';
export type { TriangleMember, TriangleState } from './triangles.ts';
export type { TransportHistory, UsualTransport } from './usual-transport.ts';
export type { FarmRecord, RecordSum } from './farm-record.ts';
export type { DiscFaceWind, FaceSlice, NightJoin } from './joined-night.ts';
export {
  joinSeries,
  type FeedDisagreement,
  type FeedSeries,
  type JoinedPart,
  type JoinedSeries,
} from './joined-series.ts';
export { standTogether } from './same-place.ts';
export { TransportTableReader } from './archive/transport-table.ts';
