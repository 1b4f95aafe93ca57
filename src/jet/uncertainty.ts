// How far each level's speed may be off, where the source does not say: assumed by kind of instrument.

import { DOUBTING, type Instrument, type WindColumn } from '../profile/index.ts';

/** Standard uncertainty of a level's speed: at the ground, and what each kilometre of height adds, both m/s. */
interface Assumption {
  readonly atGround: number;
  readonly perKilometre: number;
}

/**
 * Assumed standard uncertainties of 10-minute or momentary speeds. Common practice, without source: what makers and
 * comparisons commonly state, rounded. The profile's own roughness corrects them (`posterior.ts`).
 */
const ASSUMED: Readonly<Record<Instrument, Assumption>> = {
  unknown: { atGround: 0.4, perKilometre: 0.2 },
  radiosonde: { atGround: 0.5, perKilometre: 0 },
  dropsonde: { atGround: 0.5, perKilometre: 0 },
  'pilot-balloon': { atGround: 1, perKilometre: 0.5 },
  'wind-profiler': { atGround: 0.6, perKilometre: 0.2 },
  lidar: { atGround: 0.2, perKilometre: 0.2 },
  sodar: { atGround: 0.4, perKilometre: 0.5 },
  radar: { atGround: 0.6, perKilometre: 0.2 },
  mast: { atGround: 0.2, perKilometre: 0 },
  merged: { atGround: 0.4, perKilometre: 0.2 },
  model: { atGround: 1, perKilometre: 0 },
};

/** A doubtful mark multiplies the uncertainty of its level. Our own choice. */
const DOUBT_FACTOR = 3;

/** Where the uncertainty of a profile's levels comes from. */
export type UncertaintyOrigin = 'stated' | 'assumed';

/**
 * Fills in what is not stated and widens what is doubtful, in the column itself.
 * @param stated m/s for every level, from the site file; NaN when it says nothing
 * @returns `stated` when every level had its uncertainty from the source or the site
 */
export function completeUncertainty(wind: WindColumn, instrument: Instrument, stated: number): UncertaintyOrigin {
  const { atGround, perKilometre } = ASSUMED[instrument];
  let origin: UncertaintyOrigin = 'stated';
  for (let k = 0; k < wind.count; k++) {
    let uncertainty = wind.speedUncertainty[k]!;
    if (!(uncertainty > 0)) {
      if (stated > 0) uncertainty = stated;
      else {
        uncertainty = atGround + (perKilometre * Math.max(0, wind.heightAgl[k]!)) / 1000;
        origin = 'assumed';
      }
    }
    if ((wind.mark[k]! & DOUBTING) !== 0) uncertainty *= DOUBT_FACTOR;
    wind.speedUncertainty[k] = uncertainty;
  }
  return origin;
}
