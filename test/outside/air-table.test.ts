import {
  airDensity,
  airDensityIec,
  bruntVaisalaFrequency,
  bruntVaisalaSquared,
  bulkRichardson,
  coriolisParameter,
  equivalentPotentialTemperature,
  equivalentPotentialTemperatureSimple,
  froudeNumber,
  hypsometricHeights,
  inertialPeriodS,
  lclPressure,
  lclTemperature,
  lclTemperatureOfDewPoint,
  lclTemperatureOfRelative,
  mixingRatioOf,
  moistAirFactor,
  potentialTemperature,
  relativeHumidityOf,
  saturationOverIce,
  saturationOverWater,
  saturationVapourPressure,
  specificHumidityOfDewPoint,
  specificHumidityOfRelative,
  standardAtmosphere,
  virtualTemperature,
  ZERO_CELSIUS,
} from '../../src/air/index.ts';
import { describeCheckTable, numberOf, numbersOf, type CheckRunner, type CheckValue } from '../support/check-table.ts';

const kelvin = (celsius: CheckValue | undefined): number => numberOf(celsius) + ZERO_CELSIUS;
const pascal = (hectopascal: CheckValue | undefined): number => numberOf(hectopascal) * 100;

/** State of a parcel given by pressure, temperature and dew point. */
function parcel(input: Record<string, CheckValue>) {
  const pressure = pascal(input.pressure_hpa);
  const temperature = kelvin(input.temperature_c);
  const dewPoint = kelvin(input.dewpoint_c);
  const vapourPressure = saturationVapourPressure(dewPoint);
  const specificHumidity = specificHumidityOfDewPoint(dewPoint, pressure);
  const mixingRatio = mixingRatioOf(specificHumidity);
  return { pressure, temperature, dewPoint, vapourPressure, specificHumidity, mixingRatio };
}

const level = (input: Record<string, CheckValue>, number: 1 | 2) => ({
  height: numberOf(input[`z${number}_m`]),
  virtualPotentialTemperature: numberOf(input[`thetav${number}_k`]),
  u: numberOf(input[`u${number}_m_per_s`]),
  v: numberOf(input[`v${number}_m_per_s`]),
});

const runners: Record<string, CheckRunner> = {
  coriolis: ({ latitude_deg }) => ({
    f_per_s: coriolisParameter(numberOf(latitude_deg)),
    inertial_period_h: inertialPeriodS(numberOf(latitude_deg)) / 3600,
  }),
  half_pendulum_day: ({ latitude_deg }) => ({ half_pendulum_day_h: inertialPeriodS(numberOf(latitude_deg)) / 3600 }),
  saturation_vapour_pressure: ({ temperature_c, pressure_hpa }) => {
    const temperature = kelvin(temperature_c);
    return {
      bolton_eq10_hpa: saturationVapourPressure(temperature) / 100,
      wmo_water_hpa: saturationOverWater(temperature) / 100,
      wmo_water_moist_air_hpa: (saturationOverWater(temperature) * moistAirFactor(pascal(pressure_hpa))) / 100,
      wmo_ice_hpa: saturationOverIce(temperature) / 100,
    };
  },
  saturation_vapour_pressure_published: ({ temperature_c }) => ({
    e_hpa: saturationVapourPressure(kelvin(temperature_c)) / 100,
  }),
  humidity: (input) => {
    const { pressure, temperature, vapourPressure, specificHumidity, mixingRatio } = parcel(input);
    const virtual = virtualTemperature(temperature, specificHumidity);
    return {
      vapour_pressure_hpa: vapourPressure / 100,
      mixing_ratio_g_per_kg: mixingRatio * 1000,
      specific_humidity_g_per_kg: specificHumidity * 1000,
      relative_humidity_percent: relativeHumidityOf(specificHumidity, temperature, pressure) * 100,
      virtual_temperature_k: virtual,
      potential_temperature_k: potentialTemperature(temperature, pressure),
      virtual_potential_temperature_k: potentialTemperature(virtual, pressure),
    };
  },
  lcl: (input) => {
    const { pressure, temperature, dewPoint, vapourPressure, specificHumidity } = parcel(input);
    const temperatureAtLcl = lclTemperature(temperature, vapourPressure);
    return {
      lcl_temperature_eq15_k: temperatureAtLcl,
      lcl_temperature_eq21_k: lclTemperatureOfDewPoint(temperature, dewPoint),
      lcl_temperature_eq22_k: lclTemperatureOfRelative(
        temperature,
        relativeHumidityOf(specificHumidity, temperature, pressure),
      ),
      lcl_pressure_hpa: lclPressure(temperature, pressure, temperatureAtLcl) / 100,
    };
  },
  theta_e: (input) => {
    const { pressure, temperature, vapourPressure, mixingRatio } = parcel(input);
    const atLcl = lclTemperature(temperature, vapourPressure);
    return {
      theta_e_eq39_k: equivalentPotentialTemperature(temperature, pressure, vapourPressure, mixingRatio, atLcl),
      theta_e_eq43_k: equivalentPotentialTemperatureSimple(temperature, pressure, mixingRatio, atLcl),
    };
  },
  density: (input) => {
    const temperature = kelvin(input.temperature_c);
    const pressure = pascal(input.pressure_hpa);
    const relativeHumidity = numberOf(input.relative_humidity_fraction);
    const specificHumidity = specificHumidityOfRelative(relativeHumidity, temperature, pressure);
    return {
      density_iec_kg_per_m3: airDensityIec(temperature, pressure, relativeHumidity),
      density_gas_law_kg_per_m3: airDensity(temperature, pressure, specificHumidity),
    };
  },
  density_published: (input) => ({
    density_kg_per_m3: airDensityIec(
      kelvin(input.temperature_c),
      pascal(input.pressure_hpa),
      numberOf(input.relative_humidity_fraction),
    ),
  }),
  standard_atmosphere_published: (input) => {
    const air = standardAtmosphere(numberOf(input.geometric_altitude_m));
    return {
      temperature_k: air.temperature,
      pressure_hpa: air.pressure / 100,
      density_kg_per_m3: air.density,
    };
  },
  hypsometric_height: (input) => {
    const pressure = numbersOf(input.pressure_hpa).map((value) => value * 100);
    const temperature = numbersOf(input.temperature_c).map((value) => value + ZERO_CELSIUS);
    const humidity = numbersOf(input.dewpoint_c).map((value, k) =>
      specificHumidityOfDewPoint(kelvin(value), pressure[k]!),
    );
    return { height_m: hypsometricHeights(pressure, temperature, humidity, numberOf(input.station_height_m)) };
  },
  brunt_vaisala: (input) => ({
    n_squared_per_s2: bruntVaisalaSquared(level(input, 1), level(input, 2)),
    n_per_s: bruntVaisalaFrequency(level(input, 1), level(input, 2)),
  }),
  bulk_richardson: (input) => ({ bulk_richardson: bulkRichardson(level(input, 1), level(input, 2)) }),
  froude: (input) => ({
    froude: froudeNumber(numberOf(input.speed_m_per_s), numberOf(input.n_per_s), numberOf(input.height_m)),
  }),
};

describeCheckTable('air', runners);
