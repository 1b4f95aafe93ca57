import { directionOf, eastward, northward, speedOf, ZERO_CELSIUS } from '../../src/air/index.ts';
import {
  bulkShear,
  clusterMotion,
  helicity,
  hodographOf,
  stormMotion,
  stormOf,
  type VectorFigure,
} from '../../src/storm/index.ts';
import { describe, expect, it } from 'vitest';
import {
  checkBlock,
  describeCheckTable,
  expectAgrees,
  numberOf,
  numbersOf,
  type CheckValue,
} from '../support/check-table.ts';
import { sharedIsHere } from '../support/shared.ts';
import { airLevels, profileOf } from '../storm/soundings.ts';

type Input = Record<string, CheckValue>;

const windOf = (input: Input) =>
  hodographOf(
    profileOf({
      heightAgl: numbersOf(input.height_m),
      u: numbersOf(input.u_m_per_s),
      v: numbersOf(input.v_m_per_s),
    }),
  );

const vector = (input: Input, name: string): VectorFigure => {
  const speed = numberOf(input[`speed_${name}_m_per_s`]);
  const direction = numberOf(input[`direction_${name}_deg`]);
  return { u: eastward(speed, direction), v: northward(speed, direction), why: '' };
};

const components = (name: string, { u, v }: VectorFigure): Record<string, number> => ({
  [`${name}_u_m_per_s`]: u,
  [`${name}_v_m_per_s`]: v,
});

const polar = (name: string, wind: VectorFigure): Record<string, number> => ({
  ...components(name, wind),
  [`${name}_speed_m_per_s`]: speedOf(wind.u, wind.v),
  [`${name}_from_deg`]: directionOf(wind.u, wind.v),
});

describeCheckTable('convection', {
  parcels: null,
  helicity_shear: (input) => {
    const wind = windOf(input);
    const motion = { u: numberOf(input.storm_u_m_per_s), v: numberOf(input.storm_v_m_per_s), why: '' };
    return {
      srh_0_1km_m2_per_s2: helicity(wind, 1000, motion).value,
      srh_0_3km_m2_per_s2: helicity(wind, 3000, motion).value,
      bulk_shear_0_1km_m_per_s: bulkShear(wind, 1000).value,
      bulk_shear_0_3km_m_per_s: bulkShear(wind, 3000).value,
      bulk_shear_0_6km_m_per_s: bulkShear(wind, 6000).value,
    };
  },
  bunkers: (input) => {
    const motion = stormMotion(windOf(input));
    return {
      ...components('mean', motion.mean),
      ...components('right', motion.right),
      ...components('left', motion.left),
    };
  },
  corfidi: (input) => {
    const levels = ['850', '700', '500', '300'].map((level) => vector(input, level));
    const motion = clusterMotion(levels, vector(input, 'llj'));
    return {
      ...polar('cloud_layer', motion.cloudLayer),
      ...polar('upwind', motion.upwind),
      ...polar('downwind', motion.downwind),
    };
  },
});

describe.skipIf(!sharedIsHere)('check table convection, parcels', () => {
  const names = {
    surface_based: 'surface-based',
    mixed_layer_100hpa: 'mixed-layer',
    most_unstable_300hpa: 'most-unstable',
  };
  const block = sharedIsHere ? checkBlock('convection', 'parcels') : null;
  it.each(block?.cases.map((entry): [string, typeof entry] => [entry.id, entry]) ?? [])('%s', (id, entry) => {
    const { parcels } = stormOf(
      profileOf(
        airLevels({
          pressureHpa: numbersOf(entry.in.pressure_hpa),
          temperatureC: numbersOf(entry.in.temperature_c),
          dewPointC: numbersOf(entry.in.dewpoint_c),
        }),
      ),
    );
    for (const [key, wanted] of Object.entries(entry.out)) {
      const parcel = parcels.find(({ name }) => name === names[key as keyof typeof names])!;
      const got: Record<string, unknown> = {
        start_pressure_hpa: parcel.start!.pressure / 100,
        start_temperature_c: parcel.start!.temperature - ZERO_CELSIUS,
        start_mixing_ratio_g_per_kg: parcel.start!.mixingRatio * 1000,
        cape_j_per_kg: parcel.cape,
        cin_j_per_kg: parcel.cin,
        lcl_hpa: parcel.lclPressure / 100,
        lcl_temperature_c: parcel.lclTemperature - ZERO_CELSIUS,
        lfc_hpa: parcel.lfcPressure / 100,
        el_hpa: parcel.elPressure / 100,
        positive_at_top_of_data: parcel.positiveAtTop,
      };
      for (const [quantity, want] of Object.entries(wanted as Record<string, CheckValue>)) {
        // Given for information: the values of another pseudoadiabat.
        if (quantity.includes('other_pseudoadiabat')) continue;
        expect(Object.keys(got)).toContain(quantity);
        expectAgrees(block!, quantity, got[quantity], want, `${id} ${key} ${quantity}`);
      }
    }
  });
});
