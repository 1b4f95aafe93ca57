// Profiles of differing length in a grid as long as the longest: what pads the short ones is no level.

import { VALUE_COLUMNS, type ColumnsInput } from '../../profile/index.ts';

/** The columns without levels that have neither height nor any value; the same input where there are none. */
export function withoutPadding(input: ColumnsInput): ColumnsInput {
  const { heightAgl, offsets, profileCount } = input;
  const columns = VALUE_COLUMNS.flatMap((name) => input[name] ?? []);
  const isPadding = (level: number): boolean => columns.every((column) => Number.isNaN(column[level]!));
  const kept = new Uint32Array(heightAgl.length);
  const newOffsets = new Uint32Array(profileCount + 1);
  let count = 0;
  for (let index = 0; index < profileCount; index++) {
    for (let k = offsets[index]!; k < offsets[index + 1]!; k++) {
      if (!Number.isNaN(heightAgl[k]!) || !isPadding(k)) kept[count++] = k;
    }
    newOffsets[index + 1] = count;
  }
  if (count === heightAgl.length) return input;
  const order = kept.subarray(0, count);
  const pick = <T extends Float32Array | Uint32Array>(column: T, make: new (length: number) => T): T => {
    const out = new make(count);
    for (let k = 0; k < count; k++) out[k] = column[order[k]!]!;
    return out;
  };
  const picked = Object.fromEntries(
    VALUE_COLUMNS.map((name) => {
      const column = input[name];
      return [name, column === undefined || column === null ? null : pick(column, Float32Array)];
    }),
  );
  return {
    ...input,
    ...picked,
    offsets: newOffsets,
    ...(input.mark === undefined ? {} : { mark: pick(input.mark, Uint32Array) }),
  };
}
