// What a file says of its profiles and levels in flags (CF-1.11, section 3.5): the kind of instrument, quality marks.

import { INSTRUMENTS, MARKS, type Instrument } from '../../profile/index.ts';
import { numbersOf, textOf, type Dataset, type Variable } from './dataset.ts';
import { instrumentOf } from './file-station.ts';
import type { Piece } from './gather.ts';
import { liesAlong, type Plan } from './plan.ts';

const AS_IT_IS = { scale: 1, offset: 0 };

/** Index into INSTRUMENTS for each profile: by a flag variable `instrument`, else by the file's words. */
export function instrumentsOf(dataset: Dataset, piece: Piece, launched: boolean): Uint8Array {
  const out = new Uint8Array(piece.profileCount).fill(INSTRUMENTS.indexOf(instrumentOf(dataset, launched)));
  const variable = dataset.variables.get('instrument');
  if (variable === undefined || variable.type === 'text') return out;
  const values = numbersOf(variable.attributes, 'flag_values');
  const known = new Map(
    meaningsOf(variable).flatMap((meaning, k): [number, number][] => {
      const index = INSTRUMENTS.indexOf(meaning as Instrument);
      return index < 0 || values[k] === undefined ? [] : [[values[k], index]];
    }),
  );
  piece.perProfile(variable, AS_IT_IS)?.forEach((value, index) => (out[index] = known.get(value) ?? out[index]!));
  return out;
}

/** Which correction each profile is, where the file counts them. */
export function revisionsOf(dataset: Dataset, piece: Piece): Uint8Array {
  const out = new Uint8Array(piece.profileCount);
  const variable = dataset.variables.get('revision');
  if (variable === undefined || variable.type === 'text') return out;
  piece.perProfile(variable, AS_IT_IS)?.forEach((value, index) => (out[index] = Math.min(255, Math.max(0, value))));
  return out;
}

/** Quality marks of the levels, from a bit field whose meanings are the names of this house's marks. */
export function marksOf({ dataset, pivot, layout }: Plan, piece: Piece, downward: boolean): Uint32Array | undefined {
  const found = [...dataset.variables.values()].find(
    (variable) => variable.type !== 'text' && maskOf(variable).length > 0 && liesAlong(variable, pivot, layout),
  );
  if (found === undefined) return undefined;
  const stored = piece.levels(found, AS_IT_IS, downward);
  if (stored === null) return undefined;
  const masks = maskOf(found);
  return Uint32Array.from(stored, (value) =>
    masks.reduce((bits, [mask, bit]) => ((value & mask) === 0 ? bits : bits | bit), 0),
  );
}

/** Pairs of the file's mask and the house's bit. */
function maskOf(variable: Variable): [number, number][] {
  const masks = numbersOf(variable.attributes, 'flag_masks');
  return meaningsOf(variable).flatMap((meaning, k): [number, number][] => {
    const mark = MARKS.find(({ name }) => name === meaning);
    return mark === undefined || masks[k] === undefined ? [] : [[masks[k], mark.bit]];
  });
}

function meaningsOf(variable: Variable): string[] {
  return textOf(variable.attributes, 'flag_meanings')
    .split(/\s+/u)
    .map((meaning) => meaning.replaceAll('_', '-'));
}
