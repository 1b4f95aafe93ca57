// What speaks for and against each kind of jet, one row for each thing looked at.

/** What makes a jet: night over plain ground, air dammed against a barrier, air out of a valley, or something else. */
export const JET_KINDS = ['nocturnal', 'barrier', 'valley-exit', 'other'] as const;
export type JetKind = (typeof JET_KINDS)[number];

export interface Evidence {
  /** In words: `onset after sunset`. */
  readonly lookedAt: string;
  /** NaN where it could not be known; the row then weighs nothing. */
  readonly value: number;
  readonly unit: string;
  /** What the value is held against, in words with its number: `at most 30`. */
  readonly threshold: string;
  readonly speaksFor: JetKind;
  /** Natural logarithm of the odds: positive for that kind, negative against it. Our own choice throughout. */
  readonly weight: number;
  /** Published source of the threshold, or that it is common practice. */
  readonly source: string;
}

export const COMMON_PRACTICE = 'common practice, without source';
const OWN_CHOICE = 'our own choice';

/** A step of a scale: values up to and including `upTo` weigh this much. */
type Scale = readonly (readonly [upTo: number, weight: number])[];

/** A row whose weight is read off a scale; nothing where the value is not known. */
export function row(
  speaksFor: JetKind,
  lookedAt: string,
  value: number,
  unit: string,
  threshold: string,
  scale: Scale,
  source: string = OWN_CHOICE,
): Evidence {
  const step = Number.isNaN(value) ? undefined : scale.find(([upTo]) => value <= upTo);
  return { lookedAt, value, unit, threshold, speaksFor, weight: step?.[1] ?? 0, source };
}
