// Profiles as OGC CoverageJSON (OGC 21-069r2): a coverage of domain type VerticalProfile each, gathered in a collection.

import { toJsonNumber } from '../../air/index.ts';
import { markNames, profileAt, type Profile, type ProfileBlock } from '../../profile/index.ts';
import { OUT_QUANTITIES, type OutQuantity } from './quantities.ts';

/** Prefix of the members that the standard does not know: what it has no place for. */
const OWN = 'duskveer';

const REFERENCING = [
  {
    coordinates: ['x', 'y'],
    system: { type: 'GeographicCRS', id: 'http://www.opengis.net/def/crs/OGC/1.3/CRS84' },
  },
  {
    coordinates: ['z'],
    system: {
      type: 'VerticalCRS',
      cs: { csAxes: [{ name: { en: 'Height above ground' }, direction: 'up', unit: { symbol: 'm' } }] },
    },
  },
  { coordinates: ['t'], system: { type: 'TemporalRS', calendar: 'Gregorian' } },
];

/**
 * A CoverageCollection as text. Levels without height, and the second of two at one height, have no place on a coverage's
 * axis and stay behind, as do profiles without a level left. A station without position gives a domain without x and y.
 */
export function writeCoverageJson(blocks: readonly ProfileBlock[]): string {
  const used = OUT_QUANTITIES.filter(({ column }) => blocks.some((block) => block[column] !== null));
  const coverages = blocks.flatMap((block) =>
    Array.from({ length: block.profileCount }, (_, index) => coverageOf(profileAt(block, index), used)),
  );
  return JSON.stringify({
    '@context': ['https://covjson.org/context.jsonld', { [OWN]: `urn:${OWN}:` }],
    type: 'CoverageCollection',
    parameters: Object.fromEntries(used.map((quantity) => [quantity.name, parameterOf(quantity)])),
    referencing: REFERENCING,
    coverages: coverages.filter((coverage) => coverage !== null),
  });
}

function parameterOf({ standardName, ucum, title }: OutQuantity): object {
  // A modifier behind a standard name ("standard_error") is no name of its own in the vocabulary.
  const id = /^\w+$/u.test(standardName) ? { id: `http://vocab.nerc.ac.uk/standard_name/${standardName}` } : {};
  return {
    type: 'Parameter',
    unit: { symbol: { value: ucum, type: 'http://www.opengis.net/def/uom/UCUM/' } },
    observedProperty: { ...id, label: { en: title } },
  };
}

function coverageOf(profile: Profile, quantities: readonly OutQuantity[]): object | null {
  const { station, timeMs, heightAgl, levelCount } = profile;
  const levels = Array.from({ length: levelCount }, (_, k) => k).filter(
    (k) => heightAgl[k]! > (heightAgl[k - 1] ?? -Infinity),
  );
  if (levels.length === 0 || !Number.isFinite(timeMs)) return null;
  const list = (values: Float32Array): (number | null)[] => levels.map((k) => plainNumber(values[k]!));
  const isPlaced = Number.isFinite(station.latitude) && Number.isFinite(station.longitude);
  const time = new Date(timeMs).toISOString();
  const marks = levels.map((k) => markNames(profile.mark[k]!).join(' '));
  return {
    type: 'Coverage',
    id: `urn:${OWN}:${encodeURIComponent(station.id)}:${time}`,
    domain: {
      type: 'Domain',
      ...(isPlaced ? { domainType: 'VerticalProfile' } : {}),
      axes: {
        ...(isPlaced ? { x: { values: [station.longitude] }, y: { values: [station.latitude] } } : {}),
        z: { values: list(heightAgl) },
        t: { values: [time] },
      },
    },
    ranges: Object.fromEntries(
      quantities.flatMap(({ column, name }) => {
        const values = profile[column];
        if (values === null) return [];
        return [
          [
            name,
            { type: 'NdArray', dataType: 'float', axisNames: ['z'], shape: [levels.length], values: list(values) },
          ],
        ];
      }),
    ),
    [`${OWN}:profile`]: {
      station: station.id,
      name: station.name,
      elevation_m: toJsonNumber(station.elevation, 2),
      instrument: profile.instrument,
      period_s: toJsonNumber(profile.periodS, 3),
      ...(marks.some((mark) => mark !== '') ? { mark: marks } : {}),
    },
  };
}

/** A float in as few digits as tell it from its neighbours; null where missing. */
function plainNumber(value: number): number | null {
  if (!Number.isFinite(value)) return null;
  const short = Number(value.toPrecision(7));
  return Math.fround(short) === value ? short : Number(value.toPrecision(9));
}
