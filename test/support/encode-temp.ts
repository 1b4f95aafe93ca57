// Encodes soundings to the codes TEMP (FM 35) and PILOT (FM 32), the other way round than the reader and apart from it:
// WMO-No. 306, Volume I.1, code tables 0777 and 3931.

export interface CodedSounding {
  station: string;
  day: number;
  hour: number;
  knots: boolean;
  surface: CodedValues & { pressure: number };
  /** hPa and m, falling pressure; below the ground only the height. */
  standard: (CodedValues & { pressure: number; height: number })[];
  /** hPa */
  significant: { pressure: number; temperature: CodedTemperature; depression: number | null }[];
  winds: { pressure: number; wind: CodedWind | null }[];
  /** hPa */
  lowestWindPressure: number | null;
}

export interface CodedValues {
  temperature: CodedTemperature | null;
  /** Code figure 00 to 50 or 56 to 99. */
  depression: number | null;
  wind: CodedWind | null;
}

/** Whole degrees and the figure that holds tenths and sign. */
export interface CodedTemperature {
  degrees: number;
  figure: number;
}

export interface CodedWind {
  /** A multiple of 5, 0 to 360. */
  direction: number;
  /** In the report's unit, below 500. */
  speed: number;
}

const pad = (value: number, length: number): string => String(value).padStart(length, '0');

export function encodeWind(wind: CodedWind | null): string {
  if (wind === null) return '/////';
  const odd = wind.direction % 10 === 5;
  return pad(Math.floor(wind.direction / 10), 2) + pad(wind.speed + (odd ? 500 : 0), 3);
}

export function encodeTemperature(temperature: CodedTemperature | null, depression: number | null): string {
  const degrees = temperature === null ? '///' : pad(temperature.degrees, 2) + String(temperature.figure);
  return degrees + (depression === null ? '//' : pad(depression, 2));
}

/** Degrees Celsius that the code figures stand for. */
export function celsiusOf({ degrees, figure }: CodedTemperature): number {
  const size = degrees + figure / 10;
  return figure % 2 === 1 ? -size : size;
}

/** Kelvins between temperature and dew point that the code figure stands for. */
export function depressionOf(figure: number): number {
  return figure > 50 ? figure - 50 : figure / 10;
}

const HEAD = (code: string, { station, day, hour, knots }: CodedSounding, last: string): string =>
  `${code} ${pad(day + (knots ? 50 : 0), 2)}${pad(hour, 2)}${last} ${station}`;

function indicator(lowest: number | null, upper: boolean): string {
  if (lowest === null) return '/';
  return String(upper ? lowest / 10 : Math.floor((lowest % 1000) / 100));
}

/** Parts A to D of a TEMP report; parts without levels are left out. */
export function encodeTemp(sounding: CodedSounding): string[] {
  const { surface, standard, significant, winds, lowestWindPressure } = sounding;
  const surfaces = (upper: boolean): string[] =>
    standard
      .filter(({ pressure }) => pressure < 100 === upper)
      .flatMap(({ pressure, height, temperature, depression, wind }) => {
        const figures = pressure > 500 ? Math.abs(height) % 1000 : Math.round(height / 10) % 1000;
        const coded = pressure === 1000 && height < 0 ? 500 - height : figures;
        const name = upper ? pad(pressure, 2) : pad(Math.floor((pressure % 1000) / 10), 2);
        const blown = lowestWindPressure !== null && pressure >= lowestWindPressure;
        return [name + pad(coded, 3), encodeTemperature(temperature, depression), ...(blown ? [encodeWind(wind)] : [])];
      });
  const names = (k: number): string => (k === 0 ? '00' : String(((k - 1) % 9) + 1).repeat(2));
  const levels = (upper: boolean): string[] => {
    const pressureFigures = (pressure: number): string => pad((upper ? Math.round(pressure * 10) : pressure) % 1000, 3);
    const groups: string[] = [];
    significant
      .filter(({ pressure }) => pressure < 100 === upper)
      .forEach(({ pressure, temperature, depression }, k) => {
        groups.push(names(upper ? k + 1 : k) + pressureFigures(pressure), encodeTemperature(temperature, depression));
      });
    const blowing = winds.filter(({ pressure }) => pressure < 100 === upper);
    if (blowing.length > 0) groups.push('21212');
    blowing.forEach(({ pressure, wind }, k) => {
      groups.push(names(upper ? k + 1 : k) + pressureFigures(pressure), encodeWind(wind));
    });
    return groups;
  };
  const surfaceGroups = [
    `99${pad(surface.pressure % 1000, 3)}`,
    encodeTemperature(surface.temperature, surface.depression),
    encodeWind(surface.wind),
  ];
  const lower = (lowestWindPressure ?? 0) < 100 && lowestWindPressure !== null ? 100 : lowestWindPressure;
  const upperLast = lowestWindPressure !== null && lowestWindPressure < 100 ? lowestWindPressure : null;
  const parts: [string, string[]][] = [
    [HEAD('TTAA', sounding, indicator(lower, false)), [...surfaceGroups, ...surfaces(false), '88999', '77999']],
    [HEAD('TTBB', sounding, '8'), levels(false)],
    [HEAD('TTCC', sounding, indicator(upperLast, true)), surfaces(true)],
    [HEAD('TTDD', sounding, '/'), levels(true)],
  ];
  return parts.filter(([, groups]) => groups.length > 0).map(([head, groups]) => wrapped([head, ...groups].join(' ')));
}

/** Lines of at most 65 characters, as bulletins have them, and the equals sign. */
function wrapped(text: string): string {
  return `${text.replace(/(.{1,64})(?: |$)/gu, '$1\r\r\n').trim()}=\r\r\n`;
}
