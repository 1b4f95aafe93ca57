// The real night for two invented turbine types: what the page's sentence says of it, held against the levels themselves.

import { beforeAll, describe, expect, it } from 'vitest';
import { farmStory } from '../../src/board/words/farm-story.ts';
import { noseSpell } from '../../src/board/words/nose-spell.ts';
import { timeWords } from '../../src/board/words/time.ts';
import { Desk, type NightState } from '../../src/desk/index.ts';
import { BlockBuilder, type Instrument, type Station } from '../../src/profile/index.ts';
import { PLAIN_SITE, type Site, type TurbineType } from '../../src/site/index.ts';
import { nightLevels, type NightSource } from '../rotor/support.ts';
import { sharedIsHere } from '../support/shared.ts';

const place: Station = { id: 'mast', name: 'Mast', latitude: 33.6105, longitude: -102.0505, elevation: 1021 };
const stopped = { cutIn: 3, rated: 13, cutOut: 25, restart: 22, groundElevation: NaN };
const small: TurbineType = {
  name: 'Invented 140',
  count: 30,
  hubHeight: 105,
  rotorDiameter: 140,
  powerCurve: { speed: [3, 5, 7, 9, 11, 13, 25], powerKw: [40, 410, 1240, 2640, 3920, 4200, 4200], airDensity: 1.225 },
  ...stopped,
};
const large: TurbineType = {
  name: 'Invented 200',
  count: 10,
  hubHeight: 180,
  rotorDiameter: 200,
  powerCurve: { speed: [3, 5, 7, 9, 11, 13, 25], powerKw: [90, 900, 2700, 5700, 8400, 9000, 9000], airDensity: 1.225 },
  ...stopped,
};
const site: Site = {
  ...PLAIN_SITE,
  timeZone: 'Etc/GMT+6',
  turbines: [small, large],
  ramps: [{ name: '20 % within an hour', share: 0.2, withinS: 3600 }],
};
const CAPACITY_KW = 30 * 4200 + 10 * 9000;

describe.skipIf(!sharedIsHere)('the real night for two invented turbine types', () => {
  let night: NightState;
  beforeAll(() => {
    const desk = new Desk(site);
    const parts: [NightSource, Instrument, string][] = [
      ['tower', 'mast', 'mast'],
      ['low-mode', 'radar', 'radar-low'],
      ['high-mode', 'radar', 'radar-high'],
    ];
    for (const [source, instrument, id] of parts) {
      const builder = new BlockBuilder();
      for (const [time, levels] of nightLevels([source])) {
        const timeMs = Date.parse(`${time.replace(' ', 'T')}Z`);
        builder.add({ station: { ...place, id }, source: id, instrument, timeMs, periodS: 600, levels });
      }
      desk.accept(builder.finish());
    }
    // 06:00 on the site's clock.
    night = desk.night(Date.UTC(2013, 10, 9, 12), { feed: 'radar-low/radar' })!;
  });

  it('says how many MW the profile adds or takes at 03:00', () => {
    const at = Date.UTC(2013, 10, 9, 9);
    const k = night.timeMs.indexOf(at);
    const { output } = night.farm;
    expect(output.why).toBe('');
    // By hand: the cube mean over strips of the disc, linear between the levels the joined profile shows.
    let byHand = 0;
    let byHub = 0;
    for (const { turbine, winds } of night.discs) {
      const wind = winds[k]!;
      expect(wind.status).toBe('ok');
      const power = (speed: number): number => turbine.count * curve(turbine, speed);
      byHand += power(wind.integralSpeedVeer);
      byHub += power(wind.hubSpeed);
    }
    expect(output.hubKw[k]).toBeCloseTo(byHub, 6);
    // Slice and integral form part by little; the difference to hub-height reckoning is far larger or none.
    expect(Math.abs(output.differenceKw[k]! - (byHand - byHub))).toBeLessThan(0.02 * CAPACITY_KW);
  });

  it('says when the nose was in the discs, as the findings have it', () => {
    for (const { turbine, winds } of night.discs) {
      const low = turbine.hubHeight - turbine.rotorDiameter / 2;
      const high = turbine.hubHeight + turbine.rotorDiameter / 2;
      const inside = night.findings.map(({ jets: [jet] }) =>
        jet === undefined ? null : jet.noseHeight >= low && jet.noseHeight <= high,
      );
      expect(winds.map((wind) => wind.noseInRotor)).toEqual(inside);
      const spell = noseSpell(night.timeMs, inside);
      if (spell !== null) expect(inside[night.timeMs.indexOf(spell.enteredMs)]).toBe(true);
    }
  });

  it('finds every hour in which output moved by a fifth, and none else, each with a reason', () => {
    const { ramps, output } = night.farm;
    const power = output.equivalentKw;
    const moved = (from: number, to: number): boolean =>
      Math.abs(power[to]! - power[from]!) >= 0.2 * CAPACITY_KW && night.timeMs[to]! - night.timeMs[from]! <= 3_600_000;
    for (const { ramp, causes } of ramps) {
      expect(Math.abs(ramp.changeShare)).toBeGreaterThanOrEqual(0.2 - 1e-9);
      expect(causes.length).toBeGreaterThan(0);
    }
    night.timeMs.forEach((_, to) => {
      for (let from = 0; from < to; from++) {
        if (!moved(from, to)) continue;
        const told = ramps.some(
          ({ ramp }) =>
            ramp.startMs < night.timeMs[to]! &&
            ramp.endMs > night.timeMs[from]! &&
            power[to]! > power[from]! === (ramp.sense === 'up'),
        );
        expect(told, new Date(night.timeMs[to]!).toISOString()).toBe(true);
      }
    });
  });

  it('tells it in a sentence on the site’s clock', () => {
    const text = farmStory(night, { speed: 'm/s', height: 'm' }, timeWords('site', 'Etc/GMT+6'))
      .map((piece) => piece.text)
      .join('');
    expect(text).toMatch(/^At 06:00 the wind over the discs is good for \d+\.\d MW of 216; /);
    expect(text).toMatch(/against hub-height reckoning\. /);
    expect(text).toMatch(/nose/);
  });
});

function curve({ powerCurve }: TurbineType, speed: number): number {
  const { speed: speeds, powerKw } = powerCurve!;
  const above = speeds.findIndex((value) => value >= speed);
  if (above <= 0) return 0;
  const weight = (speed - speeds[above - 1]!) / (speeds[above]! - speeds[above - 1]!);
  return powerKw[above - 1]! * (1 - weight) + powerKw[above]! * weight;
}
