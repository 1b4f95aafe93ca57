// Reading the radiosonde archive's text: a period of years made up on the spot, 150 levels a sounding, two thirds of the
// pressure levels with a height as in the archive.

import { readProfiles } from '../../src/ingest/index.ts';
import { igraText, type IgraLevel } from '../support/make-igra.ts';
import { bytesOf, pieces } from '../support/sources.ts';

type Report = (figure: { name: string; value: number; unit: string; note?: string }) => void;

/** A sounding a line of which the archive could hold. */
function sounding(index: number, heights: (k: number) => boolean): string {
  const levels = Array.from({ length: 150 }, (_, k): IgraLevel => {
    const pressure = Math.round(100_500 * Math.exp(-0.028 * k));
    const height = Math.round(40 + 220 * k + (index % 7));
    const wind = k % 3 === 2;
    return {
      major: wind ? 3 : k % 10 === 0 ? 1 : 2,
      minor: k === 0 ? 1 : 0,
      pressure: wind ? null : pressure,
      height: wind || heights(k) ? height : null,
      temperature: wind ? null : Math.round(200 - 6 * k),
      relative: null,
      depression: wind ? null : 20 + (k % 80),
      direction: (200 + 2 * k + index) % 360,
      speed: 50 + ((k * 7 + index) % 300),
    };
  });
  const day = 1 + (index % 28);
  const hour = index % 2 === 0 ? 0 : 12;
  return igraText({
    id: 'XXM00010999',
    year: 2000,
    month: 1 + (index % 12),
    day,
    hour,
    release: 9999,
    latitude: 50,
    longitude: 8,
    levels,
  });
}

export default async function bench(report: Report): Promise<void> {
  const kinds: [string, (k: number) => boolean][] = [
    ['igra: every level with a height', () => true],
    ['igra: a third of the pressure levels without height', (k) => k % 3 === 0],
  ];
  for (const [name, heights] of kinds) {
    const year = bytesOf(Array.from({ length: 730 }, (_, index) => sounding(index, heights)).join(''));
    const rates: number[] = [];
    for (let run = 0; run < 7; run++) {
      const before = process.cpuUsage();
      let profiles = 0;
      for await (const { block, problems } of readProfiles(pieces('year.txt', year, 65_536))) {
        profiles += block.profileCount;
        if (problems.length > 0) throw new Error(problems[0]!.what);
      }
      const { user, system } = process.cpuUsage(before);
      if (profiles !== 730) throw new Error('not all was read');
      rates.push(year.length / (user + system));
    }
    rates.sort((a, b) => a - b);
    report({
      name,
      value: Math.round(rates[3]!),
      unit: 'MB/s',
      note: `${Math.round(year.length / 1e5) / 10} MB by processor time, median of 7; goal 60`,
    });
  }
}
