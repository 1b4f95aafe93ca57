// Tallies what is wrong in bulletins: one problem a kind, with the count and the first place.

import type { Problem } from '../../air/index.ts';
import type { PartContent } from './levels.ts';
import type { ReportHead } from './report-head.ts';
import type { Report } from './reports.ts';

interface Tally {
  count: number;
  readonly line: number;
  readonly first: string;
  readonly stations: Set<string>;
}

const KINDS = {
  noHead: {
    code: 'ingest/bulletin-head',
    what: ({ count, first }: Tally) =>
      `${count === 1 ? 'A report has' : `${count} reports have`} no readable station and time, first “${first}”; passed over.`,
    mend: 'Fetch the bulletin again, or correct the groups after the report letters.',
  },
  nil: {
    code: 'ingest/bulletin-nil',
    what: ({ count, stations }: Tally) =>
      `${count === 1 ? 'A report says' : `${count} reports say`} that there is no sounding (NIL): ${listed(stations)}.`,
    mend: 'Nothing to mend here: the station sent none.',
  },
  garbled: {
    code: 'ingest/bulletin-garbled',
    what: ({ count, first, stations }: Tally) =>
      `${count === 1 ? 'A group makes' : `${count} groups make`} no sense, first ${first}; the rest of the reports is used (${listed(stations)}).`,
    mend: 'Fetch the bulletin again if a correction has been sent.',
  },
  overlong: {
    code: 'ingest/bulletin-overlong',
    what: ({ count, stations }: Tally) =>
      `${count === 1 ? 'A report does' : `${count} reports do`} not end; what comes after 1500 groups was passed over (${listed(stations)}).`,
    mend: 'Check that every report ends with an equals sign.',
  },
} as const;
type Kind = keyof typeof KINDS;

export class Troubles {
  readonly #source: string;
  readonly #tallies = new Map<Kind, Tally>();

  constructor(source: string) {
    this.#source = source;
  }

  noHead(report: Report): void {
    this.#add('noHead', report, report.groups.slice(0, 3).join(' ').slice(0, 40), '', 1);
  }

  nil(report: Report, head: ReportHead): void {
    this.#add('nil', report, '', head.id, 1);
  }

  garbled(report: Report, head: ReportHead, content: PartContent): void {
    const first = `“${content.firstGarbled.slice(0, 12)}” in part ${report.part} of ${head.id}`;
    this.#add('garbled', report, first, head.id, content.garbled);
  }

  overlong(report: Report, head: ReportHead): void {
    this.#add('overlong', report, '', head.id, 1);
  }

  problems(): Problem[] {
    return [...this.#tallies].map(([kind, tally]) => ({
      code: KINDS[kind].code,
      what: KINDS[kind].what(tally),
      mend: KINDS[kind].mend,
      where: { source: this.#source, line: tally.line },
    }));
  }

  #add(kind: Kind, report: Report, first: string, station: string, count: number): void {
    const tally = this.#tallies.get(kind) ?? { count: 0, line: report.line, first, stations: new Set<string>() };
    tally.count += count;
    if (station !== '') tally.stations.add(station);
    this.#tallies.set(kind, tally);
  }
}

function listed(stations: ReadonlySet<string>): string {
  const all = [...stations];
  return all.length <= 8 ? all.join(', ') : `${all.slice(0, 8).join(', ')} and ${all.length - 8} more`;
}
