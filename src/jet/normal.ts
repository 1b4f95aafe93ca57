// Standard normal numbers, always the same: the ensemble behind a confidence must give the same answer everywhere.

const SIZE = 1 << 16;

/** A table of independent standard normal numbers from a fixed seed. */
export const NORMAL: Float64Array = fillNormal(SIZE, 0x9e3779b9);

/** Marsaglia's (2003, J. Stat. Softw. 8) xorshift generator, turned into normal numbers by Box & Muller (1958). */
function fillNormal(size: number, seed: number): Float64Array {
  const table = new Float64Array(size);
  let state = seed >>> 0;
  const uniform = (): number => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return ((state >>> 0) + 0.5) / 4294967296;
  };
  for (let k = 0; k < size; k += 2) {
    const radius = Math.sqrt(-2 * Math.log(uniform()));
    const angle = 2 * Math.PI * uniform();
    table[k] = radius * Math.cos(angle);
    table[k + 1] = radius * Math.sin(angle);
  }
  return table;
}
