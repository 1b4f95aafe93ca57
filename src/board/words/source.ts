// What a picture rests on, for the line under its title.

import { FIELDS, type FieldName } from '../../plot/index.ts';
import type { Board } from '../state/board.svelte.ts';
import { durationWords } from './time.ts';

/** `wind speed, Ridge lidar (lidar), profiles every 10 min, last one 6 min old; jets by duskveer`. */
export function sourceWords(board: Board, field: FieldName): string {
  const { feed, night } = board;
  if (feed === undefined || night === null) return FIELDS[field].title;
  const lastMs = night.timeMs.at(-1);
  const age = lastMs === undefined ? 'no profile in this night' : `last one ${durationWords(board.atMs - lastMs)} old`;
  const invented = board.demo === '' ? '' : '; all of it invented';
  return (
    `${FIELDS[field].title}, ${feed.station.name} (${feed.instrument}), ` +
    `profiles every ${durationWords(board.stepMs)}, ${age}; jets by ${night.criteria.name}${invented}`
  );
}
