// Heights above ground of a piece's levels, and the stations they stand on.

import type { Problem } from '../../air/index.ts';
import type { Station } from '../../profile/index.ts';
import type { FileStations } from './file-station.ts';
import type { Piece } from './gather.ts';
import { meaningOfHeight } from './heights.ts';
import type { Plan } from './plan.ts';

export interface GroundHeights extends FileStations {
  /** m, NaN where it cannot be worked out */
  readonly heightAgl: Float32Array;
  /** Whether the levels were turned round because the file's heights descend. */
  readonly downward: boolean;
  /** m above sea level of a level; the height above ground where the ground is not known. */
  readonly heightAmsl: (level: number) => number;
}

/** @param notes told of what was assumed @param problems told when heights cannot be worked out */
export function groundHeights(
  plan: Plan,
  piece: Piece,
  found: FileStations,
  notes: string[],
  problems: Problem[],
): GroundHeights {
  const { variable } = plan.height;
  const meaning = meaningOfHeight(plan.height);
  if (meaning.note !== '') notes.push(meaning.note);
  const count = piece.offsets.at(-1)!;
  let heights = piece.levels(variable, meaning.unit) ?? new Float32Array(count).fill(NaN);
  const downward = descends(heights, piece.offsets[0]!, piece.offsets[1] ?? 0) && variable.dimensions.length === 1;
  if (downward) heights = piece.levels(variable, meaning.unit, true)!;
  let { stations } = found;
  const { stationIndex } = found;
  if (meaning.above === 'sea') {
    if (plan.launched) stations = withLaunchHeight(stations, stationIndex, heights, piece.offsets, notes);
    if (stations.some((station) => Number.isNaN(station.elevation))) problems.push(noElevation(plan, stations));
    subtractGround(heights, piece.offsets, stations, stationIndex);
  }
  return {
    stations,
    stationIndex,
    heightAgl: heights,
    downward,
    heightAmsl: heightsAmsl(heights, piece.offsets, stations, stationIndex),
  };
}

function descends(heights: Float32Array, start: number, end: number): boolean {
  return end - start > 1 && heights[start]! > heights[end - 1]!;
}

/** A sonde starts on the ground: where nobody states its height, that is the first level's. */
function withLaunchHeight(
  stations: readonly Station[],
  stationIndex: Uint16Array,
  heights: Float32Array,
  offsets: Uint32Array,
  notes: string[],
): Station[] {
  return stations.map((station, place) => {
    const profile = stationIndex.indexOf(place);
    const first = heights.subarray(offsets[profile], offsets[profile + 1]).find((height) => !Number.isNaN(height));
    if (!Number.isNaN(station.elevation) || first === undefined) return station;
    notes.push('the height of the ground is that of the first level');
    return { ...station, elevation: Number(first.toFixed(1)) };
  });
}

function subtractGround(
  heights: Float32Array,
  offsets: Uint32Array,
  stations: readonly Station[],
  stationIndex: Uint16Array,
): void {
  for (let profile = 0; profile < stationIndex.length; profile++) {
    const { elevation } = stations[stationIndex[profile]!]!;
    for (let k = offsets[profile]!; k < offsets[profile + 1]!; k++) heights[k] = heights[k]! - elevation;
  }
}

function heightsAmsl(
  heightAgl: Float32Array,
  offsets: Uint32Array,
  stations: readonly Station[],
  stationIndex: Uint16Array,
): (level: number) => number {
  let profile = 0;
  return (level) => {
    // Asked in rising order, so that the profile is never searched for.
    if (level < offsets[profile]!) profile = 0;
    while (level >= offsets[profile + 1]!) profile++;
    const { elevation } = stations[stationIndex[profile]!]!;
    return heightAgl[level]! + (Number.isNaN(elevation) ? 0 : elevation);
  };
}

function noElevation({ dataset, height }: Plan, stations: readonly Station[]): Problem {
  const station = stations.find(({ elevation }) => Number.isNaN(elevation))!;
  return {
    code: 'ingest/no-elevation',
    what: `${height.variable.name} is above sea level and the file does not say how high the station ${station.name} stands, so heights above ground are not known.`,
    mend: `Give the station ${station.id} and its elevation in a site file or a station list.`,
    where: { source: dataset.source, key: height.variable.name },
  };
}
