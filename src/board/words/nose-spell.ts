// When the nose came into a disc and how long it stayed.

/** A spell of the nose between the tips. */
export interface NoseSpell {
  /** UTC ms: the first profile that shows it there, and the last. */
  readonly enteredMs: number;
  readonly lastMs: number;
  /** Whether the newest profile with a nose still shows it there, short absences aside. */
  readonly lasts: boolean;
}

/** Absences shorter than this, ms, do not end a spell: a nose at the upper tip flickers between two levels. */
const ABSENCE_MS = 30 * 60_000;

/**
 * The newest spell of a night.
 * @param inDisc at each time; null where there is no nose
 */
export function noseSpell(timeMs: readonly number[], inDisc: readonly (boolean | null)[]): NoseSpell | null {
  let spell: { enteredMs: number; lastMs: number } | null = null;
  timeMs.forEach((at, k) => {
    if (inDisc[k] !== true) return;
    if (spell !== null && at - spell.lastMs <= ABSENCE_MS) spell.lastMs = at;
    else spell = { enteredMs: at, lastMs: at };
  });
  const found = spell as { enteredMs: number; lastMs: number } | null;
  if (found === null) return null;
  return { ...found, lasts: (timeMs.at(-1) ?? NaN) - found.lastMs <= ABSENCE_MS };
}
