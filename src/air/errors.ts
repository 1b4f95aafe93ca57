// What went wrong, where, and how to mend it: the one shape in which trouble travels through the house.

/** A place inside an input, as precise as the reader knows it. */
export interface Place {
  /** File name, bulletin name or address. */
  readonly source?: string;
  /** Byte offset, from zero. */
  readonly byte?: number;
  /** Line of a text, from one. */
  readonly line?: number;
  /** Column heading, variable name or key. */
  readonly key?: string;
  /** Which record, message or profile, from one. */
  readonly record?: number;
}

/** Trouble as plain data: it crosses to a worker, into JSON and onto a page unchanged. */
export interface Problem {
  /** Stable, `room/kebab-case`; callers test this, never the text. */
  readonly code: string;
  /** What is wrong, one plain sentence. */
  readonly what: string;
  /** How to mend it, one plain sentence. */
  readonly mend: string;
  readonly where: Place;
  /** True when nothing was lost that the house could use: worth telling, no failure. */
  readonly mild?: boolean;
}

/** The base of every error the house throws; `problem` is what callers read. */
export class DuskveerError extends Error {
  readonly problem: Problem;

  constructor(problem: Problem, options?: ErrorOptions) {
    super(problem.what, options);
    this.name = 'DuskveerError';
    this.problem = problem;
  }

  get code(): string {
    return this.problem.code;
  }
}

/** Long work was told to stop; not a fault of the input. */
export class Cancelled extends Error {
  constructor() {
    super('Cancelled');
    this.name = 'Cancelled';
  }
}

/** @throws Cancelled when the signal has been raised. */
export function throwIfCancelled(signal: AbortSignal | undefined): void {
  if (signal?.aborted === true) throw new Cancelled();
}

/** The place in words, for a line on a page or on stderr: `night.csv, line 12, column speed`. */
export function placeInWords(place: Place): string {
  const parts: string[] = [];
  if (place.source !== undefined) parts.push(place.source);
  if (place.record !== undefined) parts.push(`record ${place.record}`);
  if (place.line !== undefined) parts.push(`line ${place.line}`);
  if (place.byte !== undefined) parts.push(`byte ${place.byte}`);
  if (place.key !== undefined) parts.push(place.key);
  return parts.join(', ');
}
