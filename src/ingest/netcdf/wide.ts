// Masts and lidars often keep a variable for each height: `ws_80m`, `ws_120m`. Such a file, told as a grid.

import { parseUnit, type ParsedUnit } from '../../air/index.ts';
import { readHeading, type LevelMeaning } from '../csv/headings.ts';
import { textOf, type Dataset, type RawNumbers, type Variable } from './dataset.ts';
import { isUnfit } from './roles.ts';
import { asMeant, codingOf, decodeInto } from './values.ts';

/** What can vary with height in such a file, and what to call it in the grid. */
const NAMES: Partial<Record<LevelMeaning, string>> = {
  speed: 'speed',
  direction: 'direction',
  u: 'u',
  v: 'v',
  verticalSpeed: 'w',
  pressure: 'pressure',
  temperature: 'temperature',
  dewPoint: 'dewpoint',
  relativeHumidity: 'rh',
  specificHumidity: 'q',
  mixingRatio: 'mixing_ratio',
};

interface AtHeight {
  readonly variable: Variable;
  readonly height: number;
}

/** The dataset with such variables joined along a new dimension of heights; null when there are none. */
export function joinedByHeight(dataset: Dataset): Dataset | null {
  const groups = new Map<LevelMeaning, AtHeight[]>();
  for (const variable of dataset.variables.values()) {
    if (variable.type === 'text' || variable.dimensions.length !== 1 || isUnfit(variable)) continue;
    const heading = readHeading(variable.name);
    if (heading === null || Number.isNaN(heading.height)) continue;
    const meaning = heading.meaning as LevelMeaning;
    if (NAMES[meaning] === undefined) continue;
    groups.set(meaning, [...(groups.get(meaning) ?? []), { variable, height: heading.height }]);
  }
  const winds = groups.get('speed') ?? groups.get('u');
  if (winds === undefined) return null;
  const along = winds[0]!.variable.dimensions[0]!;
  const members = [...groups].map(([meaning, list]): [LevelMeaning, AtHeight[]] => [
    meaning,
    list.filter(({ variable }) => variable.dimensions[0] === along),
  ]);
  const heights = [...new Set(members.flatMap(([, list]) => list.map(({ height }) => height)))].sort((a, b) => a - b);
  const joined = new Map(dataset.variables);
  for (const [meaning, list] of members) {
    for (const { variable } of list) joined.delete(variable.name);
    const grid = gridOf(NAMES[meaning]!, along, heights, list);
    joined.set(grid.name, grid);
  }
  joined.set(HEIGHT, heightVariable(heights));
  return { ...dataset, variables: joined, dimensions: new Map(dataset.dimensions).set(HEIGHT, heights.length) };
}

const HEIGHT = 'height_agl';

function heightVariable(heights: readonly number[]): Variable {
  return {
    name: HEIGHT,
    type: 'f8',
    dimensions: [HEIGHT],
    shape: [heights.length],
    attributes: new Map([
      ['units', 'm'],
      ['standard_name', 'height'],
    ]),
    numbers: () => Float64Array.from(heights),
    texts: () => [],
  };
}

/** Variables at their heights as one of times by heights, decoded; a unit stays if all have the same. */
function gridOf(name: string, along: string, heights: readonly number[], members: readonly AtHeight[]): Variable {
  const rows = members[0]?.variable.shape[0] ?? 0;
  const units = members.map(({ variable }) => textOf(variable.attributes, 'units'));
  const parsed = units.map((text) => parseUnit(text));
  const isOneUnit = units.every((text) => text === units[0]);
  const factors = parsed.map((unit): Pick<ParsedUnit, 'scale' | 'offset'> =>
    isOneUnit || unit === null ? { scale: 1, offset: 0 } : unit,
  );
  return {
    name,
    type: 'f4',
    dimensions: [along, HEIGHT],
    shape: [rows, heights.length],
    attributes: new Map(isOneUnit && units[0] !== '' ? [['units', units[0]!]] : []),
    numbers(from = 0, to = rows): RawNumbers {
      const out = new Float32Array((to - from) * heights.length).fill(NaN);
      members.forEach(({ variable, height }, k) => {
        const column = heights.indexOf(height);
        const raw = asMeant(variable.numbers(from, to), variable);
        const values = new Float32Array(raw.length);
        decodeInto(values, raw, codingOf(variable), factors[k]!, new Set());
        for (let row = 0; row < values.length; row++) out[row * heights.length + column] = values[row]!;
      });
      return out;
    },
    texts: () => [],
  };
}
