// The parts of a report joined to one ascent: each level once, with every value that any part gives of it.

import type { CodedLevel, PartContent } from './levels.ts';
import type { ReportHead } from './report-head.ts';
import type { Part, Platform, Report } from './reports.ts';

interface PartOfAscent {
  readonly content: PartContent;
  readonly correction: boolean;
}

/** One sounding of one station, as far as its parts have come. */
export class Ascent {
  readonly head: ReportHead;
  readonly platform: Platform;
  readonly nominalMs: number;
  /** A part of TEMP is among the parts: the sounding carries temperatures. */
  hasTemp = false;
  corrected = false;
  /** Equipment that PILOT names (code table 0265). */
  equipment = '/';
  readonly #parts = new Map<string, PartOfAscent>();

  constructor(head: ReportHead, platform: Platform, nominalMs: number) {
    this.head = head;
    this.platform = platform;
    this.nominalMs = nominalMs;
  }

  /** Takes a part. A correction replaces what came before; of two alike the fuller one stays. */
  take(report: Report, head: ReportHead, content: PartContent): void {
    if (report.code === 'temp') this.hasTemp = true;
    else this.equipment = head.indicator;
    const key = `${report.code} ${report.part}`;
    const known = this.#parts.get(key);
    if (report.correction) this.corrected = true;
    const better =
      known === undefined ||
      (report.correction && !known.correction) ||
      (report.correction === known.correction && content.levels.length >= known.content.levels.length);
    if (better) this.#parts.set(key, { content, correction: report.correction });
  }

  /** Names of the parts that have come, `A B`. */
  get parts(): readonly Part[] {
    return [...new Set([...this.#parts.keys()].map((key) => key.at(-1) as Part))].sort();
  }

  get release(): PartContent['release'] {
    for (const { content } of this.#parts.values()) if (content.release !== null) return content.release;
    return null;
  }

  /** Levels by falling pressure, then those of which only the height is known, each level once. */
  levels(): CodedLevel[] {
    const byPlace = new Map<string, CodedLevel>();
    for (const key of [...this.#parts.keys()].sort((a, b) => b.localeCompare(a) * (a[0] === b[0] ? -1 : 1))) {
      for (const level of this.#parts.get(key)!.content.levels) {
        const place = level.surface
          ? 'surface'
          : Number.isNaN(level.pressure)
            ? `h${level.height}`
            : `p${Math.round(level.pressure)}`;
        const known = byPlace.get(place);
        byPlace.set(place, known === undefined ? level : joined(known, level));
      }
    }
    const levels = withoutSecondSurface([...byPlace.values()]);
    const rank = ({ pressure }: CodedLevel): number => (Number.isNaN(pressure) ? -1 : pressure);
    return levels.sort((a, b) => rank(b) - rank(a) || a.height - b.height);
  }
}

/** What the first level leaves open, the second fills. */
function joined(first: CodedLevel, second: CodedLevel): CodedLevel {
  const either = (a: number, b: number): number => (Number.isNaN(a) ? b : a);
  const wind = Number.isNaN(first.speed) ? second : first;
  return {
    pressure: either(first.pressure, second.pressure),
    height: either(first.height, second.height),
    shortHeight: either(first.shortHeight, second.shortHeight),
    cycle: either(first.cycle, second.cycle),
    temperature: either(first.temperature, second.temperature),
    dewPoint: either(first.dewPoint, second.dewPoint),
    speed: wind.speed,
    direction: wind.direction,
    surface: first.surface || second.surface,
  };
}

/** A standard surface that coincides with the ground is the same level. */
function withoutSecondSurface(levels: readonly CodedLevel[]): CodedLevel[] {
  const surface = levels.find((level) => level.surface);
  if (surface === undefined) return [...levels];
  const twins = levels.filter((level) => !level.surface && Math.abs(level.pressure - surface.pressure) < 1);
  return [...levels.filter((level) => level !== surface && !twins.includes(level)), twins.reduce(joined, surface)];
}
