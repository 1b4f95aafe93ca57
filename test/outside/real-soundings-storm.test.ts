// Storm numbers of real radiosondes of an open archive: finite and sensible, or absent with the reason. One winter night
// of the southern plains, twelve ascents of the Australian monsoon.

import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { profileAt, type Profile } from '../../src/profile/index.ts';
import { stormOf, type Figure } from '../../src/storm/index.ts';
import { readBytes } from '../ingest/netcdf/read-bytes.ts';
import { readShared, sharedIsHere, sharedPath } from '../support/shared.ts';

const FOLDER = 'real/radiosonde-netcdf';
const names = sharedIsHere ? readdirSync(sharedPath(FOLDER)).sort() : [];

async function profileOfFile(name: string): Promise<Profile> {
  const { blocks } = await readBytes(name, readShared(`${FOLDER}/${name}`));
  return profileAt(blocks[0]!, 0);
}

/** Within the bounds, or missing with a reason. */
function expectSensible({ value, why }: Figure, low: number, high: number): void {
  if (Number.isNaN(value)) expect(why).not.toBe('');
  else {
    expect(value).toBeGreaterThanOrEqual(low);
    expect(value).toBeLessThanOrEqual(high);
  }
}

describe.skipIf(!sharedIsHere)('storm numbers of real radiosondes', () => {
  it.each(names)('%s', async (name) => {
    const storm = stormOf(await profileOfFile(name));
    for (const parcel of storm.parcels) {
      expectSensible({ value: parcel.cape, why: parcel.why }, 0, 4000);
      expectSensible({ value: parcel.cin, why: parcel.why }, -500, 0);
      expectSensible({ value: parcel.lclHeight, why: parcel.why }, 0, 6000);
      if (!Number.isNaN(parcel.elHeight)) {
        expect(parcel.lfcHeight).toBeGreaterThanOrEqual(parcel.lclHeight - 1);
        expect(parcel.elHeight).toBeGreaterThan(parcel.lfcHeight);
        expect(parcel.elHeight).toBeLessThan(19_000);
      }
    }
    const { shear, helicity } = storm;
    for (const one of [shear.to1km, shear.to3km, shear.to6km, shear.effective]) expectSensible(one, 0, 60);
    for (const one of [helicity.to1km, helicity.to3km, helicity.effective]) expectSensible(one, -600, 600);
    for (const layer of storm.advection) expectSensible(layer, -3 / 3600, 3 / 3600);
    expect(storm.mover).toBe(name.startsWith('sgp') ? 'right' : 'left');
  });

  it('finds no storm on a winter night and deep convection in the monsoon', async () => {
    const winter = stormOf(await profileOfFile('sgpsondewnpnC1.b1.20190101.053200.cdf'));
    expect(winter.inflow.kind).toBe('none');
    for (const parcel of winter.parcels) expect(parcel.cape).toBeLessThan(50);
    const monsoon = stormOf(await profileOfFile('twpsondewnpnC3.b1.20060122.052600.custom.cdf'));
    expect(monsoon.status).toBe('assessed');
    expect(monsoon.inflow.kind).toBe('surface-based');
    expect(monsoon.parcels[2]!.cape).toBeGreaterThan(1000);
    expect(monsoon.parcels[2]!.elHeight).toBeGreaterThan(12_000);
  });

  it('lifts nothing where temperature and humidity are known at the surface only, and still gives the wind', async () => {
    for (const name of [
      'twpsondewnpnC3.b1.20060119.050300.custom.cdf',
      'twpsondewnpnC3.b1.20060120.170800.custom.cdf',
    ]) {
      const storm = stormOf(await profileOfFile(name));
      expect(storm.status).toBe('partly');
      expect(storm.parcels[0]!.why).toMatch(/Fewer than two levels/);
      expect(Number.isFinite(storm.shear.to6km.value)).toBe(true);
    }
  });

  it('gives bounds where a balloon burst early', async () => {
    const storm = stormOf(await profileOfFile('twpsondewnpnC3.b1.20060123.171600.custom.cdf'));
    expect(storm.parcels.every((parcel) => parcel.positiveAtTop)).toBe(true);
    expect(storm.shear.to3km.why).toBe('');
    expect(storm.shear.to6km.why).toMatch(/6000 m are needed/);
  });
});
