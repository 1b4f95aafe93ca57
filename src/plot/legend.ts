// What a colour means: the strip of colours with its numbers, and the same in words.

import type { SpeedUnit } from '../air/index.ts';
import { FIELDS, shownUnit, toShown, type FieldName, type ShownUnit } from './fields.ts';
import { setFont, writeText, type Look, type Pen } from './pen.ts';
import { colourScale, SCALE_STEPS, type ColourScale, type ValueRange } from './scales.ts';
import type { ThemeName } from './theme.ts';
import { valueTicks, type Tick } from './ticks.ts';

export interface Legend {
  readonly scale: ColourScale;
  readonly range: ValueRange;
  readonly unit: string;
  readonly ticks: readonly Tick[];
  /** For people who do not see the strip, and for its title. */
  readonly words: string;
}

const COMPASS_TICKS: readonly Tick[] = ['N', 'E', 'S', 'W', 'N'].map((label, k) => ({ at: 90 * k, label }));

/** What the legend of a field says. */
export function legendOf(field: FieldName, range: ValueRange, theme: ThemeName, speedUnit: SpeedUnit): Legend {
  const { title } = FIELDS[field];
  const scale = colourScale(FIELDS[field].scale, theme);
  const shown = shownUnit(field, speedUnit);
  if (field === 'direction') {
    const words =
      theme === 'red'
        ? `Colour shows ${title}: north brightest, south darkest; the barbs tell east from west.`
        : `Colour shows ${title}: north palest, south darkest, east orange, west blue.`;
    return { scale, range, unit: '', ticks: COMPASS_TICKS, words };
  }
  const ends = [range.low, range.high].map((value) => numberText(toShown(value, shown), shown.decimals));
  const words = `Colour shows ${title} from ${ends.join(' to ')} ${shown.unit}: ${senseWords(scale, theme)}.`;
  return {
    scale,
    range,
    unit: shown.unit,
    ticks: legendTicks(range, shown),
    words,
  };
}

/** Equal parts of the whole range where these are round numbers, so that both ends are told; else round numbers inside. */
function legendTicks({ low, high }: ValueRange, { factor, offset }: ShownUnit): Tick[] {
  const start = low * factor + offset;
  for (const parts of [4, 3, 5, 6, 2]) {
    const step = ((high - low) * factor) / parts;
    const decimals = isWhole(step) ? 0 : 1;
    if (!isWhole(step * 10 ** decimals) || !isWhole(start / step)) continue;
    return Array.from({ length: parts + 1 }, (_, k) => ({
      at: low + (k / parts) * (high - low),
      label: numberText(start + k * step, decimals),
    }));
  }
  return valueTicks(low, high, 5, factor, offset);
}

function isWhole(value: number): boolean {
  return Math.abs(value - Math.round(value)) < 1e-6;
}

function senseWords(scale: ColourScale, theme: ThemeName): string {
  if (scale.kind === 'two-sided' && theme !== 'red') return 'blue is negative, red positive';
  return theme === 'light' ? 'the darker, the more' : 'the lighter, the more';
}

function numberText(value: number, decimals: number): string {
  const rounded = Number(value.toFixed(decimals));
  return rounded < 0 ? `−${-rounded}` : String(Math.abs(rounded));
}

/** Draws the strip with its left upper corner at a pixel, numbers below, the unit to the right. */
export function drawLegend(pen: Pen, left: number, top: number, width: number, legend: Legend, look: Look): void {
  const { rgba } = legend.scale;
  const { ratio } = look;
  const tall = 9 * ratio;
  const pixels = Math.round(width);
  for (let x = 0; x < pixels; x++) {
    const k = 4 * Math.floor(((x + 0.5) / pixels) * SCALE_STEPS);
    pen.fillStyle = `rgb(${rgba[k]!} ${rgba[k + 1]!} ${rgba[k + 2]!})`;
    pen.fillRect(Math.round(left) + x, top, 1, tall);
  }
  let free = -Infinity;
  for (const { at, label } of legend.ticks) {
    const x = left + ((at - legend.range.low) / (legend.range.high - legend.range.low)) * width;
    const half = setFont(pen, look, 12).measureText(label).width / 2;
    if (x - half < free) continue;
    writeText(pen, look, label, x, top + tall + 14 * ratio, { size: 12, align: 'center' });
    free = x + half + 4 * ratio;
  }
  writeText(pen, look, legend.unit, left + width + 8 * ratio, top + tall, { size: 12 });
}
