// The section as numbers: for the table that says the same as the picture, and for a CSV file to take away.

import { toHeightUnit, type HeightUnit, type SpeedUnit } from '../air/index.ts';
import { shownUnit, toShown, type FieldName } from './fields.ts';
import type { SectionExtent } from './section-extent.ts';
import type { SectionGrid } from './section-grid.ts';

/** One cell that holds a value. */
export interface SectionCell {
  /** UTC ms */
  readonly startMs: number;
  readonly endMs: number;
  /** m above ground */
  readonly bottom: number;
  readonly top: number;
  /** SI */
  readonly value: number;
  readonly doubtful: boolean;
}

/** Cells of an extent that hold a value, in order of time and then of height; every cell if no extent is given. */
export function* sectionCells(grid: SectionGrid, extent?: SectionExtent): Generator<SectionCell> {
  const { columnCount, rowCount, startMs, endMs, edges, values, doubt, doubtWords } = grid;
  for (let column = 0; column < columnCount; column++) {
    if (extent !== undefined && !(endMs[column]! > extent.startMs && startMs[column]! < extent.endMs)) continue;
    for (let row = 0; row < rowCount; row++) {
      const value = values[column * rowCount + row]!;
      if (Number.isNaN(value)) continue;
      if (extent !== undefined && !(edges[row + 1]! > extent.bottom && edges[row]! < extent.top)) continue;
      yield {
        startMs: startMs[column]!,
        endMs: endMs[column]!,
        bottom: edges[row]!,
        top: edges[row + 1]!,
        value,
        doubtful: (doubt[column * doubtWords + (row >> 5)]! & (1 << (row & 31))) !== 0,
      };
    }
  }
}

const SPEED_KEYS: Readonly<Record<SpeedUnit, string>> = { 'm/s': 'mps', kt: 'kt', 'km/h': 'kmh', mph: 'mph' };

/** Heading of a field's column, with its unit. */
function fieldKey(field: FieldName, speedUnit: SpeedUnit): string {
  switch (field) {
    case 'speed':
      return `speed_${SPEED_KEYS[speedUnit]}`;
    case 'direction':
      return 'direction_deg';
    case 'shear':
      return `shear_${SPEED_KEYS[speedUnit]}_per_100m`;
    case 'veer':
      return 'veer_deg_per_100m';
    case 'humidity-flux':
      return 'humidity_flux_g_per_m2_s';
    case 'temperature':
      return 'temperature_c';
  }
}

/**
 * The cells of an extent as CSV, in pieces of some thousand lines, for a Blob or a stream. Times are UTC; values and
 * heights are in the reader's units, which the headings tell.
 */
export function* sectionCsv(
  grid: SectionGrid,
  units: { readonly speed: SpeedUnit; readonly height: HeightUnit },
  extent?: SectionExtent,
): Generator<string> {
  const shown = shownUnit(grid.field, units.speed);
  const decimals = shown.decimals + 1;
  const height = (value: number): string => String(Number(toHeightUnit(value, units.height).toFixed(1)));
  const key = fieldKey(grid.field, units.speed);
  const head = [
    'time_start_utc',
    'time_end_utc',
    `bottom_agl_${units.height}`,
    `top_agl_${units.height}`,
    key,
    'doubtful',
  ];
  let lines = [head.join(',')];
  for (const cell of sectionCells(grid, extent)) {
    lines.push(
      [
        new Date(cell.startMs).toISOString(),
        new Date(cell.endMs).toISOString(),
        height(cell.bottom),
        height(cell.top),
        toShown(cell.value, shown).toFixed(decimals),
        cell.doubtful ? 'yes' : 'no',
      ].join(','),
    );
    if (lines.length < 4000) continue;
    yield `${lines.join('\n')}\n`;
    lines = [];
  }
  if (lines.length > 0) yield `${lines.join('\n')}\n`;
}
