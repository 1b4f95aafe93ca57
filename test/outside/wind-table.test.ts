import {
  advectionBetweenHeights,
  advectionBetweenPressures,
  directionOf,
  eastward,
  northward,
  powerLawSpeed,
  shearExponent,
  speedOf,
  veerBetween,
} from '../../src/air/index.ts';
import { describeCheckTable, numberOf, numbersOf, type CheckValue } from '../support/check-table.ts';

const wind = (input: Record<string, CheckValue>, number: 1 | 2) => ({
  speed: numberOf(input[`speed${number}_m_per_s`]),
  direction: numberOf(input[`direction${number}_deg`]),
  height: numberOf(input[`z${number}_m`]),
  pressure: numberOf(input[`p${number}_hpa`]) * 100,
});

describeCheckTable('wind', {
  to_components: (input) => ({
    u_m_per_s: eastward(numberOf(input.speed_m_per_s), numberOf(input.direction_deg)),
    v_m_per_s: northward(numberOf(input.speed_m_per_s), numberOf(input.direction_deg)),
  }),
  to_speed_direction: (input) => ({
    speed_m_per_s: speedOf(numberOf(input.u_m_per_s), numberOf(input.v_m_per_s)),
    direction_deg: directionOf(numberOf(input.u_m_per_s), numberOf(input.v_m_per_s)),
  }),
  veer: (input) => {
    const veer = veerBetween(numberOf(input.direction_low_deg), numberOf(input.direction_high_deg));
    const depth = numberOf(input.z_high_m) - numberOf(input.z_low_m);
    return { veer_deg: veer, veer_deg_per_100m: (veer / depth) * 100 };
  },
  shear_exponent: (input) => {
    const law = shearExponent(numbersOf(input.height_m), numbersOf(input.speed_m_per_s));
    return {
      exponent: law.exponent,
      speed_at_reference_m_per_s: powerLawSpeed(law, numberOf(input.reference_height_m)),
      used: law.used,
    };
  },
  thermal_advection_height: (input) => ({
    advection_k_per_h:
      3600 *
      advectionBetweenHeights(wind(input, 1), wind(input, 2), {
        latitude: numberOf(input.latitude_deg),
        meanTemperature: numberOf(input.mean_temperature_k),
      }),
  }),
  thermal_advection_pressure: (input) => ({
    advection_k_per_h:
      3600 * advectionBetweenPressures(wind(input, 1), wind(input, 2), { latitude: numberOf(input.latitude_deg) }),
  }),
});
