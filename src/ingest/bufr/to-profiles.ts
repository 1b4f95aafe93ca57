// Elements to profiles, by what each element means and never by template: what stands outside the innermost repetition of
// measured values is said of the report, what stands inside is said of a level.

import type { BlockBuilder } from '../../profile/index.ts';
import type { KnownStations } from '../site-station.ts';
import { SAID, type Elements } from './elements.ts';
import { LevelGatherer } from './levels.ts';
import type { Program } from './program.ts';
import { ReportHeader } from './report.ts';
import { FIRST_OF_LEVEL, LAST_COORDINATE, ROLE } from './roles.ts';

export interface MessageContext {
  readonly source: string;
  readonly known: KnownStations;
  /** Header time of the message, UTC ms: used where the report gives none. */
  readonly headerTimeMs: number;
  readonly revision: number;
}

/** Turns reports into profiles; one for a file, so that its buffers serve all messages. */
export class ProfileMaker {
  readonly #levels = new LevelGatherer();
  readonly #header = new ReportHeader();

  /** Adds the profiles of one report of the elements: one as a rule, several where it repeats its time. */
  add(program: Program, elements: Elements, report: number, context: MessageContext, builder: BlockBuilder): void {
    const { role, loop, ofLevel } = program;
    const { instruction, value, said, count, reports } = elements;
    const levels = this.#levels;
    const header = this.#header;
    levels.clear();
    header.clear(elements.texts);
    let before = -1;
    let loopBefore = 0;
    for (let e = 0; e < count; e++) {
      const place = e * reports + report;
      if ((said[place]! & SAID.aside) !== 0) continue;
      const pc = instruction[e]!;
      const here = loop[pc]!;
      // Entering or leaving a repetition, or beginning its next round, ends a level.
      if (here !== loopBefore || pc <= before) levels.close();
      before = pc;
      loopBefore = here;
      const what = role[pc]!;
      if (what === 0) continue;
      if (what < FIRST_OF_LEVEL) {
        if (here > 0 && ofLevel[pc] === 1) continue;
        // A time after levels opens the next profile of the same station.
        if (what === ROLE.year && levels.count > 0) {
          levels.close();
          this.#finish(program, context, builder);
          levels.clear();
        }
        header.put(what, value[place]!);
      } else if (ofLevel[pc] === 1) {
        if (what <= LAST_COORDINATE && levels.hasMet(what)) levels.close();
        levels.put(what, value[place]!, said[place]!);
      }
    }
    levels.close();
    this.#finish(program, context, builder);
  }

  #finish(program: Program, context: MessageContext, builder: BlockBuilder): void {
    const levels = this.#levels;
    const header = this.#header;
    const station = header.station(context.known, levels.surfaceHeight);
    const { timeMs, periodS } = header.time();
    const notes: string[] = [];
    if (Number.isNaN(timeMs))
      notes.push('The report gives no time of its own; the nominal time of its message is used.');
    if (
      Number.isNaN(header.elevation) &&
      !Number.isNaN(station.elevation) &&
      station.elevation === levels.surfaceHeight
    ) {
      notes.push('The report gives no station height; the height of its surface level is used.');
    }
    if (levels.count === 0) notes.push('The report holds no level.');
    builder.add({
      station,
      source: context.source,
      instrument: header.instrument(program),
      timeMs: Number.isNaN(timeMs) ? context.headerTimeMs : timeMs,
      periodS,
      revision: context.revision,
      notes,
      levels: levels.finish(station.elevation),
    });
  }
}
