// What a column heading means: quantity, unit, and in wide tables the height. `ws_80m`, `speed (kt)`, `temperature_c`.

import { parseUnit, type ParsedUnit, type Quantity } from '../../air/index.ts';

/** Level quantities as tables give them, before conversion to the columns of a profile. */
export const LEVEL_MEANINGS = [
  'heightAgl',
  'heightAmsl',
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
  'speedDeviation',
  'gust',
] as const;
export type LevelMeaning = (typeof LEVEL_MEANINGS)[number];

/** What stands once a profile: its time, in one column or several, and its place. */
export type ProfileMeaning =
  | 'time'
  | 'epoch'
  | 'date'
  | 'clock'
  | 'year'
  | 'month'
  | 'day'
  | 'hour'
  | 'minute'
  | 'second'
  | 'period'
  | 'station'
  | 'name'
  | 'latitude'
  | 'longitude'
  | 'elevation'
  | 'instrument';

export type Meaning = LevelMeaning | ProfileMeaning;

export interface Heading {
  /** As written, trimmed. */
  readonly text: string;
  readonly meaning: Meaning;
  /** Null where the heading names none. */
  readonly unit: ParsedUnit | null;
  /** A unit that stands in the heading and is not known, or not one of this quantity; empty otherwise. */
  readonly wrongUnit: string;
  /** m, where the heading names the height of its column; NaN otherwise. */
  readonly height: number;
  /** Said of times: stated as UTC, stated as local, or nothing. */
  readonly zone: 'utc' | 'local' | '';
}

/** Spellings without case, blanks and separators; `time` beside `date` becomes a clock time later. */
const SPELLINGS: Readonly<Record<Meaning, string>> = {
  time: 'time datetime timestamp dateandtime validtime obstime observationtime endtime timeend zeit zeitstempel dateheure fecha',
  epoch: 'epoch unixtime unix epochtime posixtime unixtimestamp secondssince1970',
  date: 'date datum obsdate',
  clock: 'clock timeofday uhrzeit hhmm hhmmss',
  year: 'year yyyy yr',
  month: 'month mon',
  day: 'day dd_',
  hour: 'hour hr hh',
  minute: 'minute min_',
  second: 'second',
  period: 'period averagingperiod averagingtime',
  station:
    'station stationid site siteid stationname sitename stn id identifier stationidentifier location wmo wmoid wmonumber wigos wigosid wigosstationidentifier callsign platform station_',
  name: 'name',
  latitude: 'latitude lat stationlatitude',
  longitude: 'longitude lon long lng stationlongitude',
  elevation: 'elevation elev stationelevation stationheight stationaltitude groundelevation siteelevation',
  instrument: 'instrument instrumenttype',
  heightAgl: 'height hgt ht z heightaboveground heightabovegroundlevel agl measurementheight hoehe höhe',
  heightAmsl:
    'altitude alt heightabovesealevel heightabovemeansealevel amsl asl msl geopotentialheight gpheight gph geopotential',
  speed:
    'speed windspeed wspd ws wsp ff wind spd windspd wspeed windvelocity velocity horizontalwindspeed windgeschwindigkeit',
  direction: 'direction winddirection wdir wd dd dir winddir drct wdirection windrichtung horizontalwinddirection',
  u: 'u uwind windu ucomponent ucomp uwnd ugrd eastward eastwardwind uwindcomponent uspeed zonalwind',
  v: 'v vwind windv vcomponent vcomp vwnd vgrd northward northwardwind vwindcomponent vspeed meridionalwind',
  verticalSpeed:
    'w wwind windw verticalspeed verticalvelocity verticalwind verticalwindspeed upwardairvelocity wcomponent wspeed_',
  pressure: 'pressure pres press p airpressure pressurelevel plev luftdruck',
  temperature: 'temperature temp t airtemperature airtemp tair ta drybulb tdry temperatur',
  dewPoint: 'dewpoint td dewpointtemperature dewpt dpt dewp tdew',
  relativeHumidity: 'humidity relativehumidity rh relhum relh hum hur',
  specificHumidity: 'specifichumidity q sphum spfh hus qv',
  mixingRatio: 'mixingratio mixr watervapormixingratio watervapourmixingratio',
  signal: 'signal snr cnr signaltonoise signaltonoiseratio carriertonoise carriertonoiseratio',
  speedUncertainty: 'speeduncertainty windspeeduncertainty uncertainty',
  speedDeviation: 'speeddeviation windspeeddeviation',
  gust: 'gustspeed windgustspeed',
};

const BY_SPELLING: ReadonlyMap<string, Meaning> = new Map(
  Object.entries(SPELLINGS).flatMap(([meaning, spellings]) =>
    spellings.split(' ').map((spelling): [string, Meaning] => [spelling, meaning as Meaning]),
  ),
);

/** Words that say which kind of mean or frame is meant and change nothing. */
const SILENT_WORDS = new Set(
  'mean avg average true utc gmt local lst measured obs observed horizontal at air'.split(' '),
);
/** Words after which a column no longer holds the mean itself. */
const STATISTICS = new Set(
  'std stdev stddev sd sigma var variance min max minimum maximum gust count n qc flag quality status error err skew kurtosis ti turbulence availability percentile valid'.split(
    ' ',
  ),
);
/** Statistics of the speed that a profile carries beside its mean. */
const SPEED_STATISTICS: Readonly<Record<string, LevelMeaning>> = {
  ...Object.fromEntries(['std', 'stdev', 'stddev', 'sd', 'sigma'].map((word) => [word, 'speedDeviation' as const])),
  gust: 'gust',
};
const DATUMS: Readonly<Record<string, LevelMeaning>> = {
  agl: 'heightAgl',
  amsl: 'heightAmsl',
  asl: 'heightAmsl',
  msl: 'heightAmsl',
};

/** Units that a meaning may have; meanings not listed take no notice of a unit. */
const QUANTITIES: Partial<Record<Meaning, readonly Quantity[]>> = {
  heightAgl: ['length'],
  heightAmsl: ['length', 'geopotential'],
  speed: ['speed'],
  direction: ['angle'],
  u: ['speed'],
  v: ['speed'],
  verticalSpeed: ['speed'],
  pressure: ['pressure'],
  temperature: ['temperature'],
  dewPoint: ['temperature'],
  relativeHumidity: ['fraction'],
  specificHumidity: ['humidity-ratio'],
  mixingRatio: ['humidity-ratio'],
  speedUncertainty: ['speed'],
  speedDeviation: ['speed'],
  gust: ['speed'],
  latitude: ['angle'],
  longitude: ['angle'],
  elevation: ['length'],
  epoch: ['time'],
  period: ['time'],
};

/** What a heading means; null for one this house does not know. */
export function readHeading(text: string): Heading | null {
  const trimmed = text.replace(/["'\ufeff]/gu, '').trim();
  if (trimmed.length > 80 || !/[a-zA-Zµö]/u.test(trimmed)) return null;
  const words: string[] = [];
  let unitText = '';
  const bare = trimmed.replace(/[[({]([^\])}]*)[\])}]/gu, (_, inside: string) => {
    const known = inside.trim().toLowerCase();
    if (known === '') return ' ';
    if (/^\d+(?:\.\d+)? ?(?:m|ft)?$/u.test(known) || SILENT_WORDS.has(known) || known in DATUMS)
      words.push(known.replace(' ', ''));
    else unitText = inside.trim();
    return ' ';
  });
  words.unshift(...wordsOf(bare));
  const { height, rest } = takeHeight(words);
  const statistics = rest.filter((word) => STATISTICS.has(word));
  const statistic = SPEED_STATISTICS[statistics[0] ?? ''];
  if (statistics.length > 1 || (statistics.length === 1 && statistic === undefined)) return null;
  const datum = rest.map((word) => DATUMS[word]).find((found) => found !== undefined);
  const zone = rest.some((word) => word === 'utc' || word === 'gmt') ? 'utc' : rest.includes('local') ? 'local' : '';
  const telling = rest.filter((word) => !SILENT_WORDS.has(word) && word !== statistics[0]);
  // A gust may stand by itself; a deviation must say that it is one of speed.
  const bareGust = statistic === 'gust' && (telling.length === 0 || parseUnit(telling.join(' ')) !== null);
  const of = nameAndUnit(bareGust ? ['speed', ...telling] : telling, datum);
  if (of === null || (statistic !== undefined && of.meaning !== 'speed')) return null;
  const named = statistic === undefined ? of : { ...of, meaning: statistic };
  if (unitText === '') unitText = named.unitText;
  const meaning =
    datum !== undefined && (named.meaning === 'heightAgl' || named.meaning === 'heightAmsl') ? datum : named.meaning;
  // "Latitude: 52" is a statement and no heading.
  if (!Number.isNaN(height) && !(LEVEL_MEANINGS as readonly string[]).includes(meaning)) return null;
  return { text: trimmed, height, zone, ...withUnit(meaning, unitText) };
}

/** Lower-case words; decimals, units with a stroke and words run together in camel case are kept or cut as they should. */
function wordsOf(text: string): string[] {
  return text
    .replace(/([a-z])([A-Z])/gu, '$1 $2')
    .toLowerCase()
    .replace(/([_\s])m[\s_./]?s(?:[\s_^-]*-?1)?$/u, '$1mps')
    .split(/[\s_:@,;#-]+|\.(?!\d)/u)
    .filter((word) => word !== '');
}

/** The first height among the words, `80m`, `80 m`, `80`, `ws80`; feet become metres. */
function takeHeight(words: readonly string[]): { height: number; rest: string[] } {
  for (let k = 0; k < words.length; k++) {
    const match = /^([a-zµ]*?)(\d+(?:\.\d+)?)(m|ft)?$/u.exec(words[k]!);
    if (match === null) continue;
    const [, before = '', digits, unit] = match;
    if (before !== '' && !BY_SPELLING.has(before)) continue;
    const rest = [...words.slice(0, k), ...(before === '' ? [] : [before]), ...words.slice(k + 1)];
    let feet = unit === 'ft';
    if (unit === undefined && /^(?:m|ft|meters?|metres?|feet)$/u.test(words[k + 1] ?? '')) {
      feet = words[k + 1] === 'ft' || words[k + 1] === 'feet';
      rest.splice(before === '' ? k : k + 1, 1);
    }
    return { height: Number(digits) * (feet ? 0.3048 : 1), rest };
  }
  return { height: NaN, rest: [...words] };
}

/** The longest run of words that is a known name, what follows it being a unit. */
function nameAndUnit(
  words: readonly string[],
  datum: LevelMeaning | undefined,
): { meaning: Meaning; unitText: string } | null {
  for (let length = words.length; length > 0; length--) {
    const nameWords = words.slice(0, length);
    const meaning =
      BY_SPELLING.get(nameWords.join('')) ??
      BY_SPELLING.get(nameWords.filter((word) => !(word in DATUMS)).join('')) ??
      (nameWords.length === 1 ? datum : undefined);
    const unitText = words
      .slice(length)
      .filter((word) => !(word in DATUMS))
      .join(' ');
    if (meaning !== undefined && (unitText === '' || parseUnit(unitText) !== null)) return { meaning, unitText };
  }
  return null;
}

function withUnit(meaning: Meaning, unitText: string): Pick<Heading, 'meaning' | 'unit' | 'wrongUnit'> {
  const allowed = QUANTITIES[meaning];
  if (unitText === '' || allowed === undefined) return { meaning, unit: null, wrongUnit: '' };
  const unit = parseUnit(unitText);
  if (unit !== null && allowed.includes(unit.quantity)) return { meaning, unit, wrongUnit: '' };
  // Grams a kilogram tell that a plain "humidity" is no relative one.
  if (meaning === 'relativeHumidity' && unit?.quantity === 'humidity-ratio') {
    return { meaning: 'specificHumidity', unit, wrongUnit: '' };
  }
  return { meaning, unit: null, wrongUnit: unitText };
}
