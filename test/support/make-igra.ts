// Writes soundings in the archive's fixed columns (IGRA version 2), apart from the reader.

export interface IgraLevel {
  major: 1 | 2 | 3;
  minor: 0 | 1 | 2;
  /** As written: Pa, m, tenths of degrees, tenths of per cent, tenths of m/s; null is missing, 'removed' is -8888. */
  pressure: number | null;
  height: number | null | 'removed';
  temperature: number | null | 'removed';
  relative: number | null;
  depression: number | null;
  direction: number | null;
  speed: number | null;
}

export interface IgraSounding {
  id: string;
  year: number;
  month: number;
  day: number;
  hour: number;
  release: number;
  latitude: number;
  longitude: number;
  levels: IgraLevel[];
}

const cell = (value: number | null | 'removed', width: number): string =>
  String(value === null ? -9999 : value === 'removed' ? -8888 : value).padStart(width);
const two = (value: number): string => String(value).padStart(2, '0');

export function igraText({ levels, ...sounding }: IgraSounding): string {
  const { id, year, month, day, hour, release, latitude, longitude } = sounding;
  const header = [
    `#${id} ${year} ${two(month)} ${two(day)} ${two(hour)} ${String(release).padStart(4, '0')} ${cell(levels.length, 4)}`,
    'made-up  made-up ',
    `${cell(Math.round(latitude * 10_000), 7)} ${cell(Math.round(longitude * 10_000), 8)}`,
  ].join(' ');
  const lines = levels.map((level) =>
    [
      `${level.major}${level.minor} ${cell(null, 5)} ${cell(level.pressure, 6)} ${cell(level.height, 5)} `,
      `${cell(level.temperature, 5)} ${cell(level.relative, 5)} ${cell(level.depression, 5)} `,
      `${cell(level.direction, 5)} ${cell(level.speed, 5)} `,
    ].join(''),
  );
  return `${[header, ...lines].join('\n')}\n`;
}
