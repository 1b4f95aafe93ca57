// The bands in which a site's time is counted.

/** Shear exponents that part the bands: the seventh-power law of neutral air, the design value on land, strong shear. */
export const SHEAR_EDGES: readonly number[] = [0, 0.14, 0.2, 0.3, 0.5];
/** degrees per 100 m */
export const VEER_EDGES: readonly number[] = [2, 5, 10, 20];
