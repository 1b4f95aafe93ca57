// Which of a file's variables will be read as profiles, and how they lie.

import { DuskveerError, type Problem } from '../../air/index.ts';
import type { ReadOptions } from '../format.ts';
import { sizeOf, textOf, type Dataset, type Variable } from './dataset.ts';
import { meaningOfHeight } from './heights.ts';
import { layoutOf, type Layout } from './layout.ts';
import { candidates, type Finding, type Role, type UnknownUnit } from './roles.ts';
import { layoutByRuns } from './runs.ts';
import { findTime, type TimeSource } from './times.ts';

export interface Plan {
  readonly dataset: Dataset;
  /** The variable whose dimensions decided. */
  readonly pivot: Variable;
  readonly layout: Layout;
  /** What was found for each role but the height. */
  readonly roles: ReadonlyMap<LevelRole, Finding>;
  readonly height: Finding;
  readonly time: TimeSource;
  /** Whether one thing passed the levels one after the other, as a sonde does: the profile's time is its launch. */
  readonly launched: boolean;
}

const LEVEL_ROLES = [
  'speed',
  'direction',
  'u',
  'v',
  'verticalSpeed',
  'pressure',
  'temperature',
  'dewPoint',
  'relativeHumidity',
  'specificHumidity',
  'mixingRatio',
  'signal',
  'speedUncertainty',
  'consensus',
  'spectralWidth',
] as const satisfies readonly Role[];
/** What a level can have beside its height. */
export type LevelRole = (typeof LEVEL_ROLES)[number];

/**
 * Makes the plan.
 * @param problems told of what was passed over
 * @throws DuskveerError `ingest/netcdf-no-profiles` with what is missing
 */
export function planOf(dataset: Dataset, options: ReadOptions, problems: Problem[]): Plan {
  const unknown: UnknownUnit[] = [];
  const heights = candidates(dataset, 'height', unknown);
  const pivots = pivotsOf(dataset, unknown);
  if (pivots.length === 0) throw missing(dataset, 'wind', unknown);
  const withHeight = pivots
    .map((pivot) => ({ pivot, height: heightFor(dataset, pivot, heights) }))
    .find(({ height }) => height !== undefined);
  if (withHeight?.height === undefined) throw missing(dataset, 'height', unknown);
  const { pivot, height } = withHeight;
  const refused: Problem[] = [];
  const time = findTime(dataset, refused);
  if (time === null) throw refused[0] === undefined ? missing(dataset, 'time', unknown) : new DuskveerError(refused[0]);
  const found = layoutOf(dataset, pivot, height.variable, time.variable.dimensions, options.limits.levels);
  const runs = isOneLongRow(found, time, height)
    ? layoutByRuns(found, time.variable.numbers(), height.variable.numbers())
    : null;
  const layout = runs ?? found;
  const roles = new Map<LevelRole, Finding>();
  for (const role of LEVEL_ROLES) {
    const chosen = candidates(dataset, role).find(({ variable }) => liesAlong(variable, pivot, layout));
    if (chosen !== undefined) roles.set(role, chosen);
  }
  for (const { variable, role, units } of unknown) {
    if (role !== 'height' && !roles.has(role)) problems.push(unknownUnit(dataset, variable, units));
  }
  const launched =
    runs === null && layout.levelDimension !== null && time.variable.dimensions.includes(layout.levelDimension);
  return { dataset, pivot, layout, roles, height, time, launched };
}

/** Time and height both run along the only dimension: one ascent, or a table of many profiles. */
function isOneLongRow(
  { levelDimension, profileDimensions, ragged }: Layout,
  time: TimeSource,
  height: Finding,
): boolean {
  const alongLevels = ({ dimensions }: Variable): boolean =>
    dimensions.length === 1 && dimensions[0] === levelDimension;
  return (
    ragged === null &&
    profileDimensions.length === 0 &&
    time.unit !== null &&
    alongLevels(time.variable) &&
    alongLevels(height.variable)
  );
}

/** Variables whose dimensions can decide: winds that are complete first, then speed alone, then the air's state. */
function pivotsOf(dataset: Dataset, unknown: UnknownUnit[]): Variable[] {
  const list = (role: Role): Variable[] => candidates(dataset, role, unknown).map(({ variable }) => variable);
  const sameDimensions = (a: Variable, b: Variable): boolean =>
    a.dimensions.length === b.dimensions.length && a.dimensions.every((name) => b.dimensions.includes(name));
  const paired = (first: Variable[], second: Variable[]): Variable[] =>
    first.filter((a) => second.some((b) => sameDimensions(a, b)));
  const speeds = list('speed');
  return [
    ...paired(speeds, list('direction')),
    ...paired(list('u'), list('v')),
    ...speeds,
    ...list('temperature'),
    ...list('specificHumidity'),
  ];
}

/** The height that goes with a variable: along its dimensions, or else the only height there is. */
function heightFor(dataset: Dataset, pivot: Variable, heights: readonly Finding[]): Finding | undefined {
  const places = [...dataset.variables.values()].filter((variable) => /^lat/iu.test(variable.name));
  const fits = heights.filter(({ variable }) => {
    if (sizeOf(variable.shape) === 1 && !variable.dimensions.some((name) => pivot.dimensions.includes(name)))
      return false;
    if (variable.dimensions.length === 0 || variable.dimensions.length > pivot.dimensions.length) return false;
    if (!variable.dimensions.every((name, axis) => pivot.dimensions.includes(name) || variable.shape[axis] === 1)) {
      return false;
    }
    // An altitude that varies only from place to place is the ground's.
    const isGround =
      variable.dimensions.length < pivot.dimensions.length &&
      places.some(
        (place) => place !== variable && variable.dimensions.every((name) => place.dimensions.includes(name)),
      );
    return !isGround;
  });
  const named = textOf(pivot.attributes, 'coordinates').split(/\s+/u);
  const score = (finding: Finding): number =>
    (named.includes(finding.variable.name) ? 4 : 0) +
    (pivot.dimensions.includes(finding.variable.name) ? 2 : 0) +
    (meaningOfHeight(finding).above === 'ground' ? 1 : 0);
  const best = [...fits].sort((a, b) => score(b) - score(a))[0];
  if (best !== undefined) return best;
  return heights.find(({ variable }) => sizeOf(variable.shape) === 1 && variable.dimensions.length === 0);
}

/** Whether a variable has a value for each level. */
export function liesAlong(variable: Variable, pivot: Variable, layout: Layout): boolean {
  const { levelDimension, ragged, profileDimensions } = layout;
  if (levelDimension !== null && !variable.dimensions.includes(levelDimension)) return false;
  if (ragged !== null) return variable.dimensions.length === 1;
  if (levelDimension === null && profileDimensions.length > 0 && variable.dimensions.length === 0) return false;
  return variable.dimensions.every((name, axis) => pivot.dimensions.includes(name) || variable.shape[axis] === 1);
}

function missing(dataset: Dataset, what: 'wind' | 'height' | 'time', unknown: readonly UnknownUnit[]): DuskveerError {
  const wanted = {
    wind: ['wind', 'wind_speed with wind_from_direction, or eastward_wind with northward_wind'],
    height: ['height that goes with the wind', 'height or altitude'],
    time: ['time', 'time, in seconds, hours or days since a date'],
  } as const;
  const [thing, standardNames] = wanted[what];
  const names = [...dataset.variables.keys()];
  const listed =
    names.length === 0
      ? 'no variables'
      : `the variables ${names.slice(0, 20).join(', ')}${names.length > 20 ? ' …' : ''}`;
  const units = unknown
    .filter(({ role }) => (what === 'height') === (role === 'height'))
    .map(({ variable, units: text }) => ` ${variable.name} was passed over for its unit "${text}".`)
    .slice(0, 3)
    .join('');
  return new DuskveerError({
    code: 'ingest/netcdf-no-profiles',
    what: `No ${thing} was found: the file has ${listed}.${units}`,
    mend: `Give the variables their CF standard names (${standardNames}) and units.`,
    where: { source: dataset.source },
  });
}

function unknownUnit(dataset: Dataset, variable: Variable, units: string): Problem {
  return {
    code: 'ingest/unknown-unit',
    what: `${variable.name} was not read: its unit "${units}" is not known for this quantity.`,
    mend: 'Write the unit in a common form, such as m s-1, m, hPa, K or %.',
    where: { source: dataset.source, key: variable.name },
  };
}
