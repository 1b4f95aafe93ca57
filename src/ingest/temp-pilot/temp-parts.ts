// The parts of a TEMP report (FM 35): A and C with the standard surfaces, B and D with the significant levels.

import { figures, isSection, temperatureGroup, windGroup } from './groups.ts';
import { PartContent, type CodedLevel } from './levels.ts';
import type { ReportHead } from './report-head.ts';

const HECTOPASCAL = 100;

/** Standard surfaces, hPa, by the two figures that name them. */
const LOWER = surfaces([1000, 925, 850, 700, 500, 400, 300, 250, 200, 150, 100], 10);
const UPPER = surfaces([70, 50, 30, 20, 10, 7, 5, 3, 2, 1], 1);

function surfaces(pressures: readonly number[], divisor: number): ReadonlyMap<string, number> {
  return new Map(
    pressures.map((pressure) => [String(Math.floor((pressure % 1000) / divisor)).padStart(2, '0'), pressure]),
  );
}

/** Reads part A (`upper` false) or C: surface, standard surfaces, tropopauses, maximum winds. */
export function readStandardPart(head: ReportHead, upper: boolean): PartContent {
  const content = new PartContent();
  const { groups, knots } = head;
  const table = upper ? UPPER : LOWER;
  /** The pressures of tropopause and maximum wind: whole hectopascals below 100 hPa, tenths above. */
  const unit = upper ? HECTOPASCAL / 10 : HECTOPASCAL;
  const windsDownTo = lowestPressureWithWind(head.indicator, upper);
  let last = Infinity;
  let at = 0;

  /** Whether a group opens something after the surface reached so far. */
  const opens = (group: string): boolean =>
    isSection(group) ||
    /^(?:88|77|66)/u.test(group) ||
    (/^\d+$/u.test(group) && (table.get(group.slice(0, 2)) ?? Infinity) < last);
  const values = (level: Partial<CodedLevel>, wind: boolean): void => {
    const moisture = temperatureGroup(groups[at] ?? '');
    if (moisture === undefined) {
      content.puzzle(groups[at] ?? 'the end');
      content.add(level);
      return;
    }
    at++;
    const blowing = wind ? windGroup(groups[at] ?? '', knots) : undefined;
    if (blowing !== undefined) at++;
    content.add({ ...level, ...moisture, ...blowing });
  };

  while (at < groups.length) {
    const group = groups[at]!;
    const two = group.slice(0, 2);
    const three = figures(group.slice(2));
    if (isSection(group)) {
      at = readSections(groups, at, content);
    } else if (/^(?:88|77|66)999$/u.test(group)) {
      at++;
    } else if (group.length !== 5 || three === undefined) {
      content.puzzle(group);
      at++;
    } else if (two === '99' && !upper && last === Infinity) {
      at++;
      values({ pressure: wholePressure(three), surface: true }, true);
      last = 1100;
    } else if (two === '88') {
      at++;
      values({ pressure: three * unit }, true);
    } else if (two === '77' || two === '66') {
      at++;
      const wind = windGroup(groups[at] ?? '', knots);
      if (wind === undefined) content.puzzle(groups[at] ?? 'the end');
      else at++;
      content.add({ pressure: three * unit, ...wind });
      // The shear below and above the maximum.
      if (/^4[\d/]{4}$/u.test(groups[at] ?? '')) at++;
    } else if ((table.get(two) ?? Infinity) < last) {
      last = table.get(two)!;
      at++;
      const wind = hasWind(groups, at + 1, last >= windsDownTo, opens);
      values({ pressure: last * HECTOPASCAL, ...shortHeight(last, three) }, wind);
    } else {
      content.puzzle(group);
      at++;
    }
  }
  return content;
}

/** Id: the last surface for which winds are given, in hundreds (A) or tens (C) of hectopascals; a solidus: none. */
function lowestPressureWithWind(indicator: string, upper: boolean): number {
  if (indicator === '/') return Infinity;
  const figure = Number(indicator);
  if (upper) return figure * 10;
  return figure === 0 ? 1000 : figure * 100;
}

/**
 * Whether the group at a place is the wind of the surface at hand. The indicator says so, but it cannot tell 250 from
 * 200 hPa nor 150 from 100, and is at times wrong: where what follows only fits the other way, that counts.
 */
function hasWind(groups: readonly string[], at: number, promised: boolean, opens: (group: string) => boolean): boolean {
  const group = groups[at];
  if (group === undefined || windGroup(group, false) === undefined) return false;
  const next = groups[at + 1];
  const fitsWithWind = next === undefined || opens(next);
  return opens(group) ? promised && fitsWithWind : promised || fitsWithWind;
}

/** Heights are in metres without the thousands below 500 hPa, in tens without the ten-thousands from there up. */
function shortHeight(hectopascals: number, figure: number): Pick<CodedLevel, 'shortHeight' | 'cycle' | 'height'> {
  // 500 added: below sea level.
  if (hectopascals === 1000) return { height: figure >= 500 ? 500 - figure : figure, shortHeight: NaN, cycle: NaN };
  if (hectopascals > 500) return { height: NaN, shortHeight: figure, cycle: 1000 };
  return { height: NaN, shortHeight: figure * 10, cycle: 10_000 };
}

/** Pressure in whole hectopascals without the thousand, Pa. */
function wholePressure(figure: number): number {
  return (figure < 100 ? figure + 1000 : figure) * HECTOPASCAL;
}

/** Reads part B (`upper` false) or D: significant levels of temperature, then those of wind. */
export function readSignificantPart(head: ReportHead, upper: boolean): PartContent {
  const content = new PartContent();
  const { groups, knots } = head;
  let winds = false;
  let at = 0;
  while (at < groups.length) {
    const group = groups[at]!;
    if (group === '21212') {
      winds = true;
      at++;
    } else if (isSection(group)) {
      at = readSections(groups, at, content);
    } else if (!/^(\d)\1[\d/]{3}$/u.test(group)) {
      content.puzzle(group);
      at++;
    } else {
      const value = groups[at + 1] ?? '';
      const said = winds ? windGroup(value, knots) : temperatureGroup(value);
      const figure = figures(group.slice(2))!;
      const pressure = upper ? figure * 10 : wholePressure(figure);
      if (said === undefined) content.puzzle(value === '' ? 'the end' : value);
      // Solidi in place of a pressure stand for a layer without data.
      else if (!Number.isNaN(pressure)) content.add({ pressure, ...said, surface: !upper && group.startsWith('00') });
      at += said === undefined ? 1 : 2;
    }
  }
  return content;
}

/** Passes over a section that holds no levels; of section 7 it takes the time of release, `8GGgg`. */
export function readSections(groups: readonly string[], from: number, content: PartContent): number {
  const section = groups[from];
  let at = from + 1;
  // Cloud is one group; from the regional section on nothing more of ours can follow.
  if (section === '41414') return Math.min(at + 1, groups.length);
  if (section !== '31313') return groups.length;
  while (at < groups.length && !isSection(groups[at]!) && groups[at] !== '21212') {
    const release = /^8(\d{2})(\d{2})$/u.exec(groups[at]!);
    // The first group tells of the equipment and may begin with an 8 too.
    if (release !== null && at > from + 1) content.release = { hour: Number(release[1]), minute: Number(release[2]) };
    at++;
  }
  return at;
}
