// The current profile beside the section: speed across, the section's own height axis up.

import { REJECTING, type Profile } from '../profile/index.ts';
import { setFont, within, writeText, xPixel, yPixel, type Frame, type Look, type Pen } from './pen.ts';
import { scaleColour, type ColourScale, type ValueRange } from './scales.ts';

export interface ProfileLine {
  readonly profile: Profile;
  /** Written beside the line, a time as a rule. */
  readonly label?: string;
}

export interface ProfileChartStyle {
  /** Colours of the dots: those of the section's speed. */
  readonly scale: ColourScale;
  readonly range: ValueRange;
  /** The current profile's nose, ringed. */
  readonly nose?: { readonly height: number; readonly speed: number } | null;
}

/** One profile drawn bold with a dot at each level, others before it thin and dotted. Rejected levels are left out. */
export function drawProfiles(
  pen: Pen,
  frame: Frame,
  current: ProfileLine | null,
  earlier: readonly ProfileLine[],
  look: Look,
  { scale, range, nose }: ProfileChartStyle,
): void {
  const { theme, ratio } = look;
  within(pen, frame, () => {
    pen.lineJoin = 'round';
    pen.lineCap = 'butt';
    pen.strokeStyle = theme.soft;
    pen.lineWidth = 1.25 * ratio;
    pen.setLineDash([2 * ratio, 3.5 * ratio]);
    for (const line of earlier) traceProfile(pen, frame, line.profile);
    pen.setLineDash([]);
    if (current === null) return;
    pen.strokeStyle = theme.ink;
    pen.lineWidth = 2 * ratio;
    traceProfile(pen, frame, current.profile);
    drawDots(pen, frame, current.profile, look, scale, range);
    if (nose !== null && nose !== undefined) {
      pen.beginPath();
      pen.arc(xPixel(frame, nose.speed), yPixel(frame, nose.height), 6.5 * ratio, 0, 2 * Math.PI);
      pen.lineWidth = 1.5 * ratio;
      pen.strokeStyle = theme.ink;
      pen.stroke();
    }
  });
  const taken: number[] = [];
  if (current !== null) taken.push(labelProfile(pen, frame, current, look, [], theme.ink, 600));
  for (const line of earlier) taken.push(labelProfile(pen, frame, line, look, taken, theme.soft, 400));
}

/** Levels that count, in order of height. */
function usableLevels({ levelCount, heightAgl, speed, mark }: Profile): number[] {
  const usable: number[] = [];
  for (let k = 0; k < levelCount; k++) {
    if ((mark[k]! & REJECTING) === 0 && heightAgl[k]! >= 0 && !Number.isNaN(speed[k]!)) usable.push(k);
  }
  return usable;
}

/** A line through the levels, broken where one is missing: where a step is over two and a half times those around it. */
function traceProfile(pen: Pen, frame: Frame, profile: Profile): void {
  const levels = usableLevels(profile);
  const { heightAgl, speed } = profile;
  const step = (i: number): number => heightAgl[levels[i + 1]!]! - heightAgl[levels[i]!]!;
  pen.beginPath();
  levels.forEach((level, i) => {
    const usual = medianOf(
      [-3, -2, 1, 2]
        .map((d) => i - 1 + d)
        .filter((j) => j >= 0 && j < levels.length - 1)
        .map(step),
    );
    const gap = i > 0 && step(i - 1) > 2.5 * usual;
    const [x, y] = [xPixel(frame, speed[level]!), yPixel(frame, heightAgl[level]!)];
    if (i === 0 || gap) pen.moveTo(x, y);
    else pen.lineTo(x, y);
  });
  pen.stroke();
}

/** Of nothing it is infinite: two levels are always joined. */
function medianOf(values: number[]): number {
  if (values.length === 0) return Infinity;
  const sorted = values.sort((a, b) => a - b);
  return sorted[sorted.length >> 1]!;
}

function drawDots(
  pen: Pen,
  frame: Frame,
  profile: Profile,
  { theme, ratio }: Look,
  scale: ColourScale,
  range: ValueRange,
): void {
  const { heightAgl, speed } = profile;
  let lastY = Infinity;
  pen.lineWidth = 1.25 * ratio;
  pen.strokeStyle = theme.ground;
  for (const level of usableLevels(profile)) {
    const y = yPixel(frame, heightAgl[level]!);
    // Levels of a fine sounding would merge into a bar.
    if (lastY - y < 5 * ratio) continue;
    lastY = y;
    const [red, green, blue] = scaleColour(scale, range, speed[level]!)!;
    pen.fillStyle = `rgb(${red} ${green} ${blue})`;
    pen.beginPath();
    pen.arc(xPixel(frame, speed[level]!), y, 3.75 * ratio, 0, 2 * Math.PI);
    pen.fill();
    pen.stroke();
  }
}

/**
 * Beside the fastest level in view that keeps clear of the lines of text at `taken`.
 * @returns the line it took, device pixels; NaN when nothing was written
 */
function labelProfile(
  pen: Pen,
  frame: Frame,
  { profile, label }: ProfileLine,
  look: Look,
  taken: readonly number[],
  colour: string,
  weight: number,
): number {
  if (label === undefined) return NaN;
  const { heightAgl, speed } = profile;
  const lineOf = (k: number): number => yPixel(frame, heightAgl[k]!);
  const inView = usableLevels(profile).filter((k) => {
    const inside = heightAgl[k]! >= frame.yLow && heightAgl[k]! <= frame.yHigh;
    return inside && !taken.some((line) => Math.abs(line - lineOf(k)) < 18 * look.ratio);
  });
  if (inView.length === 0) return NaN;
  const fastest = inView.reduce((best, k) => (speed[k]! > speed[best]! ? k : best));
  const at = xPixel(frame, speed[fastest]!);
  const beside = 11 * look.ratio;
  const wide = setFont(pen, look, 13, weight).measureText(label).width;
  const fits = at + beside + wide <= frame.left + frame.width;
  const style = { colour, weight, baseline: 'middle', rimmed: true, align: fits ? 'left' : 'right' } as const;
  writeText(pen, look, label, fits ? at + beside : at - beside, lineOf(fastest), style);
  return lineOf(fastest);
}
