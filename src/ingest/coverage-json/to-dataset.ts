// One coverage as the same small view of dimensions and variables that netCDF files give, so that what is a wind and what
// a height is told in one place for both.

import { DuskveerError, fromJsonNumber, type Problem } from '../../air/index.ts';
import { INSTRUMENTS, MARK, MARKS, type Instrument, type MarkName } from '../../profile/index.ts';
import { sizeOf, type AttributeValue, type Dataset, type Variable } from '../netcdf/dataset.ts';
import { labelIn, listIn, objectIn, textIn, type JsonObject } from './json.ts';

/** Prefix of the members of this house's own writing. */
const OWN = 'duskveer:profile';

/** Units as UCUM spells them that nobody else does. */
const UCUM: Readonly<Record<string, string>> = {
  Cel: 'degC',
  '[degF]': 'degF',
  '[kn_i]': 'kt',
  '[ft_i]': 'ft',
  'm[H2O]': '',
  'm.s-1': 'm s-1',
  'km/h': 'km/h',
};

/** Vertical reference systems that count from mean sea level (EPSG: MSL, EGM96, EGM2008, NAVD88, EVRF). */
const SEA_LEVEL = /\/(?:5714|5773|3855|5703|5621|5730|9389)$/u;

export interface CoverageParts {
  readonly source: string;
  /** Number of the coverage in its file, from one. */
  readonly record: number;
  /** Parameters and references stated for all coverages. */
  readonly collection: JsonObject;
  readonly mostValues: number;
}

/**
 * @throws DuskveerError `ingest/coverage-unusable` when its domain is no profile
 */
export function datasetOfCoverage(coverage: JsonObject, parts: CoverageParts): Dataset {
  const problems: Problem[] = [];
  const domain = objectIn(coverage.domain);
  const axes = objectIn(domain.axes);
  const fail = (what: string): never => {
    throw new DuskveerError(problemOf(parts, 'ingest/coverage-unusable', what));
  };
  if (typeof coverage.domain === 'string') fail('The domain of the coverage is kept elsewhere.');
  if (axes.composite !== undefined) fail('The coverage lies along a path or is a set of shapes, not a profile.');
  const lengths = new Map<string, number>();
  const variables = new Map<string, Variable>();
  const add = (variable: Variable): void => void variables.set(variable.name, variable);

  for (const [name, axis] of Object.entries(axes)) {
    const values = axisValues(axis, parts.mostValues);
    if (values === null) fail(`The axis ${name} cannot be read.`);
    else if (values.length > 0) {
      lengths.set(name, values.length);
      const made = axisVariable(name, values, referenceOf(domain, parts.collection, name));
      if (made !== null) add(made);
    }
  }
  const parameters = { ...objectIn(parts.collection.parameters), ...objectIn(coverage.parameters) };
  for (const [name, range] of Object.entries(objectIn(coverage.ranges))) {
    const made = rangeVariable(name, range, objectIn(parameters[name]), lengths);
    if (typeof made === 'string') problems.push(problemOf(parts, 'ingest/coverage-range', made, name));
    else add(made);
  }
  const attributes = ownMembers(objectIn(coverage[OWN]), lengths, add);
  if (!attributes.has('station_id')) {
    const place = placeName(variables);
    if (place !== '') attributes.set('station_id', place);
  }
  return { source: parts.source, dimensions: lengths, attributes, variables, groups: [], problems };
}

function problemOf({ source, record }: CoverageParts, code: string, what: string, key?: string): Problem {
  return {
    code,
    what,
    mend: 'Give each profile as a coverage of domain type VerticalProfile with its values in the file itself.',
    where: key === undefined ? { source, record } : { source, record, key },
  };
}

/** Numbers or texts of an axis, listed or by start, stop and number; null when it is neither. */
function axisValues(axis: unknown, most: number): readonly (number | string)[] | null {
  const { values, start, stop, num } = objectIn(axis);
  if (Array.isArray(values)) {
    const known = values.filter((value) => typeof value === 'number' || typeof value === 'string');
    return known.length === values.length ? known : null;
  }
  if (typeof start !== 'number' || typeof stop !== 'number' || typeof num !== 'number') return null;
  if (!(num >= 1 && num <= most && Number.isInteger(num))) return null;
  const step = num === 1 ? 0 : (stop - start) / (num - 1);
  return Array.from({ length: num }, (_, k) => start + k * step);
}

function referenceOf(domain: JsonObject, collection: JsonObject, axis: string): JsonObject {
  const stated = [...listIn(domain.referencing), ...listIn(collection.referencing)].map(objectIn);
  return objectIn(stated.find(({ coordinates }) => listIn(coordinates).includes(axis))?.system);
}

function axisVariable(name: string, values: readonly (number | string)[], system: JsonObject): Variable | null {
  if (name === 't') {
    const times = values.map((value) => (typeof value === 'string' ? Date.parse(value) : NaN));
    return numeric('time', [name], times, { units: 'milliseconds since 1970-01-01', standard_name: 'time' });
  }
  const numbers = values.map((value) => (typeof value === 'number' ? value : NaN));
  if (name === 'x' || name === 'y') {
    // A projected system's coordinates are no degrees; the position is then not known.
    if (textIn(system.type) !== '' && textIn(system.type) !== 'GeographicCRS') return null;
    const [title, units] = name === 'x' ? ['longitude', 'degrees_east'] : ['latitude', 'degrees_north'];
    return numeric(title, [name], numbers, { units: units, standard_name: title });
  }
  if (name !== 'z') return null;
  const axis = objectIn(listIn(objectIn(system.cs).csAxes)[0]);
  const words = `${labelIn(axis.name)} ${labelIn(system.description)}`.trim();
  const units = unitText(axis.unit);
  const isPressure = /pressure/iu.test(words) || /^h?pa$/iu.test(units);
  const isSea = SEA_LEVEL.test(textIn(system.id));
  return numeric(isPressure ? 'air_pressure' : 'height', [name], numbers, {
    units: units === '' ? 'm' : units,
    long_name: words,
    ...(isPressure ? { standard_name: 'air_pressure' } : isSea ? { standard_name: 'altitude' } : {}),
  });
}

/** A parameter's values, or in words why they cannot be had. */
function rangeVariable(
  name: string,
  range: unknown,
  parameter: JsonObject,
  lengths: ReadonlyMap<string, number>,
): Variable | string {
  const { type, values, axisNames, shape } = objectIn(range);
  if (type !== 'NdArray' || !Array.isArray(values)) return `The values of ${name} are not in the file itself.`;
  const dimensions = listIn(axisNames).map(textIn);
  const stated = listIn(shape).map(fromJsonNumber);
  const fits = dimensions.every((axis, k) => lengths.get(axis) === (stated[k] ?? NaN));
  if (!fits || sizeOf(stated) !== values.length) return `The values of ${name} do not fit the axes of the coverage.`;
  const property = objectIn(parameter.observedProperty);
  const standardName = /standard_name\/(\w+)\/?$/u.exec(textIn(property.id))?.[1] ?? '';
  const units = unitText(parameter.unit);
  return numeric(
    name,
    dimensions,
    (values as unknown[]).map(fromJsonNumber),
    {
      long_name: labelIn(property.label),
      ...(units === '' ? {} : { units }),
      ...(standardName === '' ? {} : { standard_name: standardName }),
    },
    stated,
  );
}

function unitText(unit: unknown): string {
  const { symbol } = objectIn(unit);
  const text = typeof symbol === 'string' ? symbol : textIn(objectIn(symbol).value);
  return UCUM[text] ?? text;
}

/** What this house's own writing says beyond the standard, as attributes and as variables. */
function ownMembers(
  own: JsonObject,
  lengths: ReadonlyMap<string, number>,
  add: (variable: Variable) => void,
): Map<string, AttributeValue> {
  const attributes = new Map<string, AttributeValue>();
  if (textIn(own.station) !== '') attributes.set('station_id', textIn(own.station));
  if (textIn(own.name) !== '') attributes.set('station_name', textIn(own.name));
  if (typeof own.elevation_m === 'number') attributes.set('station_elevation', [own.elevation_m]);
  const instrument = INSTRUMENTS.indexOf(textIn(own.instrument) as Instrument);
  if (instrument >= 0) {
    add(
      numeric('instrument', [], [instrument], {
        flag_values: INSTRUMENTS.map((_, index) => index),
        flag_meanings: INSTRUMENTS.join(' '),
      }),
    );
  }
  if (typeof own.period_s === 'number') add(numeric('averaging_period', [], [own.period_s], { units: 's' }));
  const marks = listIn(own.mark).map((words) =>
    textIn(words)
      .split(' ')
      .reduce((bits, word) => bits | (Object.hasOwn(MARK, word) ? MARK[word as MarkName] : 0), 0),
  );
  if (marks.length > 0 && marks.length === lengths.get('z')) {
    add(
      numeric('quality_mark', ['z'], marks, {
        flag_masks: MARKS.map(({ bit }) => bit),
        flag_meanings: MARKS.map(({ name }) => name).join(' '),
      }),
    );
  }
  return attributes;
}

/** A name for a station that has only a place. */
function placeName(variables: ReadonlyMap<string, Variable>): string {
  const [latitude, longitude] = ['latitude', 'longitude'].map((name) => variables.get(name)?.numbers()[0]);
  return latitude === undefined || longitude === undefined ? '' : `${latitude.toFixed(3)} ${longitude.toFixed(3)}`;
}

function numeric(
  name: string,
  dimensions: readonly string[],
  values: readonly number[],
  attributes: Readonly<Record<string, AttributeValue>>,
  shape: readonly number[] = dimensions.length === 0 ? [] : [values.length],
): Variable {
  const row = sizeOf(shape.slice(1));
  return {
    name,
    type: 'f8',
    dimensions,
    shape,
    attributes: new Map(Object.entries(attributes)),
    numbers: (from = 0, to = shape[0] ?? 1) => Float64Array.from(values.slice(from * row, to * row)),
    texts: () => [],
  };
}
