// What an invented farm reports of its output, as CSV: ten-minute means, less than the curves promise by its wakes and by
// machines that stand still.

import { airDensity, REFERENCE_DENSITY, speedOf } from '../../src/air/index.ts';
import { powerFromCurve } from '../../src/rotor/index.ts';
import { momentsOf, type AtmospherePlan } from './atmosphere.ts';
import { Chance } from './chance.ts';
import { isoSeconds, within, type Spell } from './clock.ts';

/** A turbine type as the site file has it. */
export interface FarmType {
  readonly count: number;
  readonly hub_height_m: number;
  readonly rotor_diameter_m: number;
  readonly power_curve: { readonly speed_mps: readonly number[]; readonly power_kw: readonly number[] };
}

export interface FarmOutputPlan {
  readonly seed: number;
  readonly types: readonly FarmType[];
  readonly timesMs: readonly number[];
  /** What wakes leave of the sum of the curves. */
  readonly share: number;
  /** Machines of the first type that stand still for a while. */
  readonly standing: { readonly count: number; readonly during: Spell };
  /** No output is reported. */
  readonly gaps: readonly Spell[];
}

/** Heights at which the wind over a disc is taken, as parts of its radius. */
const PARTS = [-0.9, -0.7, -0.5, -0.3, -0.1, 0.1, 0.3, 0.5, 0.7, 0.9];
/** Output strays from the curve by this share from time to time. */
const STRAY = 0.025;

export function farmOutputCsv(atmosphere: AtmospherePlan, plan: FarmOutputPlan): string {
  const chance = new Chance(plan.seed);
  const lines = ['time_utc,output_mw'];
  for (const moment of momentsOf(atmosphere, plan.timesMs)) {
    const standing = within(moment.timeMs, [plan.standing.during]) ? plan.standing.count : 0;
    let total = 0;
    plan.types.forEach(({ count, hub_height_m: hub, rotor_diameter_m: diameter, power_curve: curve }, k) => {
      const [air] = moment.air([hub]);
      const density = airDensity(air!.temperature, air!.pressure, air!.specificHumidity);
      let [cubes, chords] = [0, 0];
      for (const part of PARTS) {
        const { u, v } = moment.wind(hub + (part * diameter) / 2);
        const chord = Math.sqrt(1 - part * part);
        cubes += chord * speedOf(u, v) ** 3;
        chords += chord;
      }
      const speed = Math.cbrt(((cubes / chords) * density) / REFERENCE_DENSITY);
      const power = powerFromCurve({ speed: curve.speed_mps, powerKw: curve.power_kw }, speed);
      total += (count - (k === 0 ? standing : 0)) * power;
    });
    const output = (plan.share * total * (1 + STRAY * chance.normal())) / 1000;
    if (!within(moment.timeMs, plan.gaps)) lines.push(`${isoSeconds(moment.timeMs)},${output.toFixed(2)}`);
  }
  return `${lines.join('\n')}\n`;
}
