// The layer of the jet: how thick its core is, how hard the wind shears below and above the nose, whether the shear can mix
// the air there, and where the nose stands against each rotor.

import {
  bulkRichardson,
  GRAVITY,
  HEAT_CAPACITY_DRY,
  potentialTemperature,
  virtualTemperature,
  type MovingLevel,
} from '../air/index.ts';
import { REJECTING_AIR, type Profile } from '../profile/index.ts';
import { between } from './column.ts';
import type { Jet } from './find-jets.ts';
import { windAtHeights, type WindVector } from './wind-at.ts';

/** One side of the nose, between it and the bound of the core. NaN where winds or temperatures are missing. */
export interface JetFlank {
  /** m above ground */
  readonly bottom: number;
  readonly top: number;
  /** Size of the vector difference of the wind over the depth, 1/s. */
  readonly shear: number;
  /** Gradient Richardson number over the flank; below a quarter the shear mixes the air (Stull 1988). */
  readonly richardson: number;
}

export type NosePlace = 'below' | 'in' | 'above';

export interface JetLayer {
  /** m: top less bottom of the core; a lower bound where the core reaches the lowest level. NaN without fall-off. */
  readonly thickness: number;
  readonly thicknessIsBound: boolean;
  readonly below: JetFlank;
  readonly above: JetFlank;
  /** The nose against each disc given, in their order. */
  readonly noseAgainstDiscs: readonly NosePlace[];
}

/** A rotor disc: hub height and diameter, m. */
export interface Disc {
  readonly hubHeight: number;
  readonly rotorDiameter: number;
}

/** Numbers of the layer of a jet found in this profile. */
export function jetLayer(profile: Profile, jet: Jet, discs: readonly Disc[] = []): JetLayer {
  const { bottom, top, bottomIsBound } = jet.core;
  return {
    thickness: top - bottom,
    thicknessIsBound: bottomIsBound,
    below: flank(profile, bottom, jet.noseHeight),
    above: flank(profile, jet.noseHeight, top),
    noseAgainstDiscs: discs.map((disc) => noseAgainst(jet.noseHeight, disc)),
  };
}

/** Where a height stands against a disc; the tips belong to it. */
function noseAgainst(noseHeight: number, { hubHeight, rotorDiameter }: Disc): NosePlace {
  if (noseHeight < hubHeight - rotorDiameter / 2) return 'below';
  return noseHeight > hubHeight + rotorDiameter / 2 ? 'above' : 'in';
}

function flank(profile: Profile, bottom: number, top: number): JetFlank {
  const [low, high] = windAtHeights(profile, [bottom, top]) as [WindVector, WindVector];
  const level = (height: number, wind: WindVector): MovingLevel => ({
    height,
    virtualPotentialTemperature: virtualPotentialTemperatureAt(profile, height),
    ...wind,
  });
  return {
    bottom,
    top,
    shear: Math.hypot(high.u - low.u, high.v - low.v) / (top - bottom),
    richardson: bulkRichardson(level(bottom, low), level(top, high)),
  };
}

/** Levels with temperature further apart than this, m, say nothing of what lies between. Our own choice. */
const WIDEST_GAP = 300;

/**
 * Virtual potential temperature at a height, K, linear between levels; without pressure at every level, warmed
 * dry-adiabatically from the ground, which serves differences as well.
 */
export function virtualPotentialTemperatureAt(profile: Profile, height: number): number {
  const { heightAgl, temperature, pressure, specificHumidity, mark } = profile;
  if (temperature === null) return NaN;
  const known = (k: number): boolean => !Number.isNaN(temperature[k]!) && (mark[k]! & REJECTING_AIR) === 0;
  // One reference for all levels: a pressure missing at some would mix two.
  const byPressure = pressure !== null && temperature.every((_, k) => !known(k) || pressure[k]! > 0);
  const at = (k: number): number => {
    const humidity = specificHumidity?.[k] ?? NaN;
    const moist = Number.isNaN(humidity) ? temperature[k]! : virtualTemperature(temperature[k]!, humidity);
    return byPressure
      ? potentialTemperature(moist, pressure[k]!)
      : moist + (GRAVITY / HEAT_CAPACITY_DRY) * heightAgl[k]!;
  };
  let below = -1;
  for (let k = 0; k < profile.levelCount && heightAgl[k]! <= height; k++) if (known(k)) below = k;
  let above = Math.max(0, below);
  while (above < profile.levelCount && !(heightAgl[above]! >= height && known(above))) above++;
  if (below < 0 || above === profile.levelCount) return NaN;
  if (above === below) return at(below);
  const gap = heightAgl[above]! - heightAgl[below]!;
  return gap > WIDEST_GAP ? NaN : between(at(below), at(above), (height - heightAgl[below]!) / gap);
}
