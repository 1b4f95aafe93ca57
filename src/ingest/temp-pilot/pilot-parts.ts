// The parts of a PILOT report (FM 32): winds at standard surfaces, at heights, or at pressures.

import { figures, isSection, windGroup } from './groups.ts';
import { PartContent } from './levels.ts';
import type { ReportHead } from './report-head.ts';
import { readSections } from './temp-parts.ts';

const LOWER = [1000, 925, 850, 700, 500, 400, 300, 250, 200, 150, 100];
const UPPER = [70, 50, 30, 20, 10, 7, 5, 3, 2, 1];

/** Reads part A (`upper` false) or C: winds at standard surfaces, maximum winds. */
export function readPilotStandardPart(head: ReportHead, upper: boolean): PartContent {
  const content = new PartContent();
  const { groups, knots } = head;
  let at = 0;
  while (at < groups.length) {
    const group = groups[at]!;
    const run = /^(44|55)(\d)(\d{2})$/u.exec(group);
    const most = /^[67]([\d/]{4})$/u.exec(group);
    if (isSection(group)) {
      at = readSections(groups, at, content);
    } else if (run !== null) {
      at = readRun(content, head, at + 1, Number(run[2]), run[3]!, upper);
    } else if (group === '77999' || group === '66999') {
      at++;
    } else if (most !== null) {
      at++;
      const wind = windGroup(groups[at] ?? '', knots);
      if (wind === undefined) content.puzzle(groups[at] ?? 'the end');
      else {
        at++;
        // 77 and 66 give the pressure, 7 and 6 alone the height in tens of metres: none reaches 60 km.
        const pressure = /^(?:77|66)/u.test(group) ? figures(group.slice(2))! * (upper ? 10 : 100) : NaN;
        const height = Number.isNaN(pressure) && !/^(?:77|66)/u.test(group) ? figures(most[1]!)! * 10 : NaN;
        if (!Number.isNaN(pressure)) content.byStandard = true;
        content.add({ pressure, height, ...wind });
      }
      if (/^4[\d/]{4}$/u.test(groups[at] ?? '') && !/^44\d/u.test(groups[at]!)) at++;
    } else {
      content.puzzle(group);
      at++;
    }
  }
  return content;
}

/** Winds at so many standard surfaces in a row, the first named by its tens and hundreds (A) or tens and units (C). */
function readRun(
  content: PartContent,
  head: ReportHead,
  from: number,
  count: number,
  first: string,
  upper: boolean,
): number {
  const surfaces = upper ? UPPER : LOWER;
  const named = Number(first) * (upper ? 1 : 10) || 1000;
  // 925 hPa is written 92.
  const start = surfaces.findIndex((pressure) => pressure === named || (pressure === 925 && named === 920));
  if (start < 0) {
    content.puzzle(head.groups[from - 1]!);
    return from;
  }
  let at = from;
  for (let k = 0; k < count; k++, at++) {
    const wind = windGroup(head.groups[at] ?? '', head.knots);
    if (wind === undefined) {
      content.puzzle(head.groups[at] ?? 'the end');
      return at;
    }
    const pressure = surfaces[start + k];
    if (pressure === undefined) continue;
    content.byStandard = true;
    content.add({ pressure: pressure * 100, ...wind });
  }
  return at;
}

/** Reads part B (`upper` false) or D: winds at heights in units of 300 or 500 m, or at pressures. */
export function readPilotSignificantPart(head: ReportHead, upper: boolean): PartContent {
  const content = new PartContent();
  const { groups, knots } = head;
  let byPressure = false;
  let at = 0;
  while (at < groups.length) {
    const group = groups[at]!;
    const heights = /^([189])([\d/])([\d/])([\d/])([\d/])$/u.exec(group);
    if (group === '21212') {
      byPressure = true;
      at++;
    } else if (isSection(group)) {
      at = readSections(groups, at, content);
    } else if (byPressure) {
      const figure = /^(\d)\1[\d/]{3}$/u.test(group) ? figures(group.slice(2))! : undefined;
      const wind = windGroup(groups[at + 1] ?? '', knots);
      if (figure === undefined || wind === undefined) {
        content.puzzle(figure === undefined ? group : (groups[at + 1] ?? 'the end'));
        at++;
        continue;
      }
      const pressure = upper ? figure * 10 : (figure < 100 ? figure + 1000 : figure) * 100;
      if (!Number.isNaN(pressure)) {
        content.byStandard = true;
        content.add({ pressure, ...wind, surface: !upper && group.startsWith('00') });
      }
      at += 2;
    } else if (heights !== null) {
      at = readHeights(content, head, at + 1, heights.slice(1));
    } else {
      content.puzzle(group);
      at++;
    }
  }
  return content;
}

/**
 * Up to three winds at heights `tn u1`, `tn u2`, `tn u3`. Each a multiple of 300 m (9, and 1 from 30 km up) or of 500 m
 * (8); a solidus in place of a unit: none, or the surface when it is the first.
 */
function readHeights(content: PartContent, head: ReportHead, from: number, [kind, tens, ...units]: string[]): number {
  // In Region IV the levels are whole thousands of feet, for which 300 m is the code's short name.
  const three = /^7[0-8]/u.test(head.id) ? 304.8 : 300;
  const unit = kind === '8' ? 500 : three;
  let at = from;
  for (const [k, figure] of units.entries()) {
    const number = Number(`${kind === '1' ? '1' : ''}${tens === '/' ? '0' : tens}${figure}`);
    const surface = figure === '/' && k === 0 && content.levels.length === 0;
    if (figure === '/' && !surface) continue;
    const wind = windGroup(head.groups[at] ?? '', head.knots);
    if (wind === undefined) {
      content.puzzle(head.groups[at] ?? 'the end');
      return at;
    }
    at++;
    content.add({ height: surface ? NaN : number * unit, ...wind, surface: surface || number === 0 });
  }
  return at;
}
