// What the page of nights says of an archive, in sentences and large figures.

import { ROSE_SECTORS, ROSE_SPEEDS, type ArchiveFigures, type ArchiveView } from '../../desk/index.ts';
import { toSpeedUnit } from '../../air/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import type { Answer } from './answers.ts';
import { heightText, plain, speedText } from './numbers.ts';
import { quantile } from './spread.ts';
import type { Piece } from './story.ts';

const HOURS = 24;
/** Fewer nights than this say nothing of a climate. */
const CLIMATE_NIGHTS = 30;
/** A month takes part in the comparison from so many nights on, and a comparison needs so many months. */
const MONTH_NIGHTS = 8;
const LEAST_MONTHS = 3;
/** Hours with at least this share of the best hour's frequency count as "most often". */
const OFTEN = 0.7;
/** An hour takes part from so many assessable profiles on, and this part of what the hours have on average. */
const LEAST_PROFILES = 5;
const LEAST_PART = 0.3;

export const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
] as const;

const SECTORS = [
  'north',
  'north-northeast',
  'northeast',
  'east-northeast',
  'east',
  'east-southeast',
  'southeast',
  'south-southeast',
  'south',
  'south-southwest',
  'southwest',
  'west-southwest',
  'west',
  'west-northwest',
  'northwest',
  'north-northwest',
] as const;

/** `5 404`: thin spaces part the thousands. */
export function count(value: number): string {
  return String(Math.round(value)).replace(/\B(?=(?:\d{3})+$)/gu, '\u2009');
}

/** `48 in 100`, and plain words at the ends, for what was counted. */
export function shareWords(part: number, whole: number): string {
  if (whole === 0) return 'unknown';
  if (part === 0) return 'none';
  return part === whole ? 'all' : `${plain((100 * part) / whole, part / whole < 0.01 ? 1 : 0)} in 100`;
}

export function jetWords(least: number): string {
  return least === 0 ? 'a jet' : `a jet of category ${least === 3 ? '3' : `${least} or more`}`;
}

/** What the hours of the figures are told by. */
export function hourWords({ longitude }: ArchiveView): string {
  return Number.isFinite(longitude) ? 'by the mean sun at the station' : 'UTC, as the station’s place is not known';
}

export function nightsStory(view: ArchiveView, least: number, units: DisplayUnits): Piece[] {
  const figures = figuresOf(view, least);
  const at = ` at ${view.stationName}`;
  if (figures.nights === 0) return profilesOnly(view, figures, least, units);
  const few = figures.nights < CLIMATE_NIGHTS;
  const nights = figures.nights === 1 ? '1 assessable night' : `${count(figures.nights)} assessable nights`;
  const head: Piece[] = few
    ? [{ text: nights, weight: 'strong' }, { text: `${at}: too few for a climate. ` }]
    : [{ text: 'In ' }, { text: nights, weight: 'strong' }, { text: `${at} ` }];
  const begin = (text: string): string => (few ? capital(text) : text);
  if (figures.jets === 0) {
    return [...head, { text: `${begin(jetWords(least).replace(/^a /u, 'no '))} blew.` }, ...gapPieces(figures)];
  }
  const often = few
    ? ofThem(figures.nightsWithJet, figures.nights)
    : shareWords(figures.nightsWithJet, figures.nights).replace(' in ', ' of ');
  const pieces: Piece[] = [...head, { text: `${begin(jetWords(least))} blew in ` }, { text: often, weight: 'strong' }];
  const when = few ? '' : whenWords(view, figures);
  return [
    ...pieces,
    ...(when === '' ? [{ text: ', ' }] : [{ text: `; ${when}, ` }]),
    ...nosePieces(figures, units),
    ...gapPieces(figures),
  ];
}

function profilesOnly(view: ArchiveView, figures: ArchiveFigures, least: number, units: DisplayUnits): Piece[] {
  const { profiles, assessable, jets } = figures;
  if (assessable === 0) {
    const of = profiles === 0 ? 'No night' : `None of ${count(profiles)} profiles`;
    return [{ text: `${of} at ${view.stationName} can be assessed, so nothing can be said of jets.` }];
  }
  const pieces: Piece[] = [
    { text: 'In ' },
    { text: `${count(assessable)} assessable profiles`, weight: 'strong' },
    { text: ` at ${view.stationName} ${jetWords(least)} showed in ` },
    { text: shareWords(jets, assessable).replace(' in ', ' of '), weight: 'strong' },
  ];
  if (jets === 0) return [...pieces, { text: '.' }, ...gapPieces(figures)];
  return [...pieces, { text: ', ' }, ...nosePieces(figures, units), ...gapPieces(figures)];
}

function ofThem(part: number, whole: number): string {
  if (part === 0) return whole === 1 ? 'not in it' : 'none of them';
  if (part === whole) return whole === 1 ? 'it' : whole === 2 ? 'both' : 'all of them';
  return `${part} of them`;
}

function nosePieces(figures: ArchiveFigures, units: DisplayUnits): Piece[] {
  const from = mainDirection(figures);
  return [
    { text: 'nose near ' },
    {
      text: `${heightText(round10(figures.noseHeight.mean), units)}\u00a0${units.height}`,
      weight: 'strong',
    },
    {
      text: ` and ${speedText(figures.noseSpeed.mean, units)}\u00a0${units.speed}${from === '' ? '' : `, mostly from the ${from}`}.`,
    },
  ];
}

/** What gaps take away is said where it is much. */
function gapPieces({ profiles, assessable }: ArchiveFigures): Piece[] {
  const ENOUGH = 0.8;
  if (profiles === 0 || assessable / profiles >= ENOUGH) return [];
  return [
    { text: ` Only ${shareWords(assessable, profiles)} of the profiles can be assessed; all shares are of those.` },
  ];
}

/** The sector that most jets come from, in words; empty where no direction is known. */
export function mainDirection({ rose }: ArchiveFigures): string {
  const sums = roseSums(rose);
  const most = Math.max(...sums);
  return most === 0 ? '' : SECTORS[sums.indexOf(most)]!;
}

/** Jets by sector of the compass, all strengths. */
export function roseSums(rose: readonly number[]): number[] {
  const classes = ROSE_SPEEDS.length + 1;
  return Array.from({ length: ROSE_SECTORS }, (_, sector) =>
    rose.slice(sector * classes, (sector + 1) * classes).reduce((sum, part) => sum + part, 0),
  );
}

export const sectorName = (sector: number): string => SECTORS[sector]!;

/** `most often in June between 23 and 03 h`; only as much of it as the record can tell. */
function whenWords(view: ArchiveView, { byMonthHour }: ArchiveFigures): string {
  const nightsOf = (month: number): number =>
    view.nights.filter(({ night, darkAssessable }) => darkAssessable > 0 && Number(night.slice(5, 7)) === month + 1)
      .length;
  const compared = [...MONTHS.keys()].filter((month) => nightsOf(month) >= MONTH_NIGHTS);
  const hours = Array.from({ length: HOURS }, (_, hour) => hour);
  const shareAt = (months: readonly number[], hour: number): number => {
    const sum = (counts: readonly number[], at: number): number =>
      months.reduce((total, month) => total + counts[month * HOURS + at]!, 0);
    const assessable = sum(byMonthHour.assessable, hour);
    const usual = hours.reduce((total, each) => total + sum(byMonthHour.assessable, each), 0) / HOURS;
    return assessable < Math.max(LEAST_PROFILES, LEAST_PART * usual) ? NaN : sum(byMonthHour.jets, hour) / assessable;
  };
  // The mean over the hours, so that hours with many gaps weigh no less.
  const often = (month: number): number => {
    const shares = hours.map((hour) => shareAt([month], hour)).filter((share) => !Number.isNaN(share));
    return shares.reduce((sum, share) => sum + share, 0) / shares.length;
  };
  const enough = compared.length >= LEAST_MONTHS;
  const best = enough ? compared.reduce((a, b) => (often(b) > often(a) ? b : a)) : -1;
  const span = oftenHours(hours.map((hour) => shareAt(enough ? [best] : [...MONTHS.keys()], hour)));
  const month = enough ? ` in ${MONTHS[best]!}` : '';
  if (span === null) return enough ? `most often${month}` : '';
  return `most often${month} between ${twoFigures(span.from)} and ${twoFigures(span.to)} h`;
}

/** The hours around the best one in which it is nearly as often; null where it is so all day or nothing is known. */
export function oftenHours(shares: readonly number[]): { readonly from: number; readonly to: number } | null {
  const most = Math.max(...shares.map((share) => (Number.isNaN(share) ? 0 : share)));
  if (most === 0) return null;
  const isOften = (hour: number): boolean => shares[(hour + HOURS) % HOURS]! >= OFTEN * most;
  const peak = shares.indexOf(most);
  let [from, to] = [peak, peak + 1];
  while (to - from < HOURS && isOften(from - 1)) from--;
  while (to - from < HOURS && isOften(to)) to++;
  return to - from >= HOURS ? null : { from: (from + HOURS) % HOURS, to: to % HOURS };
}

export function nightsAnswers(view: ArchiveView, least: number, disc: number, units: DisplayUnits): Answer[] {
  const figures = figuresOf(view, least);
  const few = figures.nights > 0 && figures.nights < CLIMATE_NIGHTS;
  const age = few
    ? `${figures.nights} ${figures.nights === 1 ? 'night' : 'nights'}: too few for a climate`
    : recordWords(view);
  const base = { age, stale: false };
  return [
    { ...base, ...nightsAnswer(view, figures, least) },
    { ...base, ...noseAnswer(figures, units) },
    { ...base, ...timesAnswer(figures) },
    { ...base, ...discAnswer(view, figures, disc, units) },
  ];
}

type Told = Pick<Answer, 'title' | 'figures' | 'none' | 'lines'>;

/** `2014-01-01 to 2014-12-31` */
export function recordWords({ nights }: ArchiveView): string {
  const [first, last] = [nights[0], nights.at(-1)];
  if (first === undefined || last === undefined) return '';
  return first === last ? first.night : `${first.night} to ${last.night}`;
}

function nightsAnswer(view: ArchiveView, figures: ArchiveFigures, least: number): Told {
  const { nights, nightsWithJet, profiles, assessable } = figures;
  const lost = view.nights.length - nights;
  const lines = [
    {
      text: `${count(nightsWithJet)} of ${count(nights)} assessable nights with ${jetWords(least)}${lost > 0 ? `; ${count(lost)} more could not be assessed` : ''}`,
    },
    ...(profiles > 0
      ? [
          {
            text: `assessable: ${shareWords(assessable, profiles)} of ${count(profiles)} profiles; a gap never counts as no jet`,
          },
        ]
      : []),
  ];
  return {
    title: 'Nights with a jet',
    figures: nights === 0 ? [] : [{ value: plain((100 * nightsWithJet) / nights, 0), unit: 'in 100' }],
    none: 'No night can be assessed: drop nights.csv as well, or open more profiles.',
    lines,
  };
}

function noseAnswer({ noseHeight, noseSpeed, jets }: ArchiveFigures, units: DisplayUnits): Told {
  const height = (share: number): string => heightText(quantile(noseHeight, share), units);
  const speed = (share: number): string => speedText(quantile(noseSpeed, share), units);
  return {
    title: 'Nose of the jets',
    figures:
      noseHeight.total === 0
        ? []
        : [
            { value: heightText(noseHeight.mean, units), unit: units.height },
            { value: speedText(noseSpeed.mean, units), unit: units.speed },
          ],
    none: jets === 0 ? 'No jet to measure.' : 'Heights are not known.',
    lines:
      noseHeight.total === 0
        ? []
        : [
            { text: `mean of ${count(noseHeight.total)} profiles with a jet` },
            {
              text: `half of them about ${height(0.25)} to ${height(0.75)} ${units.height}, ${speed(0.25)} to ${speed(0.75)} ${units.speed}`,
            },
          ],
  };
}

/** `1.4 h after`, `0.6 h before` */
function hoursFigure(hours: number, of: string): { value: string; unit: string } {
  return { value: plain(Math.abs(hours), 1), unit: `h ${hours < 0 ? 'before' : 'after'} ${of}` };
}

function timesAnswer({ onset, end }: ArchiveFigures): Told {
  return {
    title: 'Onset and end',
    figures:
      onset.total === 0
        ? []
        : [hoursFigure(onset.mean, 'sunset'), ...(end.total === 0 ? [] : [hoursFigure(end.mean, 'sunrise')])],
    none: 'No lasting jet against a known sunset.',
    lines: [
      {
        text: `mean of ${onset.total === 1 ? '1 night' : `${count(onset.total)} nights`} with a jet in three profiles in a row`,
      },
    ],
  };
}

function discAnswer(view: ArchiveView, figures: ArchiveFigures, disc: number, units: DisplayUnits): Told {
  const told = figures.discs[disc];
  const title = `Wind on the disc${view.discs[disc] === undefined ? '' : `, ${view.discs[disc]}`}`;
  const none = { title, figures: [], lines: [] };
  if (told === undefined)
    return { ...none, none: 'No turbine type is known: name one in a site file, or scan with --hub and --diameter.' };
  const { withJet, withoutJet } = told;
  if (withJet.equivalentSpeed.total + withoutJet.equivalentSpeed.total === 0) {
    return { ...none, none: 'The disc lies outside the data in every profile of the dark.' };
  }
  return {
    title,
    figures: [
      { value: speedText(withJet.equivalentSpeed.mean, units), unit: `${units.speed} with` },
      { value: speedText(withoutJet.equivalentSpeed.mean, units), unit: 'without' },
    ],
    none: '',
    lines: [
      {
        text: `shear exponent ${plain(withJet.shearExponent.mean, 2)} with, ${plain(withoutJet.shearExponent.mean, 2)} without; veer ${plain(withJet.veer.mean, 0)}° and ${plain(withoutJet.veer.mean, 0)}°`,
      },
      {
        text: `means while the sun is down: ${count(withJet.equivalentSpeed.total)} profiles with a jet, ${count(withoutJet.equivalentSpeed.total)} without; rotor-equivalent by IEC 61400-12-1:2017`,
      },
    ],
  };
}

export function figuresOf({ figures }: ArchiveView, least: number): ArchiveFigures {
  return figures[Math.min(least, figures.length - 1)]!;
}

/** A class of the rose in the reader's unit: `12–16 m/s`. */
export function roseClassWords(k: number, units: DisplayUnits): string {
  const shown = (speed: number): string => plain(toSpeedUnit(speed, units.speed), 0);
  const [from, to] = [ROSE_SPEEDS[k - 1], ROSE_SPEEDS[k]];
  if (from === undefined) return `below ${shown(to!)} ${units.speed}`;
  return to === undefined ? `${shown(from)} ${units.speed} and more` : `${shown(from)}–${shown(to)} ${units.speed}`;
}

const round10 = (value: number): number => Math.round(value / 10) * 10;
const twoFigures = (hour: number): string => String(hour).padStart(2, '0');
const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
