// The ingredients of deep moist convection side by side (Doswell, Brooks & Maddox 1996, Wea. Forecasting 11, 560-581):
// each number beside a published value and where it was published. No index is made of them.

import type { Figure } from './figure.ts';
import { INFLOW_CAPE, INFLOW_CIN } from './inflow.ts';
import type { StormNumbers } from './numbers.ts';
import type { Parcel } from './parcel.ts';
import type { ParcelName } from './start.ts';

export interface Ingredient extends Figure {
  readonly ingredient: 'moisture' | 'instability' | 'lift' | 'shear';
  /** What the number is, in words. */
  readonly what: string;
  /** SI, as `value` and `reference` are in. */
  readonly unit: 'kg/kg' | 'kg/(m s)' | 'm/s' | 'J/kg' | 'm' | 'm2/s2';
  readonly reference: number;
  /** On which side of the reference the ingredient speaks for storms. */
  readonly sense: 'at-least' | 'at-most';
  /** null when the value is not known */
  readonly meets: boolean | null;
  /** Where the reference comes from. */
  readonly source: string;
}

/** Numbers of other rooms that belong in the table. */
export interface OtherIngredients {
  /** Speed of the jet's nose, m/s. */
  readonly jetSpeed?: Figure;
  /** Vertically integrated moisture transport, kg/(m s). */
  readonly transport?: Figure;
}

const NOT_GIVEN: Figure = { value: NaN, why: 'Not given.' };
const PRACTICE = 'common practice, without source';

/** The table of ingredients, by moisture, instability, lift and shear. */
export function ingredientsOf(storm: StormNumbers, others: OtherIngredients = {}): Ingredient[] {
  const of = (name: ParcelName): Parcel => storm.parcels.find((parcel) => parcel.name === name)!;
  const parcelFigure = (name: ParcelName, value: (parcel: Parcel) => number): Figure => {
    const known = value(of(name));
    return { value: known, why: Number.isNaN(known) ? of(name).why : '' };
  };
  // Left-movers turn with negative helicity.
  const turn = storm.prevailing === 'left' ? -1 : 1;
  const helicitySense = turn > 0 ? 'at-least' : 'at-most';
  return [
    row('moisture', 'Mixing ratio of the lowest 100 hPa', 'kg/kg', mixedRatio(of('mixed-layer')), 0.01, PRACTICE),
    row('moisture', 'Speed of the jet', 'm/s', others.jetSpeed ?? NOT_GIVEN, 12, 'Bonner (1968), first criterion'),
    row('moisture', 'Moisture transport', 'kg/(m s)', others.transport ?? NOT_GIVEN, 250, RUTZ),
    row(
      'instability',
      'CAPE, most unstable air',
      'J/kg',
      parcelFigure('most-unstable', capeOf),
      INFLOW_CAPE,
      THOMPSON_2007,
    ),
    row('instability', 'CAPE, jet-fed air', 'J/kg', parcelFigure('jet-fed', capeOf), INFLOW_CAPE, THOMPSON_2007),
    row('instability', 'CAPE, mixed layer', 'J/kg', parcelFigure('mixed-layer', capeOf), 1000, PRACTICE),
    row(
      'lift',
      'CIN, jet-fed air',
      'J/kg',
      parcelFigure('jet-fed', (parcel) => parcel.cin),
      INFLOW_CIN,
      THOMPSON_2007,
    ),
    row(
      'lift',
      'Lift from the jet-fed layer to free convection',
      'm',
      parcelFigure('jet-fed', (parcel) => parcel.liftToLfc),
      1000,
      PRACTICE,
      'at-most',
    ),
    row('shear', 'Shear 0-6 km', 'm/s', storm.shear.to6km, 20, THOMPSON_2003),
    row('shear', 'Effective shear', 'm/s', storm.shear.effective, 20, THOMPSON_2007),
    row('shear', 'Helicity 0-1 km', 'm2/s2', storm.helicity.to1km, 100 * turn, THOMPSON_2003, helicitySense),
    row('shear', 'Helicity 0-3 km', 'm2/s2', storm.helicity.to3km, 150 * turn, DAVIES_JONES, helicitySense),
  ];
}

const THOMPSON_2003 = 'Thompson et al. (2003, Wea. Forecasting 18, 1243-1261), from memory';
const THOMPSON_2007 = 'Thompson et al. (2007, Wea. Forecasting 22, 102-115), from memory';
const DAVIES_JONES = 'Davies-Jones, Burgess & Foster (1990, 16th Conf. Severe Local Storms), from memory';
const RUTZ = 'Rutz, Steenburgh & Ralph (2014, Mon. Wea. Rev. 142), for atmospheric rivers, from memory';

function capeOf(parcel: Parcel): number {
  return parcel.cape;
}

function mixedRatio(parcel: Parcel): Figure {
  return parcel.start === null ? { value: NaN, why: parcel.why } : { value: parcel.start.mixingRatio, why: '' };
}

function row(
  ingredient: Ingredient['ingredient'],
  what: string,
  unit: Ingredient['unit'],
  { value, why }: Figure,
  reference: number,
  source: string,
  sense: Ingredient['sense'] = 'at-least',
): Ingredient {
  const meets = Number.isNaN(value) ? null : sense === 'at-least' ? value >= reference : value <= reference;
  return { ingredient, what, unit, value, why, reference, sense, meets, source };
}
