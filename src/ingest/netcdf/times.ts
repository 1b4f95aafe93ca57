// When each profile was measured.

import type { Problem } from '../../air/index.ts';
import { parseTimeUnit, timeMsOf, type TimeUnit } from './cf-time.ts';
import { textOf, type Dataset, type Variable } from './dataset.ts';
import type { Piece } from './gather.ts';
import { unitIn } from './roles.ts';

/** The variable that tells time, with its unit; a text variable has ISO 8601 and no unit. */
export interface TimeSource {
  readonly variable: Variable;
  readonly unit: TimeUnit | null;
}

export interface ProfileTimes {
  /** UTC, ms: end of the averaging period where the file gives its bounds; launch of a sounding. */
  readonly timeMs: Float64Array;
  /** s, NaN where not known */
  readonly periodS: Float32Array;
}

const NAMES = [
  'time',
  'times',
  'time_utc',
  'datetime',
  'date_time',
  'valid_time',
  'time_offset',
  'epoch_time',
  'base_time',
];
const AS_IT_IS = { scale: 1, offset: 0 };

/**
 * Finds the time: by standard name or axis, then by the usual names; the unit must be one of time since a date.
 * @param refused told of times whose unit or calendar cannot be used
 */
export function findTime(dataset: Dataset, refused: Problem[]): TimeSource | null {
  const all = [...dataset.variables.values()];
  const marked = all.filter(
    (variable) =>
      textOf(variable.attributes, 'standard_name') === 'time' ||
      textOf(variable.attributes, 'axis').toUpperCase() === 'T',
  );
  const named = NAMES.flatMap((name) => all.filter((variable) => variable.name.toLowerCase() === name));
  for (const variable of new Set([...marked, ...named])) {
    if (variable.type === 'text') return { variable, unit: null };
    const units = textOf(variable.attributes, 'units');
    const calendar = textOf(variable.attributes, 'calendar');
    const unit = parseTimeUnit(units, calendar);
    if (unit !== null) return { variable, unit };
    refused.push({
      code: 'ingest/unknown-time-unit',
      what: `The times of ${variable.name} are in "${units}"${calendar === '' ? '' : `, calendar "${calendar}"`}, which cannot be turned into dates.`,
      mend: 'Write times as seconds, minutes, hours or days since a date, in the standard calendar.',
      where: { source: dataset.source, key: variable.name },
    });
  }
  return null;
}

/** The times of a piece's profiles; NaN where missing. */
export function timesOf(dataset: Dataset, piece: Piece, { variable, unit }: TimeSource): ProfileTimes {
  const periodS = new Float32Array(piece.profileCount).fill(NaN);
  if (unit === null) return { timeMs: textTimes(dataset, piece, variable), periodS };
  const values = piece.perProfile(variable, AS_IT_IS, true) ?? new Float64Array(piece.profileCount).fill(NaN);
  const timeMs = values.map((value) => timeMsOf(value, unit));
  const bounds = dataset.variables.get(textOf(variable.attributes, 'bounds'));
  const edges = bounds === undefined || bounds.type === 'text' ? null : piece.pairPerProfile(bounds);
  if (edges !== null) {
    // Bounds carry no unit of their own (CF-1.11 section 7.1); the later one ends the averaging period.
    edges.forEach(([a, b], index) => {
      const start = timeMsOf(Math.min(a, b), unit);
      const end = timeMsOf(Math.max(a, b), unit);
      if (Number.isNaN(start) || Number.isNaN(end)) return;
      timeMs[index] = end;
      periodS[index] = (end - start) / 1000;
    });
    return { timeMs, periodS };
  }
  const period = dataset.variables.get('averaging_period');
  if (period !== undefined && period.type !== 'text') {
    const unit = unitIn(textOf(period.attributes, 'units'));
    if (unit?.quantity === 'time') piece.perProfile(period, unit)?.forEach((value, index) => (periodS[index] = value));
  }
  return { timeMs, periodS };
}

function textTimes(dataset: Dataset, piece: Piece, variable: Variable): Float64Array {
  const texts = variable.texts();
  const places = variable.dimensions.length === 0 ? null : piece.indexAlong(variable.dimensions[0]!, dataset);
  return Float64Array.from({ length: piece.profileCount }, (_, index) =>
    isoTimeMs(texts[places === null ? 0 : places[index]!] ?? ''),
  );
}

/** ISO 8601 with or without zone; without it is UTC. */
function isoTimeMs(text: string): number {
  const match =
    /^(\d{4})-?(\d{2})-?(\d{2})(?:[T ]?(\d{2}):?(\d{2})(?::?(\d{2}(?:\.\d*)?))?)?\s*(z|utc|[+-]\d{2}:?\d{2})?$/iu.exec(
      text.trim(),
    );
  if (match === null) return NaN;
  const [, year, month, day, hour = '00', minute = '00', second = '00', zone = 'Z'] = match;
  const offset = /^(?:z|utc)$/iu.test(zone) ? 'Z' : zone.replace(/(\d{2}):?(\d{2})$/u, '$1:$2');
  return Date.parse(`${year}-${month}-${day}T${hour}:${minute}:${Number(second).toFixed(3).padStart(6, '0')}${offset}`);
}
