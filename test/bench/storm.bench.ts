// Everything about storms for one sounding of 5,000 levels, and a year of soundings of 150 levels every 12 hours.

import { specificHumidityOfRelative, standardAtmosphere } from '../../src/air/index.ts';
import { BlockBuilder, profileAt, type Profile } from '../../src/profile/index.ts';
import {
  assessStorm,
  fineEnvironment,
  ingredientsOf,
  parcelTrace,
  relativeTo,
  stormOf,
  vectorFigure,
} from '../../src/storm/index.ts';
import { processorMs } from './processor-time.ts';

interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly note?: string;
}

export default function bench(report: (figure: Figure) => void): Promise<void> {
  const fine = Array.from({ length: 8 }, (_, index) => sounding(5000, index));
  for (let turn = 0; turn < 4; turn++) fine.forEach((profile) => stormOf(profile));
  const times: number[] = [];
  for (let turn = 0; turn < 40; turn++) {
    const began = performance.now();
    stormOf(fine[turn % fine.length]!);
    times.push(performance.now() - began);
  }
  times.sort((a, b) => a - b);
  const energies = fine.map((profile) => stormOf(profile).parcels[3]!.cape.toFixed(0)).join(', ');
  const note = `jet-fed CAPE of the eight soundings: ${energies} J/kg`;
  report({ name: 'storm: one sounding of 5,000 levels, median', value: times[20]!, unit: 'ms', note });
  report({ name: 'storm: one sounding of 5,000 levels, slowest of 40', value: times[39]!, unit: 'ms' });

  // All that the page asks for: numbers, ingredients, and the parcels' ways up.
  let turn = 0;
  const value = processorMs(() => {
    const { numbers, sounding: air } = assessStorm(fine[turn++ % fine.length]!);
    ingredientsOf(numbers);
    const environment = fineEnvironment(air);
    for (const parcel of numbers.parcels) if (parcel.start !== null) parcelTrace(environment, parcel.start);
  }, 24);
  report({ name: 'storm: the same with ingredients and ways up, processor time', value, unit: 'ms' });

  const { hodograph, numbers } = assessStorm(fine[0]!);
  const dragging = processorMs(() => {
    for (let step = 0; step < 200; step++) {
      relativeTo(vectorFigure(step / 10, 5), { hodograph, inflow: numbers.inflow, jet: undefined });
    }
  });
  report({ name: 'storm: helicity and inflow for another motion, 5,000 levels', value: dragging / 200, unit: 'ms' });

  const year = Array.from({ length: 730 }, (_, index) => sounding(150, index));
  const began = performance.now();
  year.forEach((profile) => stormOf(profile));
  report({ name: 'storm: a year of 12-hourly soundings, 150 levels', value: performance.now() - began, unit: 'ms' });
  return Promise.resolve();
}

/** Invented: moist below 850 hPa under a warm lid, cool near the ground by night, wind veering to a jet and westerlies. */
function sounding(count: number, index: number): Profile {
  const heightAgl = Array.from({ length: count }, (_, k) => 2 + (k * 10_800) / (count - 1));
  const night = index % 2 === 0 ? 8 : 0;
  const warmth = 12 + 4 * Math.sin(index);
  const temperature = heightAgl.map(
    (z) =>
      standardAtmosphere(z).temperature +
      warmth * Math.exp(-z / 6000) -
      night * Math.exp(-z / 200) +
      0.05 * Math.sin(z / 7 + index),
  );
  const pressure = heightAgl.map((z) => standardAtmosphere(z).pressure);
  const specificHumidity = heightAgl.map((z, k) =>
    specificHumidityOfRelative(z < 1300 ? 0.75 : 0.25, temperature[k]!, pressure[k]!),
  );
  const speed = heightAgl.map((z) => 4 + 14 * Math.exp(-(((z - 500) / 350) ** 2)) + z / 400);
  const direction = heightAgl.map((z) => 170 + 90 * (1 - Math.exp(-z / 2000)));
  const builder = new BlockBuilder();
  builder.add({
    station: { id: 'bench', name: 'Bench', latitude: 38, longitude: -98, elevation: 300 },
    source: 'bench',
    instrument: 'radiosonde',
    timeMs: index * 43_200_000,
    levels: { heightAgl, temperature, pressure, specificHumidity, speed, direction },
  });
  return profileAt(builder.finish(), 0);
}
