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
export { SectionPainter, type SectionPaint } from './paint-section.ts';
export type { SectionView } from './pixel-ranges.ts';
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
export { buildSectionGrid, type SectionGrid, type SectionGridOptions } from './section-grid.ts';
export { THEMES, type Theme, type ThemeName } from './theme.ts';
