// Soundings in the alphanumeric codes of the WMO: TEMP (FM 35 to 38) and PILOT (FM 32 to 34), as bulletins or bare.

import { DuskveerError, throwIfCancelled } from '../../air/index.ts';
import { BlockBuilder, concatBlocks, type Instrument, type Station } from '../../profile/index.ts';
import type { FileFormat, Reading, ReadOptions } from '../format.ts';
import { looksLikeText } from '../head.ts';
import { stationBySite } from '../site-station.ts';
import type { ByteSource } from '../source.ts';
import { Ascent } from './ascent.ts';
import type { PartContent } from './levels.ts';
import { readPilotSignificantPart, readPilotStandardPart } from './pilot-parts.ts';
import { placeLevels, type PlacedLevels } from './place-levels.ts';
import { dayInName, releaseTimeMs, reportTimeMs } from './report-date.ts';
import { headOfReport, type ReportHead } from './report-head.ts';
import { holdsBulletins, ReportCutter, type Report } from './reports.ts';
import { readSignificantPart, readStandardPart } from './temp-parts.ts';
import { Troubles } from './troubles.ts';

/** Ascents held while waiting for their other parts; beyond it the oldest half is handed out. */
const MOST_HELD = 20_000;

export const tempPilot: FileFormat = {
  name: 'temp-pilot',
  title: 'TEMP and PILOT bulletins (FM 35, FM 32)',
  recognise: (head) => looksLikeText(head) && holdsBulletins(latin.decode(head)),
  read: readBulletins,
};

/** Every byte a character: bulletins are plain figures and capitals, and whatever else comes must do no harm. */
const latin = new TextDecoder('windows-1252');

async function* readBulletins(
  source: ByteSource,
  options: ReadOptions,
): AsyncGenerator<Pick<Reading, 'block' | 'problems'>> {
  const named = dayInName(source.name);
  const reference = named ?? options.referenceTimeMs;
  if (reference === undefined) throw noDate(source);
  const notes = [
    named === undefined
      ? 'The code gives day and hour only: month and year are those of the reading.'
      : "The code gives day and hour only: month and year are those of the file's name.",
  ];
  const cutter = new ReportCutter();
  const troubles = new Troubles(source.name);
  let ascents = new Map<string, Ascent>();
  const handOut = (count: number): Pick<Reading, 'block' | 'problems'> => {
    const chosen = [...ascents].slice(0, count);
    ascents = new Map([...ascents].slice(count));
    const builder = new BlockBuilder();
    for (const [, ascent] of chosen) addProfile(builder, ascent, source.name, options, notes);
    return { block: builder.finish(), problems: [] };
  };

  for await (const piece of source.stream()) {
    for (let at = 0; at < piece.length; at += 65_536) {
      throwIfCancelled(options.signal);
      const text = latin.decode(piece.subarray(at, at + 65_536));
      for (const report of cutter.feed(text)) take(report, ascents, reference, troubles);
      if (ascents.size > MOST_HELD) yield handOut(MOST_HELD / 2);
    }
  }
  for (const report of cutter.feed('', true)) take(report, ascents, reference, troubles);
  if (ascents.size > 0) yield handOut(ascents.size);
  yield { block: concatBlocks([]), problems: troubles.problems() };
}

function take(report: Report, ascents: Map<string, Ascent>, reference: number, troubles: Troubles): void {
  const head = headOfReport(report);
  if (head === null) {
    troubles.noHead(report);
    return;
  }
  if (head.nil) {
    troubles.nil(report, head);
    return;
  }
  const content = contentOf(report, head);
  if (report.overlong) troubles.overlong(report, head);
  if (content.garbled > 0) troubles.garbled(report, head, content);
  const place = report.platform === 'drop' ? `${head.latitude} ${head.longitude}` : '';
  // A profiler's report is no part of a balloon's.
  const apart = report.code === 'pilot' && head.indicator === PROFILER && !'AC'.includes(report.part) ? 'profiler' : '';
  const key = `${head.id} ${head.day} ${head.hour} ${place} ${apart}`;
  let ascent = ascents.get(key);
  if (ascent === undefined) {
    const nominalMs = reportTimeMs(head.day, head.hour, reference);
    if (Number.isNaN(nominalMs)) {
      troubles.noHead(report);
      return;
    }
    ascent = new Ascent(head, report.platform, nominalMs);
    ascents.set(key, ascent);
  }
  ascent.take(report, head, content);
}

function contentOf(report: Report, head: ReportHead): PartContent {
  const upper = report.part === 'C' || report.part === 'D';
  const standard = report.part === 'A' || report.part === 'C';
  if (report.code === 'temp') return standard ? readStandardPart(head, upper) : readSignificantPart(head, upper);
  return standard ? readPilotStandardPart(head, upper) : readPilotSignificantPart(head, upper);
}

/** Figure for a wind profiler among the equipment that PILOT names (code table 0265). */
const PROFILER = '7';

function addProfile(
  builder: BlockBuilder,
  ascent: Ascent,
  source: string,
  options: ReadOptions,
  common: readonly string[],
): void {
  const { head } = ascent;
  const { id, latitude, longitude, elevation } = head;
  const station = stationBySite(options, { id, name: id, latitude, longitude, elevation });
  const placed = placeLevels(ascent.levels(), station.elevation);
  builder.add({
    station,
    source,
    instrument: instrumentOf(ascent),
    timeMs: releaseTimeMs(ascent.nominalMs, ascent.release),
    notes: [...common, ...notesOf(ascent, station, placed)],
    levels: placed.levels,
  });
}

function instrumentOf(ascent: Ascent): Instrument {
  if (ascent.platform === 'drop') return 'dropsonde';
  if (ascent.hasTemp) return 'radiosonde';
  return ascent.equipment === PROFILER ? 'wind-profiler' : 'pilot-balloon';
}

function notesOf(ascent: Ascent, station: Station, placed: PlacedLevels): string[] {
  const notes = [`Parts received: ${ascent.parts.join(', ')}.`];
  if (ascent.corrected) notes.push('A corrected report replaced an earlier one.');
  if (Number.isNaN(station.latitude) || Number.isNaN(station.longitude)) {
    notes.push(`The position of station ${station.id} is not known: give it in the site file or a station list.`);
  }
  if (placed.groundFrom === 'surface level') {
    notes.push("The station's elevation is not known: the ground was put where the surface pressure lies.");
  }
  if (placed.groundFrom === 'lowest level') {
    notes.push("The station's elevation is not known: heights are above the lowest level.");
  }
  if (placed.byStandard) {
    notes.push('Levels with a pressure and no temperatures around were placed by the standard atmosphere.');
  }
  return notes;
}

function noDate(source: ByteSource): DuskveerError {
  return new DuskveerError({
    code: 'ingest/bulletin-without-date',
    what: 'The bulletins give day and hour, and nothing says of which month and year.',
    mend: 'Put the date into the name of the file, as in bulletins_20240601.txt.',
    where: { source: source.name, line: 1 },
  });
}
