// Physical constants, one value each for the whole house. SI units.

/** Rotation of the Earth, rad/s (IAU value, as in Holton & Hakim 2013). */
export const EARTH_ROTATION = 7.292115e-5;
/** Standard acceleration of gravity, m/s2 (ISO 80000-3). */
export const GRAVITY = 9.80665;
/** Gas constant of dry air, J/(kg K) (IEC 61400-12-1). */
export const GAS_CONSTANT_DRY = 287.05;
/** Gas constant of water vapour, J/(kg K) (IEC 61400-12-1). */
export const GAS_CONSTANT_VAPOUR = 461.5;
/** Ratio of the two gas constants. */
export const EPSILON = GAS_CONSTANT_DRY / GAS_CONSTANT_VAPOUR;
/** Specific heat of dry air at constant pressure, J/(kg K): 7/2 R for a diatomic gas. */
export const HEAT_CAPACITY_DRY = 3.5 * GAS_CONSTANT_DRY;
/** R/cp of dry air. */
export const KAPPA = 2 / 7;
/** Bolton's (1980, Mon. Wea. Rev. 108) R/cp. */
export const KAPPA_BOLTON = 0.2854;
/** 0 degrees Celsius, K. */
export const ZERO_CELSIUS = 273.15;
/** Mean radius of the Earth, m (IUGG arithmetic mean, rounded). */
export const EARTH_RADIUS = 6_371_000;
/** Reference air density, kg/m3 (IEC 61400-12-1: sea level, 15 degrees Celsius, dry). */
export const REFERENCE_DENSITY = 1.225;
