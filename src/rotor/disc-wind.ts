// What the wind of one profile does on one disc, with the reason where it cannot be said.

import { directionOf, DuskveerError, shearExponent, speedOf } from '../air/index.ts';
import { completeUncertainty } from '../jet/index.ts';
import { gatherWind, windColumn, type Profile } from '../profile/index.ts';
import { continueWind } from './continuation.ts';
import { densityAt, type HubDensity } from './density.ts';
import { bottomTip, topTip, type Disc } from './disc.ts';
import { discUncertainty, type DiscUncertainty } from './disc-uncertainty.ts';
import { FleetScan, interpolate, type FleetWind, type ScannedLevels } from './fleet-scan.ts';
import { cubeMean, discQuadrature } from './integral.ts';
import { gustinessAt, type Gustiness } from './gustiness.ts';
import type { Between } from './plan.ts';
import { normaliseSpeed } from './power.ts';

export interface DiscWindOptions {
  /** Height of the jet's nose, m above ground; NaN where there is no jet. */
  readonly nose?: number;
  /** Ground under the turbine above the station's ground, m; the wind is taken as level over sea level. */
  readonly groundOffset?: number;
  /** What stands below and above the measured heights (site file). */
  readonly continuation?: 'none' | 'power-law';
  /** Standard uncertainty of a level's speed, m/s, where the profile states none; NaN takes the kind of instrument's. */
  readonly speedUncertainty?: number;
}

/** Wind at one height of the disc; NaN where the data do not reach. */
export interface WindAt {
  readonly speed: number;
  readonly direction: number;
}

/** Numbers of the disc. Wind numbers are NaN where `status` is `not-assessable`; nothing is extrapolated unasked. */
export interface DiscWind extends HubDensity, Gustiness {
  readonly disc: Disc;
  readonly status: 'ok' | 'not-assessable';
  /** Empty when ok, else the reason: `rotor only 62 % covered`. */
  readonly why: string;
  /** Part of the disc between lowest and highest measured level, 0 to 1; known in either case. */
  readonly coverage: number;
  /** Share of the disc's area that rests on the site's power-law continuation instead of data, 0 to 1. */
  readonly continuedShare: number;
  /** m/s and degrees at the hub: u and v linear in height. */
  readonly hubSpeed: number;
  readonly hubDirection: number;
  /** Rotor-equivalent speed, m/s (IEC 61400-12-1:2017, slice form): cube mean over the slices. */
  readonly equivalentSpeed: number;
  /** The same of the component along the hub's direction; NaN without directions. */
  readonly equivalentSpeedVeer: number;
  /** The same two by the integral of the wind taken as linear between levels. */
  readonly integralSpeed: number;
  readonly integralSpeedVeer: number;
  /** The two forms differ by more than half a per cent: levels are coarse for this wind. */
  readonly formsDiffer: boolean;
  /** Exponent of the power law fitted over the levels from tip to tip. */
  readonly shearExponent: number;
  /** The same from the lower tip to the hub and from the hub to the upper tip, the wind at the hub taking part in both. */
  readonly shearLower: number;
  readonly shearUpper: number;
  readonly bottom: WindAt;
  readonly top: WindAt;
  /** Turn from the lower to the upper tip, degrees, clockwise positive; NaN unless both tips lie in the data. */
  readonly veer: number;
  /** degrees per 100 m over the covered part of the disc */
  readonly veerPer100M: number;
  readonly uncertainty: DiscUncertainty;
  /** Whether source or site state every level's uncertainty or some are assumed by kind of instrument. */
  readonly uncertaintyFrom: 'stated' | 'assumed';
  /** Whether the nose lies between the tips; null where no nose was given. */
  readonly noseInRotor: boolean | null;
  /** Rotor-equivalent speed (with veer where known) at the reference density, m/s. */
  readonly normalisedSpeed: number;
}

/** Slice and integral form differ noticeably from here on, as a share. */
const FORMS_DIFFER = 0.005;

/**
 * The wind on a rotor disc.
 * @example windOnDisc(profile, { hubHeight: 110, rotorDiameter: 130 }, { nose: 180 }).equivalentSpeed
 * @throws DuskveerError `rotor/bad-disc` when the disc is no disc or reaches into the ground
 */
export function windOnDisc(profile: Profile, disc: Disc, options: DiscWindOptions = {}): DiscWind {
  requireDisc(disc);
  const raised = { hubHeight: disc.hubHeight + (options.groundOffset ?? 0), rotorDiameter: disc.rotorDiameter };
  const measured = gatherWind(profile, windColumn(profile.levelCount));
  const origin = completeUncertainty(measured, profile.instrument, options.speedUncertainty ?? NaN);
  const scan = new FleetScan([raised]);
  const coverage = scan.scan(measured).coverage[0]!;
  const continued = options.continuation === 'power-law' ? continueWind(measured, raised) : undefined;
  const column = continued?.column ?? measured;
  const wind = scan.scan(column);
  const plan = wind.plans[0]!;
  const density = densityAt(profile, raised.hubHeight);
  const ofScanned = (values: ArrayLike<number>): Float64Array =>
    Float64Array.from({ length: scan.levels.count }, (_, k) => values[scan.levels.column[k]!]!);
  const bottom = windAt(scan.levels, plan.bottom);
  const top = windAt(scan.levels, plan.top);
  const known = plan.why === '';
  const hub = { height: raised.hubHeight, speed: wind.hubSpeed[0]! };
  const equivalentSpeed = wind.equivalentSpeed[0]!;
  const equivalentSpeedVeer = wind.equivalentSpeedVeer[0]!;
  const integral = known ? integralForm(scan.levels, raised, wind) : { integralSpeed: NaN, integralSpeedVeer: NaN };
  return {
    disc,
    status: known ? 'ok' : 'not-assessable',
    why: [plan.why, known ? '' : (continued?.why ?? '')].filter((part) => part !== '').join('; '),
    coverage,
    continuedShare: continued?.share ?? 0,
    hubSpeed: hub.speed,
    hubDirection: wind.hubDirection[0]!,
    equivalentSpeed,
    equivalentSpeedVeer,
    ...integral,
    formsDiffer: Math.abs(integral.integralSpeed / equivalentSpeed - 1) > FORMS_DIFFER,
    shearExponent: wind.shearExponent[0]!,
    shearLower: known ? shearBetween(scan.levels, bottomTip(raised), raised.hubHeight, hub) : NaN,
    shearUpper: known ? shearBetween(scan.levels, raised.hubHeight, topTip(raised), hub) : NaN,
    bottom: known ? bottom : UNKNOWN,
    top: known ? top : UNKNOWN,
    veer: wind.veer[0]!,
    veerPer100M: wind.veerPer100M[0]!,
    uncertainty: known
      ? discUncertainty(plan, scan.levels, ofScanned(column.speedUncertainty), ofScanned(column.level), {
          equivalentSpeed,
          bottomSpeed: bottom.speed,
          topSpeed: top.speed,
        })
      : NO_UNCERTAINTY,
    // A joined profile carries what was assumed of its parts as if it were stated.
    uncertaintyFrom: profile.instrument === 'merged' ? 'assumed' : origin,
    noseInRotor: noseInDisc(raised, options.nose ?? NaN),
    ...density,
    ...gustinessAt(profile, raised.hubHeight),
    normalisedSpeed: normaliseSpeed(bestSpeed({ equivalentSpeed, equivalentSpeedVeer }), density.airDensity),
  };
}

const UNKNOWN: WindAt = { speed: NaN, direction: NaN };
const NO_UNCERTAINTY: DiscUncertainty = { hubSpeed: NaN, equivalentSpeed: NaN, shearExponent: NaN, veer: NaN };

/** The equivalent speed to reckon with: with veer where directions are known. */
export function bestSpeed(wind: Pick<DiscWind, 'equivalentSpeed' | 'equivalentSpeedVeer'>): number {
  return Number.isNaN(wind.equivalentSpeedVeer) ? wind.equivalentSpeed : wind.equivalentSpeedVeer;
}

/** Whether a nose lies between the tips, tips included; null for NaN. */
export function noseInDisc(disc: Disc, noseHeight: number): boolean | null {
  if (Number.isNaN(noseHeight)) return null;
  return noseHeight >= bottomTip(disc) && noseHeight <= topTip(disc);
}

function windAt(levels: Readonly<ScannedLevels>, at: Between): WindAt {
  if (!levels.directed) return { speed: interpolate(levels.speed, at), direction: NaN };
  const u = interpolate(levels.u, at);
  const v = interpolate(levels.v, at);
  return { speed: speedOf(u, v), direction: directionOf(u, v) };
}

function integralForm(
  levels: Readonly<ScannedLevels>,
  disc: Disc,
  wind: FleetWind,
): Pick<DiscWind, 'integralSpeed' | 'integralSpeedVeer'> {
  const quadrature = discQuadrature(disc, levels.heightAgl, levels.count);
  const hub = wind.plans[0]!.hub;
  const [hubU, hubV] = [interpolate(levels.u, hub), interpolate(levels.v, hub)];
  const hubSpeed = speedOf(hubU, hubV);
  const along = (level: number): number => (levels.u[level]! * hubU + levels.v[level]! * hubV) / hubSpeed;
  const integralSpeed = cubeMean(quadrature, (level) => levels.speed[level]!);
  const calm = integralSpeed === 0 && levels.directed;
  return { integralSpeed, integralSpeedVeer: calm ? 0 : cubeMean(quadrature, along) };
}

/** Exponent over the levels between two heights of which one is the hub; a level at the hub is not counted twice. */
function shearBetween(
  levels: Readonly<ScannedLevels>,
  low: number,
  high: number,
  hub: { readonly height: number; readonly speed: number },
): number {
  const heights = [hub.height];
  const speeds = [hub.speed];
  for (let k = 0; k < levels.count; k++) {
    const height = levels.heightAgl[k]!;
    if (height < low || height > high || height === hub.height) continue;
    heights.push(height);
    speeds.push(levels.speed[k]!);
  }
  return shearExponent(heights, speeds).exponent;
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
