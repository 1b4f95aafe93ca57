// The jet's part in storms: the wind that cluster vectors are reckoned with, and the inflow in its layer.

import { eastward, northward, speedOf } from '../air/index.ts';
import type { Jet } from '../jet/index.ts';
import { metres, noVector, vectorFigure, type VectorFigure } from './figure.ts';
import { meanWind, type Hodograph } from './hodograph.ts';

/** What storms need of a jet. */
export type JetWind = Pick<Jet, 'noseHeight' | 'noseSpeed' | 'noseDirection' | 'core'>;

/** Below this height, m above ground, the strongest wind stands for a jet not given. */
const JET_CEILING = 1500;
/** Half the depth of a jet's layer where only its nose is known, m. */
const HALF_DEPTH = 250;

/** The jet's wind: its nose, or the strongest wind below 1500 m where no jet is given, as Corfidi (2003) has it. */
export function jetOf(hodograph: Hodograph, jet: JetWind | undefined): { wind: VectorFigure; from: string } {
  if (jet !== undefined && !Number.isNaN(jet.noseDirection)) {
    const { noseHeight, noseSpeed, noseDirection } = jet;
    const wind = vectorFigure(eastward(noseSpeed, noseDirection), northward(noseSpeed, noseDirection));
    return { wind, from: `the jet's nose at ${metres(noseHeight)} above ground` };
  }
  let best = -1;
  let bestSpeed = -1;
  for (let k = 0; k < hodograph.count && hodograph.heightAgl[k]! <= JET_CEILING; k++) {
    const speed = speedOf(hodograph.u[k]!, hodograph.v[k]!);
    if (speed > bestSpeed) {
      best = k;
      bestSpeed = speed;
    }
  }
  if (best < 0) {
    return { wind: noVector(`No wind is known below ${metres(JET_CEILING)} above ground.`), from: 'nothing' };
  }
  return {
    wind: vectorFigure(hodograph.u[best]!, hodograph.v[best]!),
    from: `the strongest wind below ${metres(JET_CEILING)}, at ${metres(hodograph.heightAgl[best]!)} above ground`,
  };
}

/** Mean wind of the jet's layer relative to a storm, m/s. */
export function jetInflow(hodograph: Hodograph, jet: JetWind | undefined, motion: VectorFigure): VectorFigure {
  if (jet === undefined) return noVector('No jet was found, so there is no inflow in its layer.');
  if (motion.why !== '') return motion;
  // Without a fall-off the jet has no core: then the air around its nose.
  const { bottom, top } = jet.core;
  const lowest = hodograph.heightAgl[0] ?? NaN;
  const mean =
    top > bottom
      ? meanWind(hodograph, Math.max(bottom, lowest), top)
      : meanWind(hodograph, Math.max(jet.noseHeight - HALF_DEPTH, lowest), jet.noseHeight + HALF_DEPTH);
  return mean.why === '' ? vectorFigure(mean.u - motion.u, mean.v - motion.v) : mean;
}
