// The pictures of the page of nights: what each draws, and the same as a table.

import { toHeightUnit, toSpeedUnit } from '../../air/index.ts';
import {
  ROSE_SECTORS,
  ROSE_SPEEDS,
  type ArchiveFigures,
  type ArchiveNight,
  type ArchiveView,
  type Histogram,
} from '../../desk/index.ts';
import {
  colourScale,
  drawHistogram,
  drawMonthMatrix,
  drawRose,
  FIELDS,
  MONTH_NAMES,
  type Area,
  type HistogramChart,
  type Look,
  type MonthMatrix,
  type Pen,
  type Rose,
} from '../../plot/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import type { FigureTable } from './figure-table.ts';
import { count, figuresOf, hourWords, MONTHS, roseClassWords, roseSums, sectorName } from './nights.ts';
import { NONE, plain } from './numbers.ts';

export interface NightsFigure {
  readonly title: string;
  /** What is seen, in a line under the title. */
  readonly note: string;
  readonly table: FigureTable;
  readonly draw: (pen: Pen, area: Area, look: Look) => void;
}

const HOURS = 24;
const HOUR_MS = 3_600_000;

export function matrixFigure(view: ArchiveView, least: number): NightsFigure {
  const { byMonthHour } = figuresOf(view, least);
  const { profiles, assessable, jets } = byMonthHour;
  const sumOf = (counts: readonly number[], month: number): number =>
    counts.slice(month * HOURS, (month + 1) * HOURS).reduce((sum, each) => sum + each, 0);
  const held = [...MONTHS.keys()].filter((month) => sumOf(profiles, month) > 0);
  // A whole year keeps its shape; a few nights get no rows for months that nobody measured.
  const months = held.length > 3 ? [...MONTHS.keys()] : held;
  const share = jets.map((each, k) => (assessable[k] === 0 ? NaN : each / assessable[k]!));
  const judged = assessable.map((each, k) => (profiles[k] === 0 ? 0 : each / profiles[k]!));
  const inHundred = (part: number, whole: number): string => (whole === 0 ? NONE : plain((100 * part) / whole, 0));
  const most = Math.max(...share.filter((each) => !Number.isNaN(each)), 0.1);
  const high = Math.min(1, Math.ceil(most * 10 - 1e-9) / 10);
  const texts = (of: (month: number) => string): string[] => [...MONTHS.keys()].map(of);
  const matrix = (look: Look): MonthMatrix => ({
    months,
    share,
    judged,
    sunset: sunHours(view, 'sunsetMs'),
    sunrise: sunHours(view, 'sunriseMs'),
    notes: [
      { title: 'jets in 100', texts: texts((month) => inHundred(sumOf(jets, month), sumOf(assessable, month))) },
      {
        title: 'assessable',
        texts: texts((month) => withPercent(inHundred(sumOf(assessable, month), sumOf(profiles, month)))),
      },
    ],
    legend: {
      scale: colourScale('share', look.theme.name),
      range: { low: 0, high },
      unit: 'jets in 100',
      ticks: [0, high / 2, high].map((at) => ({ at, label: plain(100 * at, 0) })),
      words: '',
    },
  });
  return {
    title: 'How often, by month and hour',
    note: `Profiles with a jet in 100 assessable ones; hours ${hourWords(view)}. A cell is filled as far as its profiles can be assessed; a dot means none can. Strokes: mean sunset and sunrise.`,
    table: {
      columns: [
        'month',
        ...[...hoursOfNight()].map((hour) => `${twoFigures(hour)} h`),
        'all',
        'assessable, %',
        'profiles',
      ],
      rows: months.map((month) => [
        MONTHS[month]!,
        ...[...hoursOfNight()].map((hour) => inHundred(jets[month * HOURS + hour]!, assessable[month * HOURS + hour]!)),
        inHundred(sumOf(jets, month), sumOf(assessable, month)),
        inHundred(sumOf(assessable, month), sumOf(profiles, month)),
        count(sumOf(profiles, month)),
      ]),
    },
    draw: (pen, area, look) => drawMonthMatrix(pen, area, matrix(look), look),
  };
}

/** Rows that the matrix of an archive has: what its picture's height goes by. */
export function matrixRows(view: ArchiveView): number {
  const { profiles } = view.figures[0]!.byMonthHour;
  const held = MONTH_NAMES.filter((_, month) =>
    profiles.slice(month * HOURS, (month + 1) * HOURS).some((each) => each > 0),
  );
  return held.length > 3 ? MONTH_NAMES.length : held.length;
}

function* hoursOfNight(): Generator<number> {
  for (let k = 0; k < HOURS; k++) yield (12 + k) % HOURS;
}

/** Mean hour of sunset or sunrise by month, on the clock of the figures. */
function sunHours({ nights, longitude }: ArchiveView, which: 'sunsetMs' | 'sunriseMs'): number[] {
  const shift = Number.isFinite(longitude) ? (longitude / 15) * HOUR_MS : 0;
  const hourOf = (night: ArchiveNight): number => {
    const hour = (((night[which] + shift) / HOUR_MS) % HOURS) + (night[which] + shift < 0 ? HOURS : 0);
    // Counted on from noon, so that sunsets before and after midnight have a sensible mean.
    return hour < 12 ? hour + HOURS : hour;
  };
  return [...MONTHS.keys()].map((month) => {
    const hours = nights
      .filter((night) => Number(night.night.slice(5, 7)) === month + 1)
      .map(hourOf)
      .filter((hour) => !Number.isNaN(hour));
    return hours.length === 0 ? NaN : (hours.reduce((sum, hour) => sum + hour, 0) / hours.length) % HOURS;
  });
}

interface Spread {
  readonly title: string;
  readonly note: string;
  readonly label: string;
  readonly factor: number;
  readonly decimals: number;
  readonly upright?: boolean;
  readonly mark?: HistogramChart['mark'];
  readonly series: readonly (readonly [name: string, histogram: Histogram])[];
}

function spreadFigure({ title, note, label, factor, decimals, upright = false, mark, series }: Spread): NightsFigure {
  const chart: HistogramChart = {
    series: series.map(([name, { start, step, counts, total }]) => ({ name, start, step, counts, total })),
    upright,
    label,
    factor,
    ...(mark === undefined ? {} : { mark }),
  };
  const [, first] = series[0]!;
  const edge = (k: number): string => plain((first.start + k * first.step) * factor, decimals);
  const held = first.counts.map((_, k) => series.some(([, histogram]) => histogram.counts[k]! > 0));
  const [from, to] = [held.indexOf(true), held.lastIndexOf(true)];
  const rows = held.flatMap((_, k) =>
    k < from || k > to
      ? []
      : [[`${edge(k)} to ${edge(k + 1)}`, ...series.map(([, histogram]) => count(histogram.counts[k]!))]],
  );
  const beyond = series.map(([, { below, above }]) => below + above);
  return {
    title,
    note,
    table: {
      columns: [label, ...series.map(([name]) => name)],
      rows: from < 0 ? [] : beyond.some((each) => each > 0) ? [...rows, ['beyond these', ...beyond.map(count)]] : rows,
    },
    draw: (pen, area, look) => drawHistogram(pen, area, chart, look),
  };
}

export function noseFigures(view: ArchiveView, least: number, units: DisplayUnits): NightsFigure[] {
  const { noseHeight, noseSpeed } = figuresOf(view, least);
  const of = `${count(noseHeight.total)} profiles with a jet`;
  return [
    spreadFigure({
      title: 'Nose height',
      note: `${of}, on the instrument’s own levels`,
      label: `nose above ground, ${units.height}`,
      factor: toHeightUnit(1, units.height),
      decimals: 0,
      upright: true,
      series: [['profiles', noseHeight]],
    }),
    spreadFigure({
      title: 'Nose speed',
      note: of,
      label: `nose speed, ${units.speed}`,
      factor: toSpeedUnit(1, units.speed),
      decimals: units.speed === 'm/s' ? 0 : 1,
      series: [['profiles', noseSpeed]],
    }),
  ];
}

export function roseFigure(view: ArchiveView, least: number, units: DisplayUnits): NightsFigure {
  const { rose, roseUnknown } = figuresOf(view, least);
  const classes = ROSE_SPEEDS.length + 1;
  const words = Array.from({ length: classes }, (_, k) => roseClassWords(k, units));
  // A colour from the middle of each class; the outermost classes are about as wide as the others.
  const values = words.map((_, k) => (k === 0 ? ROSE_SPEEDS[0] - 2 : ROSE_SPEEDS[k - 1]! + 2));
  const drawn = (look: Look): Rose => ({
    counts: rose,
    classes: words.map((each, k) => ({ words: each, value: values[k]! })),
    scale: colourScale('speed', look.theme.name),
    range: FIELDS.speed.range,
  });
  const sums = roseSums(rose);
  return {
    title: 'From where',
    note: `Petals point to where the wind at the nose comes from${roseUnknown > 0 ? `; ${count(roseUnknown)} jets of unknown direction are left out` : ''}.`,
    table: {
      columns: ['from', 'jets', ...words],
      rows: Array.from({ length: ROSE_SECTORS }, (_, sector) => [
        sectorName(sector),
        count(sums[sector]!),
        ...words.map((_, k) => count(rose[sector * classes + k]!)),
      ]),
    },
    draw: (pen, area, look) => drawRose(pen, area, drawn(look), look),
  };
}

export function timesFigures(view: ArchiveView, least: number): NightsFigure[] {
  const { onset, end } = figuresOf(view, least);
  const shared = { factor: 1, decimals: 1 } as const;
  return [
    spreadFigure({
      ...shared,
      title: 'Onset against dusk',
      note: `First of three profiles with a jet in a row; ${nightsOf(onset)}`,
      label: 'hours after sunset',
      mark: { at: 0, label: 'sunset' },
      series: [['nights', onset]],
    }),
    spreadFigure({
      ...shared,
      title: 'End against dawn',
      note: `Last of three profiles with a jet in a row; ${nightsOf(end)}`,
      label: 'hours after sunrise',
      mark: { at: 0, label: 'sunrise' },
      series: [['nights', end]],
    }),
  ];
}

export function discFigures(view: ArchiveView, least: number, disc: number, units: DisplayUnits): NightsFigure[] {
  const told: ArchiveFigures['discs'][number] | undefined = figuresOf(view, least).discs[disc];
  if (told === undefined) return [];
  const { withJet, withoutJet } = told;
  const both = (which: 'equivalentSpeed' | 'shearExponent' | 'veer'): Spread['series'] => [
    ['without jet', withoutJet[which]],
    ['with jet', withJet[which]],
  ];
  const means = (which: 'equivalentSpeed' | 'shearExponent' | 'veer', factor: number, decimals: number): string =>
    `mean ${plain(withJet[which].mean * factor, decimals)} with a jet, ${plain(withoutJet[which].mean * factor, decimals)} without`;
  const speed = toSpeedUnit(1, units.speed);
  return [
    spreadFigure({
      title: 'Rotor-equivalent speed',
      note: means('equivalentSpeed', speed, 1),
      label: `rotor-equivalent speed, ${units.speed}`,
      factor: speed,
      decimals: units.speed === 'm/s' ? 0 : 1,
      series: both('equivalentSpeed'),
    }),
    spreadFigure({
      title: 'Shear exponent',
      note: means('shearExponent', 1, 2),
      label: 'shear exponent',
      factor: 1,
      decimals: 2,
      series: both('shearExponent'),
    }),
    spreadFigure({
      title: 'Veer over the disc',
      note: means('veer', 1, 0),
      label: 'degrees, clockwise upward positive',
      factor: 1,
      decimals: 0,
      series: both('veer'),
    }),
  ];
}

const nightsOf = ({ total }: Histogram): string => (total === 1 ? '1 night' : `${count(total)} nights`);
const twoFigures = (hour: number): string => String(hour).padStart(2, '0');
const withPercent = (text: string): string => (text === NONE ? text : `${text} %`);
