// Temperature, humidity and pressure of an invented night, written down rather than computed: by day a mixed layer under
// a lid, by night cooling from the ground up, and moist air that the jet brings.

import {
  GAS_CONSTANT_DRY,
  GRAVITY,
  KAPPA,
  specificHumidityOfRelative,
  virtualTemperature,
} from '../../src/air/index.ts';

export interface AirPlan {
  /** Pa at the ground */
  readonly surfacePressure: number;
  /** Potential temperature of the day's mixed layer, K */
  readonly mixedTheta: number;
  /** Specific humidity of the day's mixed layer, kg/kg */
  readonly mixedHumidity: number;
  /** m above ground: lid of the day's mixed layer, left aloft by night */
  readonly lidHeight: number;
  /** Gain of potential temperature, K, at a height above the lid, m. */
  thetaAbove(aboveLid: number): number;
  /** How much the ground has cooled below the mixed layer, K, at a time. */
  groundCooling(timeMs: number): number;
  /** Depth scale of the cooled layer, m, at a time. */
  coolingDepth(timeMs: number): number;
  /** Humidity that the jet has brought in by a time, kg/kg, at the height where it is greatest. */
  broughtHumidity(timeMs: number): number;
  /** m above ground, and half width, m, of the layer in which it arrives */
  readonly broughtHeight: number;
  readonly broughtWidth: number;
}

export interface Air {
  /** Pa */
  readonly pressure: number;
  /** K */
  readonly temperature: number;
  /** kg/kg */
  readonly specificHumidity: number;
}

const STEP_M = 10;

/** The air at ascending heights, m above ground, at a time; pressure by the hypsometric equation from the ground up. */
export function airAt(plan: AirPlan, heights: readonly number[], timeMs: number): Air[] {
  const result: Air[] = [];
  let pressure = plan.surfacePressure;
  let height = 0;
  for (const wanted of heights) {
    while (height < wanted) {
      const thickness = Math.min(STEP_M, wanted - height);
      const { temperature, specificHumidity } = stateAt(plan, height + thickness / 2, pressure, timeMs);
      const virtual = virtualTemperature(temperature, specificHumidity);
      pressure *= Math.exp((-GRAVITY * thickness) / (GAS_CONSTANT_DRY * virtual));
      height += thickness;
    }
    result.push({ pressure, ...stateAt(plan, wanted, pressure, timeMs) });
  }
  return result;
}

function stateAt(plan: AirPlan, height: number, pressure: number, timeMs: number): Omit<Air, 'pressure'> {
  const aboveLid = Math.max(0, height - plan.lidHeight);
  const cooled = plan.groundCooling(timeMs) * Math.exp(-height / plan.coolingDepth(timeMs));
  const temperature = (plan.mixedTheta + plan.thetaAbove(aboveLid) - cooled) * Math.pow(pressure / 100_000, KAPPA);

  const dryAloft = Math.exp(-aboveLid / 1800) * (1 - 0.35 * (1 - Math.exp(-aboveLid / 200)));
  const fromLayer = (height - plan.broughtHeight) / plan.broughtWidth;
  const brought = plan.broughtHumidity(timeMs) * Math.exp(-fromLayer * fromLayer);
  const humidity = plan.mixedHumidity * dryAloft + brought;
  // Dew keeps the air by the ground from passing saturation.
  return { temperature, specificHumidity: Math.min(humidity, specificHumidityOfRelative(0.97, temperature, pressure)) };
}
