// What an invented wind profiler or lidar reports of the atmosphere: fixed gates, noise that grows with height, gates lost
// where the echo is weak, outages, and a spell in which the echo nearly drowns.

import { directionOf, speedOf } from '../../src/air/index.ts';
import type { AtmospherePlan } from './atmosphere.ts';
import { momentsOf } from './atmosphere.ts';
import { Chance } from './chance.ts';
import { within, type Spell } from './clock.ts';

export interface ProfilerPlan {
  readonly seed: number;
  /** m above ground */
  readonly gates: readonly number[];
  /** UTC ms: ends of the averaging periods */
  readonly timesMs: readonly number[];
  /** Noise of each wind component at the ground, and its growth per kilometre, m/s. */
  readonly noise: number;
  readonly noisePerKm: number;
  /** dB: echo at the ground, loss per kilometre, and what is still reported */
  readonly echoAtGround: number;
  readonly echoLossPerKm: number;
  readonly leastEcho: number;
  readonly outages: readonly Spell[];
  readonly noisySpells: readonly Spell[];
  /** Whether temperature, humidity and pressure are reported too, by a radiometer beside it. */
  readonly withAir: boolean;
}

/** Values time by time, gate by gate; NaN where nothing is reported. */
export interface ProfilerRecord {
  readonly timesMs: readonly number[];
  readonly gates: readonly number[];
  readonly speed: number[];
  readonly direction: number[];
  readonly verticalSpeed: number[];
  readonly signal: number[];
  /** Whether the instrument itself doubts the wind. */
  readonly doubted: boolean[];
  readonly pressure: number[];
  readonly temperature: number[];
  readonly specificHumidity: number[];
}

/** Loss of echo in a noisy spell, dB; noise of each component, m/s, where no echo is left, and the echo that suffices, dB. */
const DROWNED_BY = 10;
const DROWNED_NOISE = 4;
const ENOUGH_ECHO = 6;
/** dB below which the instrument itself calls its wind doubtful: commonly, and when it notices the noise of a spell. */
const DOUBTED_ECHO = 0;
const DOUBTED_IN_SPELL = 4;

export function profilerRecord(atmosphere: AtmospherePlan, plan: ProfilerPlan): ProfilerRecord {
  const chance = new Chance(plan.seed);
  const record: ProfilerRecord = {
    timesMs: plan.timesMs.filter((timeMs) => !within(timeMs, plan.outages)),
    gates: plan.gates,
    speed: [],
    direction: [],
    verticalSpeed: [],
    signal: [],
    doubted: [],
    pressure: [],
    temperature: [],
    specificHumidity: [],
  };
  for (const moment of momentsOf(atmosphere, plan.timesMs)) {
    if (within(moment.timeMs, plan.outages)) continue;
    const drowned = within(moment.timeMs, plan.noisySpells);
    const air = plan.withAir ? moment.air(plan.gates) : null;
    const haze = 1.5 * chance.normal();
    const convection = atmosphere.convection(moment.timeMs);
    plan.gates.forEach((height, k) => {
      const wind = moment.wind(height);
      const echo =
        plan.echoAtGround +
        haze -
        (plan.echoLossPerKm * height) / 1000 +
        1.2 * chance.normal() -
        (drowned ? DROWNED_BY : 0);
      const reported = echo >= plan.leastEcho;
      const doubted = echo < (drowned ? DOUBTED_IN_SPELL : DOUBTED_ECHO);
      const drowning = drowned ? DROWNED_NOISE * Math.min(1, Math.max(0, 1 - echo / ENOUGH_ECHO)) : 0;
      const noise = plan.noise + (plan.noisePerKm * height) / 1000 + drowning;
      const u = wind.u + noise * chance.normal();
      const v = wind.v + noise * chance.normal();
      const w = (0.05 + 0.6 * convection) * chance.normal();
      record.speed.push(reported ? round(speedOf(u, v), 2) : NaN);
      record.direction.push(reported ? round(directionOf(u, v), 1) % 360 : NaN);
      record.verticalSpeed.push(reported ? round(w, 2) : NaN);
      record.signal.push(round(echo, 1));
      record.doubted.push(doubted);
      if (air === null) return;
      record.pressure.push(round(air[k]!.pressure, 0));
      record.temperature.push(round(air[k]!.temperature + 0.15 * chance.normal(), 2));
      record.specificHumidity.push(round(air[k]!.specificHumidity * (1 + 0.01 * chance.normal()), 5));
    });
  }
  return record;
}

/** Rounded as the instrument would write it; also keeps the last bits of the arithmetic out of the files. */
export function round(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
