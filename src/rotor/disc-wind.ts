// What the wind of one profile does on one disc, with the reason where it cannot be said.

import { DuskveerError } from '../air/index.ts';
import { gatherWind, windColumn, type Profile } from '../profile/index.ts';
import { densityAt, type HubDensity } from './density.ts';
import { bottomTip, topTip, type Disc } from './disc.ts';
import { FleetScan } from './fleet-scan.ts';
import { normaliseSpeed } from './power.ts';

export interface DiscWindOptions {
  /** Height of the jet's nose, m above ground; NaN where there is no jet. */
  readonly nose?: number;
}

/** Numbers of the disc. Wind numbers are NaN where `status` is `not-assessable`; nothing is extrapolated. */
export interface DiscWind extends HubDensity {
  readonly disc: Disc;
  readonly status: 'ok' | 'not-assessable';
  /** Empty when ok, else the reason: `rotor only 62 % covered`. */
  readonly why: string;
  /** Part of the disc between lowest and highest level, 0 to 1; known in either case. */
  readonly coverage: number;
  /** m/s and degrees at the hub: u and v linear in height. */
  readonly hubSpeed: number;
  readonly hubDirection: number;
  /** Rotor-equivalent speed, m/s (IEC 61400-12-1:2017, slice form): cube mean over the slices. */
  readonly equivalentSpeed: number;
  /** The same of the component along the hub's direction; NaN without directions. */
  readonly equivalentSpeedVeer: number;
  /** Exponent of the power law fitted over the levels from tip to tip. */
  readonly shearExponent: number;
  /** Turn from the lower to the upper tip, degrees, clockwise positive; NaN unless both tips lie in the data. */
  readonly veer: number;
  /** degrees per 100 m over the covered part of the disc */
  readonly veerPer100M: number;
  /** Whether the nose lies between the tips; null where no nose was given. */
  readonly noseInRotor: boolean | null;
  /** Rotor-equivalent speed (with veer where known) at the reference density, m/s. */
  readonly normalisedSpeed: number;
}

/**
 * The wind on a rotor disc.
 * @example windOnDisc(profile, { hubHeight: 110, rotorDiameter: 130 }, { nose: 180 }).equivalentSpeed
 * @throws DuskveerError `rotor/bad-disc` when the disc is no disc or reaches into the ground
 */
export function windOnDisc(profile: Profile, disc: Disc, options: DiscWindOptions = {}): DiscWind {
  requireDisc(disc);
  const wind = new FleetScan([disc]).scan(gatherWind(profile, windColumn(profile.levelCount)));
  const { why } = wind.plans[0]!;
  const density = densityAt(profile, disc.hubHeight);
  const equivalentSpeed = wind.equivalentSpeed[0]!;
  const equivalentSpeedVeer = wind.equivalentSpeedVeer[0]!;
  return {
    disc,
    status: why === '' ? 'ok' : 'not-assessable',
    why,
    coverage: wind.coverage[0]!,
    hubSpeed: wind.hubSpeed[0]!,
    hubDirection: wind.hubDirection[0]!,
    equivalentSpeed,
    equivalentSpeedVeer,
    shearExponent: wind.shearExponent[0]!,
    veer: wind.veer[0]!,
    veerPer100M: wind.veerPer100M[0]!,
    noseInRotor: noseInDisc(disc, options.nose ?? NaN),
    ...density,
    normalisedSpeed: normaliseSpeed(
      Number.isNaN(equivalentSpeedVeer) ? equivalentSpeed : equivalentSpeedVeer,
      density.airDensity,
    ),
  };
}

/** Whether a nose lies between the tips, tips included; null for NaN. */
export function noseInDisc(disc: Disc, noseHeight: number): boolean | null {
  if (Number.isNaN(noseHeight)) return null;
  return noseHeight >= bottomTip(disc) && noseHeight <= topTip(disc);
}

function requireDisc(disc: Disc): void {
  if (disc.rotorDiameter > 0 && disc.hubHeight < Infinity && bottomTip(disc) >= 0) return;
  throw new DuskveerError({
    code: 'rotor/bad-disc',
    what: `A rotor of ${disc.rotorDiameter} m diameter cannot turn at a hub height of ${disc.hubHeight} m.`,
    mend: 'Give the diameter and the hub height above ground in metres; half the diameter must be less than the hub height.',
    where: {},
  });
}
