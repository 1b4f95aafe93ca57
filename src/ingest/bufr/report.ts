// What a report says of itself: where, when and with what it was measured.

import type { Instrument, Station } from '../../profile/index.ts';
import { firstKnown, stationBySite, type KnownStations } from '../site-station.ts';
import type { Program } from './program.ts';
import { FIRST_OF_LEVEL, ROLE } from './roles.ts';

/** Time significance 0 08 021. */
const LAUNCH = 18;
const START_OF_SCAN = 28;

export class ReportHeader {
  readonly #value = new Float64Array(FIRST_OF_LEVEL).fill(NaN);
  readonly #met = new Uint8Array(FIRST_OF_LEVEL);
  #texts: readonly string[] = [];
  /** Beginning of the measurement, where two times are given. */
  #beginMs = NaN;
  #timeIsLaunch = false;

  clear(texts: readonly string[]): void {
    this.#value.fill(NaN);
    this.#met.fill(0);
    this.#texts = texts;
    this.#beginMs = NaN;
    this.#timeIsLaunch = false;
  }

  hasMet(role: number): boolean {
    return this.#met[role] === 1;
  }

  /** An element of the header. The first known value of a kind counts, except that a second time is the end of a period. */
  put(role: number, value: number): void {
    if (role >= ROLE.year) this.#putTime(role, value);
    else if (Number.isNaN(this.#value[role]!)) this.#value[role] = value;
    else if (role === ROLE.timeSignificance && !this.#timeIsLaunch) this.#value[role] = value;
    this.#met[role] = 1;
  }

  #putTime(role: number, value: number): void {
    if (role === ROLE.year && this.hasMet(ROLE.year)) {
      if (this.#value[ROLE.timeSignificance] === LAUNCH) this.#timeIsLaunch = true;
      if (!this.#timeIsLaunch) {
        this.#beginMs = this.#timeMs();
        this.#value.fill(NaN, ROLE.year);
      }
    }
    if (!this.#timeIsLaunch) this.#value[role] = value;
  }

  #timeMs(): number {
    const part = (role: number, otherwise: number): number => {
      const value = this.#value[role]!;
      return Number.isNaN(value) ? otherwise : value;
    };
    const [year, month, day] = [part(ROLE.year, NaN), part(ROLE.month, NaN), part(ROLE.day, NaN)];
    const [hour, minute, second] = [part(ROLE.hour, NaN), part(ROLE.minute, 0), part(ROLE.second, 0)];
    if (!(month >= 1 && month <= 12 && day >= 1 && day <= 31 && hour <= 24 && minute < 60 && second <= 60)) return NaN;
    return Date.UTC(year, month - 1, day, hour, minute, 0, Math.round(second * 1000));
  }

  /** Valid time, UTC ms, and averaging period, s; NaN where not said. */
  time(): { timeMs: number; periodS: number } {
    const said = this.#timeMs();
    const seconds = this.#value[ROLE.periodSeconds]!;
    let periodS = Math.abs(Number.isNaN(seconds) ? this.#value[ROLE.periodMinutes]! * 60 : seconds);
    if (Number.isNaN(periodS) && said > this.#beginMs) periodS = (said - this.#beginMs) / 1000;
    const starts = this.#value[ROLE.timeSignificance] === START_OF_SCAN && periodS > 0;
    return { timeMs: starts ? said + periodS * 1000 : said, periodS };
  }

  /**
   * The station, as the site file or the station list knows it where they do.
   * @param surfaceHeight stands in for an elevation that nobody states, m; NaN: none
   */
  station(known: KnownStations, surfaceHeight: number): Station {
    const ids = this.#identifiers();
    const id = ids[0] ?? 'unnamed';
    const [latitude, longitude] = [this.#value[ROLE.latitude]!, this.#value[ROLE.longitude]!];
    const told = { id, name: this.#text(ROLE.stationName) || id, latitude, longitude, elevation: this.elevation };
    const station = stationBySite(known, told, ids);
    const wigos = ids.find((each) => each.includes('-'));
    return {
      ...station,
      name: station.name === id && wigos !== undefined ? wigos : station.name,
      elevation: firstKnown(station.elevation, surfaceHeight),
    };
  }

  /** Ground above sea level, m, as the report states it; NaN where it does not. */
  get elevation(): number {
    const value = this.#value;
    return firstKnown(value[ROLE.groundHeight], value[ROLE.stationHeight], value[ROLE.barometerHeight]);
  }

  /** What measured, from what the report says of its equipment. */
  instrument(program: Program): Instrument {
    switch (this.#value[ROLE.remoteSensor]) {
      case 3:
      case 6:
        return 'wind-profiler';
      case 4:
      case 7:
        return 'lidar';
      case 5:
        return 'sodar';
    }
    switch (this.#value[ROLE.equipment]) {
      case 6:
      case 8:
        return 'wind-profiler';
      case 9:
        return 'sodar';
      case 10:
        return 'lidar';
    }
    const isSonde = this.hasMet(ROLE.radiosonde);
    if (isSonde && this.hasMet(ROLE.flightNumber)) return 'dropsonde';
    if (program.holdsTemperature && isSonde) return 'radiosonde';
    if (isSonde) return 'pilot-balloon';
    if (this.hasMet(ROLE.antenna) || program.holdsProfilerTests) return 'wind-profiler';
    return this.hasMet(ROLE.equipment) ? 'pilot-balloon' : 'unknown';
  }

  #text(role: number): string {
    return this.#texts[this.#value[role]!] ?? '';
  }

  /** The names the report gives its station, the one to be used first: WMO number, call sign, WIGOS, flight. */
  #identifiers(): string[] {
    const value = this.#value;
    const ids: string[] = [];
    const [block, number] = [value[ROLE.blockNumber]!, value[ROLE.stationNumber]!];
    if (block >= 0 && number >= 0) ids.push(String(block * 1000 + number).padStart(5, '0'));
    const callSign = this.#text(ROLE.callSign);
    if (callSign !== '') ids.push(callSign);
    const local = this.#text(ROLE.wigosLocal);
    if (local !== '') {
      const parts = [value[ROLE.wigosSeries]!, value[ROLE.wigosIssuer]!, value[ROLE.wigosIssue]!];
      if (parts.every((part) => part >= 0)) ids.push([...parts, local].join('-'));
    }
    const flight = this.#text(ROLE.flightNumber);
    if (flight !== '') ids.push(flight);
    return ids;
  }
}
