// Where one turn of the beam ends and the next begins.

import { signedAngle } from '../../air/index.ts';
import { textOf, type Dataset } from '../netcdf/dataset.ts';

/** Rays `from` up to `to`. */
export interface Sweep {
  readonly from: number;
  readonly to: number;
}

/** Beams this steep say next to nothing of the horizontal wind and belong to whatever cone they stand in. */
export const VERTICAL = 88;
/** degrees: a cone's elevation is held better than this */
const SAME_ELEVATION = 1;
/** degrees: a beam this near to an earlier one points the same way again */
const SAME_AZIMUTH = 0.5;
/** A pause this long, s, ends a sweep. */
const PAUSE_S = 120;

/** The sweeps that the file itself tells of (CF/Radial `sweep_start_ray_index`), else those found in the angles. */
export function sweepsOf(
  dataset: Dataset,
  azimuth: Float64Array,
  elevation: Float64Array,
  timeMs: Float64Array,
): Sweep[] {
  const starts = dataset.variables.get('sweep_start_ray_index');
  const ends = dataset.variables.get('sweep_end_ray_index');
  if (starts !== undefined && ends !== undefined && starts.type !== 'text' && ends.type !== 'text') {
    const last = ends.numbers();
    const told = Array.from(starts.numbers(), (from, k) => ({ from, to: (last[k] ?? -1) + 1 }));
    const sound = told.every(
      ({ from, to }, k) =>
        from >= (told[k - 1]?.to ?? 0) && to > from && to <= azimuth.length && Number.isInteger(from),
    );
    if (sound && told.length > 0) return told;
  }
  return foundSweeps(azimuth, elevation, timeMs);
}

/** Whether the file calls the sweep something that is no cone: a vertical section, a stare. */
export function isNoCone(dataset: Dataset, sweep: number): boolean {
  const mode = dataset.variables.get('sweep_mode');
  const word = mode?.type === 'text' ? (mode.texts()[mode.dimensions.length === 0 ? 0 : sweep] ?? '') : '';
  const said = `${word} ${textOf(dataset.attributes, 'sweep_mode')}`.toLowerCase();
  return /rhi|vertical|pointing|coplane|idle|calibration|manual/u.test(said);
}

function foundSweeps(azimuth: Float64Array, elevation: Float64Array, timeMs: Float64Array): Sweep[] {
  const sweeps: Sweep[] = [];
  let from = 0;
  let turned = 0;
  let cone = NaN;
  // Azimuths of the sweep so far, by whole degrees, to find one that comes again.
  let seen = new Map<number, number>();
  const begin = (ray: number): void => {
    if (ray > from) sweeps.push({ from, to: ray });
    from = ray;
    turned = 0;
    cone = NaN;
    seen = new Map();
  };
  for (let ray = 0; ray < azimuth.length; ray++) {
    const direction = azimuth[ray]!;
    const isVertical = elevation[ray]! >= VERTICAL;
    if (ray > from && timeMs[ray]! - timeMs[ray - 1]! > PAUSE_S * 1000) begin(ray);
    if (isVertical || Number.isNaN(direction)) continue;
    if (Math.abs(elevation[ray]! - cone) > SAME_ELEVATION) begin(ray);
    const step = ray > from ? signedAngle(direction - azimuth[ray - 1]!) : 0;
    // A full turn, but for a quarter of a step: beams are never placed exactly.
    if (Math.abs(turned + step) >= 360 - Math.abs(step) / 4 || comesAgain(seen, direction)) {
      begin(ray);
    } else {
      turned += step;
    }
    cone = Number.isNaN(cone) ? elevation[ray]! : cone;
    seen.set(Math.floor(direction), direction);
  }
  begin(azimuth.length);
  return sweeps;
}

/** Only after three beams elsewhere: a slow turn gives many beams within a degree. */
function comesAgain(seen: ReadonlyMap<number, number>, direction: number): boolean {
  if (seen.size < 3) return false;
  const whole = Math.floor(direction);
  const latest = [...seen.keys()].slice(-2);
  return [whole - 1, whole, whole + 1].some((key) => {
    const earlier = seen.get((key + 360) % 360);
    return (
      earlier !== undefined &&
      !latest.includes((key + 360) % 360) &&
      Math.abs(signedAngle(direction - earlier)) <= SAME_AZIMUTH
    );
  });
}
