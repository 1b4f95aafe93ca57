// Zooming and panning: from one extent to the next, never out of what there is to see.

/** Time in UTC ms and height in m above ground that a section shows. */
export interface SectionExtent {
  readonly startMs: number;
  readonly endMs: number;
  readonly bottom: number;
  readonly top: number;
}

/** A place on the section. */
export interface SectionPoint {
  readonly timeMs: number;
  readonly height: number;
}

export interface ExtentLimits {
  /** The whole of what can be seen: data and outlook. */
  readonly whole: SectionExtent;
  /** Least time, ms, and height, m, that fill the section; ten minutes and 50 m unless told. */
  readonly leastMs?: number;
  readonly leastHeight?: number;
}

export type ZoomWay = 'time' | 'height' | 'both';

/**
 * Zooms about a place, which keeps its pixel.
 * @param factor below 1 shows less, above 1 more
 */
export function zoomExtent(
  extent: SectionExtent,
  factor: number,
  about: SectionPoint,
  way: ZoomWay,
  limits: ExtentLimits,
): SectionExtent {
  const { startMs, endMs, bottom, top } = extent;
  const inTime = way !== 'height';
  const inHeight = way !== 'time';
  return boundExtent(
    {
      startMs: inTime ? about.timeMs + factor * (startMs - about.timeMs) : startMs,
      endMs: inTime ? about.timeMs + factor * (endMs - about.timeMs) : endMs,
      bottom: inHeight ? about.height + factor * (bottom - about.height) : bottom,
      top: inHeight ? about.height + factor * (top - about.height) : top,
    },
    limits,
  );
}

/** Moves by shares of what is shown: later and higher are positive. It stops at the limits without changing the zoom. */
export function panExtent(
  extent: SectionExtent,
  timeShare: number,
  heightShare: number,
  limits: ExtentLimits,
): SectionExtent {
  const later = timeShare * (extent.endMs - extent.startMs);
  const higher = heightShare * (extent.top - extent.bottom);
  const { startMs, endMs, bottom, top } = extent;
  return boundExtent(
    { startMs: startMs + later, endMs: endMs + later, bottom: bottom + higher, top: top + higher },
    limits,
  );
}

/** Brings an extent inside the limits: moved if it fits, cut if it is too large, widened if it is too small. */
export function boundExtent(extent: SectionExtent, limits: ExtentLimits): SectionExtent {
  const { whole, leastMs = 600_000, leastHeight = 50 } = limits;
  const [startMs, endMs] = bound(extent.startMs, extent.endMs, whole.startMs, whole.endMs, leastMs);
  const [bottom, top] = bound(extent.bottom, extent.top, whole.bottom, whole.top, leastHeight);
  return { startMs, endMs, bottom, top };
}

function bound(low: number, high: number, least: number, most: number, leastSpan: number): [number, number] {
  const span = Math.min(most - least, Math.max(leastSpan, high - low));
  const middle = (low + high) / 2;
  const from = Math.min(Math.max(middle - span / 2, least), most - span);
  return [from, from + span];
}
