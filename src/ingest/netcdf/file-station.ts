// Where a file's profiles were measured, and with what: from its variables first, from its global attributes otherwise.

import type { Quantity } from '../../air/index.ts';
import type { Instrument, Station } from '../../profile/index.ts';
import { stationBySite, stationOfFileName, type KnownStations } from '../site-station.ts';
import { numbersOf, textOf, type Attributes, type Dataset, type Variable } from './dataset.ts';
import type { Piece } from './gather.ts';
import { unitIn } from './roles.ts';

/** The stations of a piece and which profile belongs to which. */
export interface FileStations {
  readonly stations: readonly Station[];
  readonly stationIndex: Uint16Array;
}

const LATITUDES = 'lat latitude station_latitude site_latitude stn_lat';
const LONGITUDES = 'lon long longitude station_longitude site_longitude stn_lon';
const ELEVATIONS =
  'elevation elev station_elevation station_height station_altitude site_altitude surface_altitude zsfc altitude alt height_of_station';
const IDENTIFIERS =
  'wigos_station_identifier wigos_id wmo_id wmo_number station_id station_identifier station site_id platform_id';
const NAMES = 'station_name site_name location site platform_name platform facility_id';

const AS_IT_IS = { scale: 1, offset: 0 };

/** @param heightName name of the variable that holds the levels' heights: it is not the station's */
export function stationsOf(
  dataset: Dataset,
  piece: Piece,
  heightName: string | undefined,
  known: KnownStations,
): FileStations {
  const latitude = column(dataset, piece, LATITUDES, 'latitude', 'angle');
  const longitude = column(dataset, piece, LONGITUDES, 'longitude', 'angle');
  const elevation = column(dataset, piece, ELEVATIONS, 'surface_altitude', 'length', heightName);
  const { id, name } = namesOf(dataset);
  const identifiers = textsByProfile(dataset, piece, stationNames(dataset));
  const titles = textsByProfile(dataset, piece, stationTitles(dataset));
  const stations: Station[] = [];
  const places = new Map<string, number>();
  const stationIndex = new Uint16Array(piece.profileCount);
  for (let index = 0; index < piece.profileCount; index++) {
    const own = identifiers?.[index] ?? id;
    const key = [own, latitude[index], longitude[index], elevation[index]].join(' ');
    let place = places.get(key);
    if (place === undefined) {
      place = stations.length;
      places.set(key, place);
      const found = stationBySite(known, {
        id: own,
        name: titles?.[index] ?? (name === '' || identifiers !== null ? own : name),
        latitude: latitude[index]!,
        longitude: longitude[index]!,
        elevation: elevation[index]!,
      });
      const title = stationOfFileName(dataset.source);
      stations.push(found.id === '' ? { ...found, id: title, name: found.name === '' ? title : found.name } : found);
    }
    stationIndex[index] = place;
  }
  return { stations, stationIndex };
}

/** What the file says of its maker, sought for the words that tell instruments apart. */
export function instrumentOf(dataset: Dataset, launched: boolean): Instrument {
  const words = [
    'title',
    'source',
    'instrument',
    'instrument_type',
    'platform',
    'platform_type',
    'description',
    'summary',
  ]
    .map((name) => textOf(dataset.attributes, name))
    .join(' ; ');
  const kinds: readonly (readonly [RegExp, Instrument])[] = [
    [/drop ?sonde/iu, 'dropsonde'],
    [/radio ?sonde|rawinsonde|sounding|weather balloon/iu, 'radiosonde'],
    [/pilot balloon|pibal/iu, 'pilot-balloon'],
    [/wind ?profiler|profiling radar|radar wind/iu, 'wind-profiler'],
    [/lidar/iu, 'lidar'],
    [/sodar/iu, 'sodar'],
    [/radar/iu, 'radar'],
    [/\bmast\b|tower/iu, 'mast'],
    [/\bmodel\b|reanalysis|forecast/iu, 'model'],
  ];
  const said = kinds.find(([pattern]) => pattern.test(words))?.[1];
  return said ?? (launched ? 'radiosonde' : 'unknown');
}

/** A value for each profile, by standard name, by name, by global attribute of that name; NaN where nothing tells. */
function column(
  dataset: Dataset,
  piece: Piece,
  names: string,
  standardName: string,
  quantity: Quantity,
  except?: string,
): Float64Array {
  for (const variable of placing(dataset, names, standardName)) {
    if (variable.name === except) continue;
    const unit = unitIn(textOf(variable.attributes, 'units'));
    // An `elevation` in degrees is that of a beam.
    if (unit !== null && unit.quantity !== quantity) continue;
    const values = piece.perProfileOrStation(variable, unit ?? AS_IT_IS, dataset);
    if (values?.some((value) => !Number.isNaN(value)) === true) return values;
  }
  const global = names
    .split(' ')
    .map((name) => numbersOf(dataset.attributes, name)[0] ?? parseFloat(textOf(dataset.attributes, name)))
    .find((value) => Number.isFinite(value));
  return new Float64Array(piece.profileCount).fill(global ?? NaN);
}

function placing(dataset: Dataset, names: string, standardName: string): Variable[] {
  const numeric = [...dataset.variables.values()].filter((variable) => variable.type !== 'text');
  const byStandard = numeric.filter((variable) => textOf(variable.attributes, 'standard_name') === standardName);
  const byName = names
    .split(' ')
    .flatMap((name) =>
      numeric.filter((variable) => variable.name.toLowerCase() === name && !byStandard.includes(variable)),
    );
  return [...byStandard, ...byName];
}

/** Identifier and name of the file's only station; empty where it names none. */
function namesOf(dataset: Dataset): { id: string; name: string } {
  const single = [...dataset.variables.values()].filter(
    (variable) => variable.type === 'text' && variable.dimensions.length === 0,
  );
  const inVariable = (names: string): string =>
    single.find((variable) => names.split(' ').includes(variable.name.toLowerCase()))?.texts()[0] ?? '';
  const name = inVariable(NAMES) || firstText(dataset.attributes, NAMES);
  const id =
    identifierVariable(dataset)?.texts()[0] ?? (inVariable(IDENTIFIERS) || firstText(dataset.attributes, IDENTIFIERS));
  // Some archives split the two: a site's short name, and a facility there as "C1: Place, Region".
  const facility = /^(\w+):\s*(.+)$/u.exec(textOf(dataset.attributes, 'facility_id'));
  if (facility !== null && id === textOf(dataset.attributes, 'site_id')) {
    return { id: id + facility[1]!, name: facility[2]! };
  }
  return { id: id.trim() === '' ? name.trim() : id.trim(), name: name.trim() };
}

function firstText(attributes: Attributes, names: string): string {
  return (
    names
      .split(' ')
      .map((name) => textOf(attributes, name))
      .find((text) => text !== '') ?? ''
  );
}

/** The variable CF marks as the station's identifier, if it holds a single one. */
function identifierVariable(dataset: Dataset): Variable | undefined {
  return stationNames(dataset).find((variable) => variable.dimensions.length === 0);
}

function stationNames(dataset: Dataset): Variable[] {
  return [...dataset.variables.values()].filter(
    (variable) =>
      variable.type === 'text' &&
      (textOf(variable.attributes, 'cf_role') === 'timeseries_id' ||
        ['platform_id', 'platform_name'].includes(textOf(variable.attributes, 'standard_name'))),
  );
}

function stationTitles(dataset: Dataset): Variable[] {
  const names = NAMES.split(' ');
  return [...dataset.variables.values()].filter(
    (variable) => variable.type === 'text' && names.includes(variable.name.toLowerCase()),
  );
}

/** Texts by profile where the file holds several stations; null where none of the variables lies along stations. */
function textsByProfile(dataset: Dataset, piece: Piece, variables: readonly Variable[]): string[] | null {
  const variable = variables.find((candidate) => candidate.dimensions.length === 1);
  if (variable === undefined) return null;
  const places = piece.indexAlong(variable.dimensions[0]!, dataset);
  if (places === null) return null;
  const texts = variable.texts();
  return Array.from(places, (place) => texts[place]?.trim() ?? '');
}
