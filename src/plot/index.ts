export { drawBarb, feathersOf, type BarbStyle, type Feathers } from './barbs.ts';
export { drawDiscFace, faceHeight, type DiscFace, type FaceBox } from './disc-face.ts';
export { rotorPng, type RotorSheet } from './rotor-sheet.ts';
export { drawDiscBands, drawDiscs, type Disc } from './disc.ts';
export {
  FIELD_NAMES,
  FIELDS,
  fromShown,
  shownUnit,
  toShown,
  type Field,
  type FieldName,
  type PixelRule,
  type ShownUnit,
} from './fields.ts';
export {
  drawHodograph,
  hodographScale,
  type HodographData,
  type HodographPlace,
  type HodographScale,
  type WindPath,
} from './hodograph.ts';
export { drawLegend, legendOf, type Legend } from './legend.ts';
export { drawNightStrip, type StripStyle } from './night-strip.ts';
export { SectionPainter, type SectionPaint } from './paint-section.ts';
export { FONT, xPixel, xValue, yPixel, yValue, type Frame, type Look, type Pen } from './pen.ts';
export type { SectionView } from './pixel-ranges.ts';
export { drawProfiles, type ProfileChartStyle, type ProfileLine } from './profile-chart.ts';
export {
  colourScale,
  scaleColour,
  scaleIndex,
  SCALE_STEPS,
  type ColourScale,
  type ScaleKind,
  type ScaleName,
  type ValueRange,
} from './scales.ts';
export {
  emptyData,
  profileOptions,
  sectionOptions,
  showCursor,
  showExtent,
  type ProfileAxesOptions,
  type SectionAxesOptions,
} from './section-axes.ts';
export { pickBarbs, type BarbTiles } from './section-barbs.ts';
export type { SectionGrid } from './section-grid.ts';
export { buildSectionGrid, type SectionGridOptions } from './build-section-grid.ts';
export { SectionPicture, viewOf } from './section-picture.ts';
export { drawSectionOver, drawSectionUnder, type Call, type SectionScene } from './section-scene.ts';
export { THEMES, type Theme, type ThemeName } from './theme.ts';
export { drawThread, type Thread, type ThreadStyle } from './thread.ts';
export { timeTicks, valueTicks, type Tick } from './ticks.ts';
export { chartData, frameOf, seriesData, thinned, timeAxis, valueAxis } from './uplot-adapter.ts';
export { WindLookup, type MeasuredWind } from './wind-lookup.ts';
export {
  boundExtent,
  panExtent,
  zoomExtent,
  type ExtentLimits,
  type SectionExtent,
  type SectionPoint,
  type ZoomWay,
} from './section-extent.ts';
export { sectionCells, sectionCsv, type SectionCell } from './section-rows.ts';
export { drawSectionSheet, sectionPng, sheetFrame, type SectionSheet, type SheetSize } from './section-sheet.ts';
export { drawFigureSheet, type Area, type FigureSheet } from './figure.ts';
export { drawMonthMatrix, MONTH_NAMES, type MonthMatrix } from './month-matrix.ts';
export { drawHistogram, type HistogramChart, type HistogramSeries } from './histogram.ts';
export { drawRose, type Rose } from './rose.ts';
export { drawHeightPanel, heightPanelRange, type HeightLine, type HeightPanel } from './height-panel.ts';
export { drawStationMap, type MapPlace, type MapStation, type StationMap } from './station-map.ts';
export { ROOM_ABOVE } from './section-axes.ts';
export { ROOM_BELOW } from './section-scene.ts';
export {
  inflowFrames,
  type InflowFrames,
  type InflowScene,
  type SceneLayer,
  type SceneParcel,
  type SceneWind,
} from './inflow-scene.ts';
export {
  drawInflow,
  drawInflowCursor,
  drawInflowSheet,
  inflowPng,
  type CursorValues,
  type InflowSheet,
} from './inflow-picture.ts';
export {
  drawHodographCursor,
  drawStormHodograph,
  windAtHeight,
  windPlane,
  type NamedVector,
  type StormHodograph,
  type WindPlane,
} from './storm-hodograph.ts';
export {
  carriedDown,
  carriedUp,
  dryAdiabat,
  LEAN,
  mixingRatioLine,
  pressureAt,
  pseudoadiabat,
  thermodynamicPoint,
  thermodynamicValue,
} from './thermodynamic.ts';
