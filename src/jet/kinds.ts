// What kind of jet a track is, as probabilities with their reasons; undecided is a fine answer.

import { JET_KINDS, type Evidence, type JetKind } from './evidence.ts';
import { barrierEvidence, nocturnalEvidence, otherEvidence, valleyEvidence, type KindCase } from './kind-evidence.ts';

export interface KindFinding {
  /** Probability of each kind; together 1. */
  readonly kinds: Readonly<Record<JetKind, number>>;
  /** The kind that is more likely than all others together, with some margin. */
  readonly kind: JetKind | 'undecided';
  readonly evidence: readonly Evidence[];
}

/** Odds before anything is looked at: terrain kinds only where terrain of that kind bears on the station. */
const BEFOREHAND: Readonly<Record<JetKind, number>> = { nocturnal: 1, barrier: 0.5, 'valley-exit': 0.5, other: 1 };
/** Below this probability nothing is decided. Our own choice. */
const DECIDED = 0.6;

/** Weighs the evidence for each kind. */
export function kindOf(kindCase: KindCase): KindFinding {
  const rows: Record<JetKind, readonly Evidence[]> = {
    nocturnal: nocturnalEvidence(kindCase),
    barrier: strongest(kindCase, 'barrier'),
    'valley-exit': strongest(kindCase, 'valley'),
    other: otherEvidence(kindCase),
  };
  const odds = JET_KINDS.map((kind) => {
    const terrain = kind === 'barrier' || kind === 'valley-exit';
    return terrain && rows[kind].length === 0 ? 0 : BEFOREHAND[kind] * Math.exp(sum(rows[kind]));
  });
  const all = odds.reduce((total, one) => total + one, 0);
  const kinds = Object.fromEntries(JET_KINDS.map((kind, k) => [kind, odds[k]! / all])) as Record<JetKind, number>;
  const likeliest = JET_KINDS.reduce((best, kind) => (kinds[kind] > kinds[best] ? kind : best));
  return {
    kinds,
    kind: kinds[likeliest] >= DECIDED ? likeliest : 'undecided',
    evidence: JET_KINDS.flatMap((kind) => rows[kind]),
  };
}

/** Evidence for the axis of a kind that it speaks for most; none where no such axis bears on the station. */
function strongest(kindCase: KindCase, kind: 'barrier' | 'valley'): readonly Evidence[] {
  const rows = kindCase.axes
    .filter((axis) => axis.kind === kind)
    .map((axis) => (kind === 'barrier' ? barrierEvidence(kindCase, axis) : valleyEvidence(kindCase, axis)));
  return rows.sort((a, b) => sum(b) - sum(a))[0] ?? [];
}

function sum(rows: readonly Evidence[]): number {
  return rows.reduce((total, { weight }) => total + weight, 0);
}
