// The strip of day, dusk and night under a time axis, with sunset and sunrise in words.

import type { LightSpan } from '../air/index.ts';
import { setFont, within, writeText, xPixel, type Frame, type Look, type Pen } from './pen.ts';

export interface StripStyle {
  /** Writes a time, `17:50`. */
  readonly timeText: (timeMs: number) => string;
  /** Height of the strip, CSS pixels; 10 unless told. */
  readonly height?: number;
}

/**
 * Draws the strip with its upper edge at `top`, spanning the frame's width, the words below it.
 * An unknown light (no position) stays ground-coloured and says so.
 */
export function drawNightStrip(
  pen: Pen,
  frame: Frame,
  top: number,
  spans: readonly LightSpan[],
  look: Look,
  { timeText, height = 10 }: StripStyle,
): void {
  const { theme, ratio } = look;
  const tall = height * ratio;
  const strip: Frame = { ...frame, top, height: tall };
  within(pen, strip, () => {
    for (const { startMs, endMs, light } of spans) {
      if (light === 'unknown') continue;
      const left = xPixel(frame, startMs);
      pen.fillStyle = theme[light];
      pen.fillRect(left, top, xPixel(frame, endMs) - left, tall);
    }
  });
  const baseline = top + tall + 15 * ratio;
  if (spans.some((span) => span.light === 'unknown')) {
    writeText(pen, look, 'Day and night are not known: the station has no position.', frame.left, baseline, {
      size: 12,
    });
  }
  let free = frame.left;
  for (let k = 1; k < spans.length; k++) {
    const words = eventWords(spans[k - 1]!, spans[k]!);
    if (words === null) continue;
    const text = `${words} ${timeText(spans[k]!.startMs)}`;
    const x = xPixel(frame, spans[k]!.startMs);
    const wide = setFont(pen, look, 12).measureText(text).width;
    const left = Math.min(Math.max(x - wide / 2, frame.left), frame.left + frame.width - wide);
    const inView = x >= frame.left && x <= frame.left + frame.width;
    if (!inView || left < free) continue;
    writeText(pen, look, text, left, baseline, { size: 12 });
    free = left + wide + 12 * ratio;
  }
}

/** The sun's edge passes the horizon between day and dusk; between dusk and night nothing needs a word. */
function eventWords(before: LightSpan, after: LightSpan): string | null {
  if (before.light === 'day' && after.light !== 'unknown') return 'sunset';
  if (after.light === 'day' && before.light !== 'unknown') return 'sunrise';
  return null;
}
