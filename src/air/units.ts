// Units as people read them and as files write them. Inside the house every quantity is SI (directions in degrees,
// humidity in kg/kg or as a fraction); the factors here are exact by definition (ISO 80000, International yard 1959).

export type SpeedUnit = 'm/s' | 'kt' | 'km/h' | 'mph';
export type HeightUnit = 'm' | 'ft';

/** m/s in one knot: an international nautical mile of 1852 m an hour. */
export const KNOT = 1852 / 3600;
/** m in one international foot. */
export const FOOT = 0.3048;
const MILE = 1609.344;

const SPEED_SCALES: Readonly<Record<SpeedUnit, number>> = { 'm/s': 1, kt: KNOT, 'km/h': 1 / 3.6, mph: MILE / 3600 };
const HEIGHT_SCALES: Readonly<Record<HeightUnit, number>> = { m: 1, ft: FOOT };

/** Speed in m/s, told in the reader's unit. NaN in, NaN out. */
export function toSpeedUnit(speed: number, unit: SpeedUnit): number {
  return speed / SPEED_SCALES[unit];
}

/** Speed in the reader's unit, brought to m/s. NaN in, NaN out. */
export function fromSpeedUnit(speed: number, unit: SpeedUnit): number {
  return speed * SPEED_SCALES[unit];
}

/** Height in m, told in the reader's unit. NaN in, NaN out. */
export function toHeightUnit(height: number, unit: HeightUnit): number {
  return height / HEIGHT_SCALES[unit];
}

/** Height in the reader's unit, brought to m. NaN in, NaN out. */
export function fromHeightUnit(height: number, unit: HeightUnit): number {
  return height * HEIGHT_SCALES[unit];
}

export type Quantity =
  'speed' | 'length' | 'pressure' | 'temperature' | 'angle' | 'fraction' | 'humidity-ratio' | 'geopotential' | 'time';

/** A unit found in a file: `inside = value * scale + offset`. */
export interface ParsedUnit {
  readonly quantity: Quantity;
  readonly scale: number;
  readonly offset: number;
}

const FAHRENHEIT_SCALE = 5 / 9;

/** Spellings as `plainSpelling` leaves them: lower case, products as a blank, powers as a bare number. */
const UNITS: readonly (readonly [quantity: Quantity, scale: number, spellings: string, offset?: number])[] = [
  ['speed', 1, 'm s-1|m/s|m/sec|m sec-1|mps|meter second-1|meters second-1|meters/second|metres per second|ms-1'],
  ['speed', KNOT, 'kt|kts|kn|knot|knots'],
  ['speed', 1 / 3.6, 'km/h|km h-1|kmh|kph|km/hr|km hr-1'],
  ['speed', MILE / 3600, 'mph|mi/h|mi h-1|miles/hour'],
  ['speed', 0.01, 'cm/s|cm s-1'],
  ['speed', FOOT, 'ft/s|ft s-1'],
  ['length', 1, 'm|meter|meters|metre|metres|gpm|m agl|m asl|m amsl'],
  ['length', 1000, 'km|kilometer|kilometers|kilometre|kilometres'],
  ['length', FOOT, 'ft|foot|feet'],
  ['pressure', 1, 'pa|pascal|pascals|n m-2'],
  ['pressure', 100, 'hpa|hectopascal|hectopascals|mb|mbar|mbars|millibar|millibars'],
  ['pressure', 1000, 'kpa|kilopascal|kilopascals'],
  ['temperature', 1, 'k|kelvin|kelvins|degk|deg k|degree k|degrees k'],
  [
    'temperature',
    1,
    'c|degc|deg c|degree c|degrees c|degree celsius|degrees celsius|deg celsius|celsius|degree_c|degrees_c|deg_c|degree_celsius|degrees_celsius',
    273.15,
  ],
  [
    'temperature',
    FAHRENHEIT_SCALE,
    'f|degf|deg f|degree f|degrees f|fahrenheit|degree fahrenheit|degrees fahrenheit|deg_f|degree_f|degrees_f',
    459.67 * FAHRENHEIT_SCALE,
  ],
  [
    'angle',
    1,
    'deg|degs|degree|degrees|degrees_true|degree_true|deg_true|degrees true|degt|degree_north|degrees_north|degree_east|degrees_east|degree_n|degrees_n|degree_e|degrees_e|degn|dege|arcdegree',
  ],
  ['angle', 180 / Math.PI, 'rad|radian|radians'],
  ['fraction', 1, '|1|unitless|dimensionless|fraction|none'],
  ['fraction', 0.01, '%|percent|per cent|pct'],
  ['humidity-ratio', 1, 'kg kg-1|kg/kg'],
  ['humidity-ratio', 0.001, 'g kg-1|g/kg'],
  ['geopotential', 1, 'm2 s-2|m2/s2|j kg-1|j/kg'],
  ['time', 1, 's|sec|secs|second|seconds'],
  ['time', 0.001, 'ms|msec|millisecond|milliseconds'],
  ['time', 60, 'min|mins|minute|minutes'],
  ['time', 3600, 'h|hr|hrs|hour|hours'],
  ['time', 86_400, 'd|day|days'],
];

const BY_SPELLING: ReadonlyMap<string, ParsedUnit> = new Map(
  UNITS.flatMap(([quantity, scale, spellings, offset = 0]) =>
    spellings.split('|').map((spelling): [string, ParsedUnit] => [spelling, { quantity, scale, offset }]),
  ),
);

/**
 * Reads a unit as it stands in a file's attribute or column heading; case, brackets, powers and dots do not matter.
 * @returns null for a unit this house does not know; the empty text is a plain number (`fraction`)
 * @example parseUnit('m.s-1') // { quantity: 'speed', scale: 1, offset: 0 }
 */
export function parseUnit(text: string): ParsedUnit | null {
  return BY_SPELLING.get(plainSpelling(text)) ?? null;
}

/** A value in a file's unit, brought to the unit used inside. NaN in, NaN out. */
export function toInside(value: number, unit: ParsedUnit): number {
  return value * unit.scale + unit.offset;
}

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';

function plainSpelling(text: string): string {
  return text
    .toLowerCase()
    .replace(/[⁰¹²³⁴-⁹]/gu, (digit) => String(SUPERSCRIPTS.indexOf(digit)))
    .replace(/[⁻−–]/gu, '-')
    .replace(/[°º]\s*/gu, 'deg')
    .replace(/\*\*|\^|[[\](){}]/gu, '')
    .replace(/[.·*⋅]/gu, ' ')
    .replace(/\s*\/\s*/gu, '/')
    .replace(/\s+/gu, ' ')
    .trim();
}
