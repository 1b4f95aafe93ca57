// What the page Inflow knows: the answer for feed and moment, the parcel and motion looked at, the height under the cursor.

import type { InflowState } from '../../desk/index.ts';
import type { SceneWind } from '../../plot/index.ts';
import { ingredientsOf, relativeTo, vectorFigure, type ParcelName, type VectorFigure } from '../../storm/index.ts';
import { leadingParcel } from '../words/inflow.ts';
import type { Board } from './board.svelte.ts';

/** Tops that the picture may have, m above ground; the first suits the night. */
export const PICTURE_TOPS = [5000, 3000, 8000, 16_000] as const;
const LEAST_TOP = 1000;
/** A step of the cursor, m. */
const CURSOR_STEP = 50;

export class Inflow {
  readonly #board: Board;
  #questions = 0;

  /** `none` where there is nothing to reckon from, or it may not be used, as `why` says. */
  phase = $state<'reckoning' | 'told' | 'none'>('reckoning');
  why = $state('');
  told = $state.raw<InflowState | null>(null);
  /** m/s eastward and northward: the storm's motion set by hand; null follows Bunkers. */
  motion = $state.raw<{ readonly u: number; readonly v: number } | null>(null);
  chosenParcel = $state<ParcelName | null>(null);
  /** m above ground */
  cursor = $state<number | null>(null);
  top = $state<number>(PICTURE_TOPS[0]);
  /** While a sheet is printed everything is drawn on light ground. */
  printing = $state(false);

  /** The motion that helicity and inflow are told for. */
  readonly usedMotion: VectorFigure = $derived.by(() => {
    if (this.motion !== null) return vectorFigure(this.motion.u, this.motion.v);
    const storm = this.told?.storm;
    if (storm === undefined || storm.prevailing === 'unknown') {
      return { u: NaN, v: NaN, why: 'It is not known which storms prevail here: the station has no position.' };
    }
    return storm.motion[storm.prevailing];
  });

  /** The numbers with helicity and inflow for the motion used. */
  readonly storm = $derived.by(() => {
    if (this.told === null) return null;
    const { storm, hodograph, jet } = this.told;
    if (this.motion === null) return storm;
    const relative = relativeTo(this.usedMotion, { hodograph, inflow: storm.inflow, jet: jet ?? undefined });
    return { ...storm, ...relative, mover: 'given' as const };
  });

  readonly ingredients = $derived(
    this.told === null || this.storm === null ? [] : ingredientsOf(this.storm, this.told.others),
  );

  readonly parcelName: ParcelName = $derived(
    this.chosenParcel ?? (this.told === null ? 'most-unstable' : leadingParcel(this.told.storm)),
  );

  /** m above ground: no higher than there is something to see. */
  readonly shownTop: number = $derived.by(() => {
    if (this.told === null) return this.top;
    const { columns, hodograph } = this.told;
    const reach = Math.max(columns.heightAgl.at(-1) ?? 0, hodograph.heightAgl.at(-1) ?? 0);
    return Math.max(LEAST_TOP, Math.min(this.top, Math.ceil(reach / 500) * 500));
  });

  readonly wind: SceneWind | null = $derived(this.told?.hodograph ?? null);

  constructor(board: Board) {
    this.#board = board;
  }

  /** Asks the worker anew; answers that a newer question has overtaken are dropped. */
  async ask(atMs: number, feed: string, criteria: string): Promise<void> {
    const question = ++this.#questions;
    this.phase = 'reckoning';
    if (feed === '' || !Number.isFinite(atMs)) {
      this.told = null;
      return;
    }
    const answer = await this.#board.worker.inflow(atMs, feed, criteria);
    if (question !== this.#questions) return;
    if (answer === null) this.#none('There is no profile of this feed up to this moment.');
    else if (!('storm' in answer)) this.#none(answer.why);
    else {
      this.told = answer;
      this.phase = 'told';
      this.why = '';
    }
  }

  moveCursor(steps: number): void {
    const from = this.cursor ?? 0;
    this.cursor = Math.min(this.shownTop, Math.max(0, Math.round(from / CURSOR_STEP + steps) * CURSOR_STEP));
  }

  #none(why: string): void {
    this.told = null;
    this.phase = 'none';
    this.why = why;
  }
}
