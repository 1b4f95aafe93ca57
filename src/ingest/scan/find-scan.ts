// A scan in a netCDF file: radial velocity by beam and range, by CF names and those of the CF/Radial convention.

import { textOf, type Dataset, type Variable } from '../netcdf/dataset.ts';
import { unitIn } from '../netcdf/roles.ts';
import { withEvenRays } from './uneven-rays.ts';

export interface ScanVariables {
  readonly velocity: Variable;
  /** -1 where the file counts velocities toward the instrument as positive. */
  readonly sign: 1 | -1;
  /** Whether the file says which way is positive. */
  readonly signStated: boolean;
  readonly azimuth: Variable;
  readonly elevation: Variable;
  /** The elevation variable counts from the zenith. */
  readonly fromZenith: boolean;
  readonly range: Variable;
  /** Null where the file has none: then only the fit can tell wind from noise. */
  readonly signal: Variable | null;
}

const AWAY = 'radial_velocity_of_scatterers_away_from_instrument';
const TOWARD = 'radial_velocity_of_scatterers_toward_instrument';

const VELOCITY_NAMES =
  'radial_velocity radial_wind_speed doppler_velocity radial_wind vel velocity mean_doppler_velocity vr vrad vradh v_radial rws los_velocity';
const AZIMUTH_STANDARD = 'ray_azimuth_angle sensor_azimuth_angle';
const AZIMUTH_NAMES = 'azimuth azimuth_angle az azi ray_azimuth';
const ELEVATION_STANDARD = 'ray_elevation_angle sensor_elevation_angle';
const ELEVATION_NAMES = 'elevation elevation_angle el ele ray_elevation';
const ZENITH_STANDARD = 'sensor_zenith_angle zenith_angle';
const RANGE_STANDARD = 'projection_range_coordinate distance range';
const RANGE_NAMES = 'range distance gate_range range_gate slant_range';
const SIGNAL_NAMES =
  'snr signal_to_noise_ratio signal_noise_ratio cnr carrier_to_noise_ratio intensity signal_intensity snrh signal';

/** The variables of a scan, or null when the dataset holds none. */
export function findScan(file: Dataset): ScanVariables | null {
  const dataset = withEvenRays(file);
  const velocity = pick(dataset, `${AWAY} ${TOWARD}`, VELOCITY_NAMES, (variable) => variable.dimensions.length === 2);
  if (velocity === null) return null;
  const [rays, gates] = velocity.dimensions;
  const alongRays = (variable: Variable): boolean =>
    variable.dimensions.length === 1 && variable.dimensions[0] === rays;
  const azimuth = pick(dataset, AZIMUTH_STANDARD, AZIMUTH_NAMES, alongRays);
  const plain = pick(dataset, ELEVATION_STANDARD, ELEVATION_NAMES, alongRays);
  const zenith = pick(dataset, ZENITH_STANDARD, 'zenith zenith_angle', alongRays);
  const elevation = plain ?? zenith;
  const range = pick(
    dataset,
    RANGE_STANDARD,
    RANGE_NAMES,
    ({ dimensions }) => dimensions.length === 1 && dimensions[0] === gates,
  );
  if (azimuth === null || elevation === null || range === null) return null;
  const sameShape = (variable: Variable): boolean => variable.dimensions.join() === velocity.dimensions.join();
  const standardName = textOf(velocity.attributes, 'standard_name');
  const words = `${textOf(velocity.attributes, 'long_name')} ${textOf(velocity.attributes, 'comment')}`;
  const toward =
    standardName === TOWARD ||
    /positive\s+(?:is\s+)?toward|toward[s]?\s+(?:the\s+)?\w+\s+(?:is\s+)?positive/iu.test(words);
  const away =
    standardName === AWAY ||
    /positive\s+(?:is\s+)?away|away\s+(?:from\s+)?(?:the\s+)?\w+\s+(?:is\s+)?positive/iu.test(words);
  return {
    velocity,
    sign: toward && !away ? -1 : 1,
    signStated: toward !== away,
    azimuth,
    elevation,
    fromZenith: plain === null,
    range,
    signal: pick(dataset, '', SIGNAL_NAMES, sameShape),
  };
}

/** The first variable of these standard names, else of these names, that fits; never a quality flag or raw data. */
function pick(
  dataset: Dataset,
  standardNames: string,
  names: string,
  fits: (variable: Variable) => boolean,
): Variable | null {
  const all = [...dataset.variables.values()].filter(
    (variable) =>
      variable.type !== 'text' && fits(variable) && !/^qc_|_(?:qc|flag|raw)$/u.test(variable.name.toLowerCase()),
  );
  const byStandard = (name: string): Variable | undefined =>
    all.find((variable) => textOf(variable.attributes, 'standard_name') === name);
  const byName = (name: string): Variable | undefined => all.find((variable) => variable.name.toLowerCase() === name);
  for (const name of standardNames.split(' ')) {
    const found = name === '' ? undefined : byStandard(name);
    if (found !== undefined) return found;
  }
  for (const name of names.split(' ')) {
    const found = byName(name);
    if (found !== undefined) return found;
  }
  return null;
}

/** Factor that brings the variable's unit to m, m/s or degrees; 1 where it states none that is known. */
export function scaleOf(variable: Variable): number {
  return unitIn(textOf(variable.attributes, 'units'))?.scale ?? 1;
}
