// The outside data's radiosondes: finite, sensible moisture numbers, and the two forms of the integral agreeing.

import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { bytesSource, DEFAULT_LIMITS, readProfiles } from '../../src/ingest/index.ts';
import { moistureOf } from '../../src/moisture/index.ts';
import { profilesOf, type Profile } from '../../src/profile/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
import { readShared, sharedIsHere, sharedPath } from '../support/shared.ts';

const FOLDER = 'real/radiosonde-netcdf';

async function soundingsOf(file: string): Promise<Profile[]> {
  const found: Profile[] = [];
  const options = { site: PLAIN_SITE, limits: DEFAULT_LIMITS };
  for await (const reading of readProfiles(bytesSource(file, readShared(`${FOLDER}/${file}`)), options)) {
    found.push(...profilesOf(reading.block));
  }
  return found;
}

/** Humidity at the surface only, as the data's own notes say. */
const SURFACE_ONLY = ['20060119.050300', '20060120.170800', '20060120.043800'];
const files = sharedIsHere ? readdirSync(sharedPath(FOLDER)).filter((file) => /\.(cdf|nc)$/u.test(file)) : [];

describe.skipIf(!sharedIsHere)('moisture of real soundings', () => {
  it.each(files)('%s', async (file) => {
    const [sounding] = await soundingsOf(file);
    const numbers = moistureOf(sounding!);
    if (SURFACE_ONLY.some((time) => file.includes(time))) {
      expect(numbers).toMatchObject({ status: 'not-assessable', why: 'humidity at a single level only' });
      return;
    }
    expect(numbers.status).toBe('ok');
    const tropical = file.startsWith('twp');
    // The tropical wet season holds some 40 to 70 kg/m2, a winter night on the plains less than 25.
    const whole = numbers.thetaE.heightAgl.at(-1)! > 9000;
    if (whole) expect(numbers.precipitableWater).toBeGreaterThan(tropical ? 35 : 3);
    expect(numbers.precipitableWater).toBeLessThan(tropical ? 75 : 25);
    expect(numbers.transport.size).toBeGreaterThan(0);
    expect(numbers.transport.size).toBeLessThan(1500);
    expect(numbers.below3Km.size).toBeLessThan(1000);
    expect(numbers.thetaE.value[0]).toBeGreaterThan(tropical ? 340 : 260);
    expect(numbers.thetaE.value[0]).toBeLessThan(tropical ? 375 : 300);
    // Both forms over the lowest 3 km: rho dz = -dp/g but for what heights and pressures are rounded to.
    const reaches = numbers.below3Km.reaches;
    const top = sounding!.pressure![sounding!.heightAgl.findLastIndex((height) => height <= reaches)]!;
    const byPressure = moistureOf(sounding!, { topPressure: top }).transport.size;
    expect(Math.abs(byPressure / numbers.below3Km.size - 1)).toBeLessThan(0.02);
  });
});
