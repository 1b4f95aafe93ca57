// How often something was, by month and hour: a row a month, a column an hour, the night in the middle. Colour tells how
// often; how much of the cell is filled tells how much of that time could be judged at all.

import { frameWithin, inkOn, type Area } from './figure.ts';
import { drawLegend, type Legend } from './legend.ts';
import { setFont, strokeLine, writeText, xPixel, type Frame, type Look, type Pen } from './pen.ts';
import { scaleColour } from './scales.ts';

export interface MonthMatrix {
  /** Months to show, 0 to 11, from above. */
  readonly months: readonly number[];
  /** Flat, `month * 24 + hour`, 0 to 1: how often, of what could be judged (NaN where nothing could), and the share that could. */
  readonly share: ArrayLike<number>;
  readonly judged: ArrayLike<number>;
  /** By month, 0 to 24 on the same clock: mean sunset and sunrise; NaN where not known. */
  readonly sunset: ArrayLike<number>;
  readonly sunrise: ArrayLike<number>;
  /** Columns of figures beside the rows, by month. */
  readonly notes: readonly { readonly title: string; readonly texts: readonly string[] }[];
  /** What colour means; its range is that of `share`. */
  readonly legend: Legend;
}

export const MONTH_NAMES = [
  'Jan',
  'Feb',
  'Mar',
  'Apr',
  'May',
  'Jun',
  'Jul',
  'Aug',
  'Sep',
  'Oct',
  'Nov',
  'Dec',
] as const;

const HOURS = 24;
const FIRST_HOUR = 12;
const NOTE_WIDTH = 74;
/** Below this, CSS pixels, notes leave no room for the cells. */
const LEAST_WIDTH_WITH_NOTES = 560;
const LEGEND_WIDTH = 200;

export function drawMonthMatrix(pen: Pen, area: Area, matrix: MonthMatrix, look: Look): void {
  const { theme, ratio } = look;
  const { months, notes } = matrix;
  const withNotes = area.width / ratio >= LEAST_WIDTH_WITH_NOTES;
  const frame = frameWithin(
    area,
    { left: 38, right: withNotes ? NOTE_WIDTH * notes.length + 8 : 12, top: withNotes ? 22 : 6, bottom: 66 },
    { xLow: FIRST_HOUR, xHigh: FIRST_HOUR + HOURS, yLow: 0, yHigh: months.length },
    look,
  );
  const rowHeight = frame.height / months.length;
  months.forEach((month, row) => {
    const top = frame.top + row * rowHeight;
    for (let column = 0; column < HOURS; column++)
      drawCell(pen, frame, matrix, { month, column, top, rowHeight }, look);
    writeText(pen, look, MONTH_NAMES[month]!, frame.left - 8 * ratio, top + rowHeight / 2, {
      align: 'right',
      baseline: 'middle',
    });
    if (!withNotes) return;
    notes.forEach(({ texts }, k) => {
      const right = frame.left + frame.width + (k + 1) * NOTE_WIDTH * ratio;
      const style = { align: 'right', baseline: 'middle', colour: theme.ink } as const;
      writeText(pen, look, texts[month]!, right, top + rowHeight / 2, style);
    });
  });
  if (withNotes) {
    notes.forEach(({ title }, k) => {
      const right = frame.left + frame.width + (k + 1) * NOTE_WIDTH * ratio;
      writeText(pen, look, title, right, frame.top - 8 * ratio, { size: 12, align: 'right' });
    });
  }
  drawSun(pen, frame, matrix, rowHeight, look);
  for (let hour = FIRST_HOUR; hour <= FIRST_HOUR + HOURS; hour += 3) {
    const label = String(hour % HOURS).padStart(2, '0');
    writeText(pen, look, label, xPixel(frame, hour), frame.top + frame.height + 18 * ratio, { align: 'center' });
  }
  drawLegend(pen, frame.left, frame.top + frame.height + 34 * ratio, LEGEND_WIDTH * ratio, matrix.legend, look);
}

interface Cell {
  readonly month: number;
  readonly column: number;
  readonly top: number;
  readonly rowHeight: number;
}

function drawCell(
  pen: Pen,
  frame: Frame,
  matrix: MonthMatrix,
  { month, column, top, rowHeight }: Cell,
  look: Look,
): void {
  const { theme, ratio } = look;
  const at = month * HOURS + ((FIRST_HOUR + column) % HOURS);
  const share = matrix.share[at]!;
  const { scale, range } = matrix.legend;
  const colour = scaleColour(scale, range, share);
  const left = Math.round(xPixel(frame, FIRST_HOUR + column));
  const right = Math.round(xPixel(frame, FIRST_HOUR + column + 1));
  const [above, below] = [Math.round(top), Math.round(top + rowHeight)];
  const gap = Math.max(1, Math.round(ratio));
  const width = right - left - gap;
  if (colour === null) {
    // Nobody could tell: a dot holds the place, and nothing is filled.
    pen.fillStyle = theme.rule;
    pen.fillRect(Math.round((left + right - gap) / 2), Math.round((above + below) / 2), gap, gap);
    return;
  }
  const whole = below - above - gap;
  const tall = Math.max(gap, Math.round(whole * matrix.judged[at]!));
  pen.fillStyle = `rgb(${colour.join(' ')})`;
  pen.fillRect(left, below - gap - tall, width, tall);
  const text = String(Math.round(100 * share));
  if (tall < 17 * ratio || setFont(pen, look, 12).measureText(text).width > width - 6 * ratio) return;
  writeText(pen, look, text, left + width / 2, below - gap - tall / 2, {
    size: 12,
    align: 'center',
    baseline: 'middle',
    colour: inkOn(colour, theme),
  });
}

/** Dusk and dawn as upright strokes at both edges of each row; the middle is left to the cell's number. */
function drawSun(
  pen: Pen,
  frame: Frame,
  { months, sunset, sunrise }: MonthMatrix,
  rowHeight: number,
  { theme, ratio }: Look,
): void {
  pen.lineCap = 'butt';
  for (const hours of [sunset, sunrise]) {
    months.forEach((month, row) => {
      const hour = hours[month]!;
      if (Number.isNaN(hour)) return;
      const x = xPixel(frame, hour < FIRST_HOUR ? hour + HOURS : hour);
      const top = frame.top + row * rowHeight;
      // Rimmed with the ground, for they cross dark cells and light ones.
      for (const [colour, width] of [
        [theme.ground, 5],
        [theme.ink, 2],
      ] as const) {
        pen.strokeStyle = colour;
        pen.lineWidth = width * ratio;
        strokeLine(pen, x, top, x, top + rowHeight / 4);
        strokeLine(pen, x, top + 0.75 * rowHeight, x, top + rowHeight);
      }
    });
  }
}
