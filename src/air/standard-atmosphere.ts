// The US Standard Atmosphere 1976 up to 11 km: what air is like where nobody measured it.

const SEA_LEVEL_TEMPERATURE = 288.15;
const SEA_LEVEL_PRESSURE = 101_325;
/** K/m of geopotential height, up to the tropopause. */
const LAPSE_RATE = 0.0065;
const TROPOPAUSE = 11_000;
const LOWEST = -5000;
/** Radius of the Earth that the tables use, m. */
const RADIUS = 6_356_766;
const MOLAR_MASS = 28.9644;
/** J/(kmol K), the tables' value, not today's. */
const GAS_CONSTANT = 8314.32;
/** g0 M0 / (R* lapse rate). */
const EXPONENT = 5.25588;

export interface StandardAir {
  /** K */
  readonly temperature: number;
  /** Pa */
  readonly pressure: number;
  /** kg/m3 */
  readonly density: number;
}

/**
 * Temperature, pressure and density at a geometric height above sea level, m.
 * @returns NaN for a NaN height and outside -5 km to the tropopause at 11 km (geopotential)
 */
export function standardAtmosphere(heightAmsl: number): StandardAir {
  const geopotential = (RADIUS * heightAmsl) / (RADIUS + heightAmsl);
  if (!(geopotential >= LOWEST && geopotential <= TROPOPAUSE)) {
    return { temperature: NaN, pressure: NaN, density: NaN };
  }
  const temperature = SEA_LEVEL_TEMPERATURE - LAPSE_RATE * geopotential;
  const pressure = SEA_LEVEL_PRESSURE * Math.pow(temperature / SEA_LEVEL_TEMPERATURE, EXPONENT);
  return { temperature, pressure, density: (pressure * MOLAR_MASS) / (GAS_CONSTANT * temperature) };
}
