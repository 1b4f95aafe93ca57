// Rays of unequal length. CF/Radial (version 1.4, section 4.3, from memory) then strings the gates of all rays together along
// `n_points`, and `ray_start_index` and `ray_n_gates` tell which are whose. Here they become rows of equal length again.

import { DuskveerError } from '../../air/index.ts';
import type { Dataset, RawNumbers, Variable } from '../netcdf/dataset.ts';
import { asMeant } from '../netcdf/values.ts';

/** More gates than any sweep has, filled up ones included: a file that announces so many is damaged. */
const MOST_GATES = 2 ** 26;

/** The dataset with each variable along `n_points` laid out by ray and gate; itself where it has none. */
export function withEvenRays(dataset: Dataset): Dataset {
  const starts = dataset.variables.get('ray_start_index');
  const counts = dataset.variables.get('ray_n_gates');
  const gates = dataset.variables.get('range');
  const [rays] = starts?.dimensions ?? [];
  const [gateDimension] = gates?.dimensions ?? [];
  if (starts === undefined || counts === undefined || rays === undefined || gateDimension === undefined) return dataset;
  if (starts.type === 'text' || counts.type === 'text' || counts.dimensions.join() !== rays) return dataset;
  const variables = new Map(dataset.variables);
  for (const [name, variable] of dataset.variables) {
    const isStrung =
      variable.type !== 'text' && variable.dimensions.length === 1 && variable.dimensions[0] === 'n_points';
    if (!isStrung) continue;
    const shape = [starts.shape[0]!, gates!.shape[0]!] as const;
    variables.set(name, {
      name: variable.name,
      type: variable.type,
      attributes: variable.attributes,
      dimensions: [rays, gateDimension],
      shape,
      numbers: (from = 0, to = shape[0]) => spread(dataset.source, variable, starts, counts, shape[1], from, to),
      texts: () => [],
    });
  }
  return { ...dataset, variables };
}

/** Rays `from` up to `to`, each as long as the longest can be; NaN where a ray has no gate. */
function spread(
  source: string,
  variable: Variable,
  starts: Variable,
  counts: Variable,
  gates: number,
  from: number,
  to: number,
): RawNumbers {
  const start = starts.numbers();
  const count = counts.numbers();
  const points = variable.shape[0]!;
  const ends = Array.from({ length: to - from }, (_, k) => start[from + k]! + count[from + k]!);
  const isSound = ends.every((end, k) => {
    const first = start[from + k]!;
    return Number.isInteger(first) && first >= 0 && end >= first && end <= points && end - first <= gates;
  });
  if (!isSound || (to - from) * gates > MOST_GATES) throw unsound(source);
  const first = ends.reduce((least, _, k) => Math.min(least, start[from + k]!), points);
  const last = ends.reduce((most, end) => Math.max(most, end), first);
  const strung = asMeant(variable.numbers(first, last), variable);
  const rows = new Float64Array((to - from) * gates).fill(NaN);
  ends.forEach((end, k) => rows.set(strung.subarray(start[from + k]! - first, end - first), k * gates));
  return rows;
}

function unsound(source: string): DuskveerError {
  return new DuskveerError({
    code: 'ingest/scan-rays',
    what: 'The beginnings and lengths of the rays do not fit the gates that the file holds.',
    mend: 'Fetch the file again; if it stays so, ask its provider for an intact copy.',
    where: { source, key: 'ray_start_index' },
  });
}
