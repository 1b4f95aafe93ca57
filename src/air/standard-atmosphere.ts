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

/** Layers of the tables up to 47 km: geopotential height of their base, m, temperature there, K, and its change, K/m. */
const LAYERS = [
  { base: 0, temperature: SEA_LEVEL_TEMPERATURE, lapse: -LAPSE_RATE },
  { base: TROPOPAUSE, temperature: 216.65, lapse: 0 },
  { base: 20_000, temperature: 216.65, lapse: 0.001 },
  { base: 32_000, temperature: 228.65, lapse: 0.0028 },
  { base: 47_000, temperature: 270.65, lapse: 0 },
];
/** g0 M0 / R*, K/m. */
const PER_METRE = (9.80665 * MOLAR_MASS) / GAS_CONSTANT;

/**
 * Geopotential height, m, at which the standard atmosphere has a pressure, Pa: where a pressure level lies when nothing
 * better is known.
 * @returns NaN for what is no pressure, and above 47 km (below 1.1 hPa)
 */
export function standardHeight(pressure: number): number {
  let pressureAtBase = SEA_LEVEL_PRESSURE;
  for (let k = 0; k + 1 < LAYERS.length; k++) {
    const { base, temperature, lapse } = LAYERS[k]!;
    const height =
      lapse === 0
        ? base + (temperature / PER_METRE) * Math.log(pressureAtBase / pressure)
        : base + (temperature / lapse) * (Math.pow(pressureAtBase / pressure, lapse / PER_METRE) - 1);
    const next = LAYERS[k + 1]!;
    if (height < next.base) return height;
    pressureAtBase *=
      lapse === 0
        ? Math.exp((-PER_METRE * (next.base - base)) / temperature)
        : Math.pow(next.temperature / temperature, -PER_METRE / lapse);
  }
  return NaN;
}
