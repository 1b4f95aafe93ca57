// What we use of psychrolib (ASHRAE Handbook - Fundamentals 2017): Celsius, Pa, kg/kg and fractions once SI is set.
declare module 'psychrolib' {
  interface Psychrolib {
    readonly SI: number;
    SetUnitSystem(system: number): void;
    GetSatVapPres(dryBulbC: number): number;
    GetTDewPointFromRelHum(dryBulbC: number, relativeHumidity: number): number;
    GetHumRatioFromRelHum(dryBulbC: number, relativeHumidity: number, pressure: number): number;
    GetSpecificHumFromHumRatio(humidityRatio: number): number;
    GetMoistAirDensity(dryBulbC: number, humidityRatio: number, pressure: number): number;
    GetStandardAtmPressure(altitude: number): number;
  }
  const psychrolib: Psychrolib;
  export default psychrolib;
}
