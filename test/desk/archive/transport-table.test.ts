import { describe, expect, it } from 'vitest';
import { archiveRows, csvHeading, csvRows, profileTable, TransportTableReader } from '../../../src/desk/index.ts';
import { criteriaOf } from '../../../src/jet/index.ts';
import { BlockBuilder, type ProfileBlock } from '../../../src/profile/index.ts';
import { PLAIN_SITE } from '../../../src/site/index.ts';

const NOW = Date.UTC(2031, 6, 15, 5);
const HEIGHTS = Array.from({ length: 31 }, (_, k) => 100 * k);

function block(humid: boolean): ProfileBlock {
  const builder = new BlockBuilder();
  builder.add({
    station: { id: 'SON', name: 'Son', latitude: 40, longitude: 0, elevation: 0 },
    source: 'test',
    instrument: 'radiosonde',
    timeMs: NOW,
    levels: {
      heightAgl: HEIGHTS,
      speed: HEIGHTS.map(() => 10),
      direction: HEIGHTS.map(() => 180),
      ...(humid
        ? {
            pressure: HEIGHTS.map((z) => 100_000 * Math.exp(-z / 8400)),
            temperature: HEIGHTS.map(() => 287),
            specificHumidity: HEIGHTS.map(() => 0.01),
          }
        : {}),
    },
  });
  return builder.finish();
}

function histories(humid: boolean): ReturnType<TransportTableReader['histories']> {
  const question = { site: PLAIN_SITE, criteria: criteriaOf('whiteman-1997'), discs: [], source: 'test' };
  const [rows] = archiveRows(block(humid), question);
  const table = profileTable(rows!, []);
  const reader = new TransportTableReader();
  const lines = csvRows(table).trimEnd().split('\n');
  reader.begin(csvHeading(table).trim().split(','));
  reader.take(lines.map((line) => line.split(',')));
  return reader.histories();
}

describe('the transport of a scan', () => {
  it('stands in the table of profiles and is read back', () => {
    const history = histories(true).get('SON')!;
    expect(history.timeMs).toEqual([NOW]);
    // Air of 3 km weighs p (1 - exp(-3000/8400)) / g; of it a hundredth is vapour, carried with 10 m/s.
    const weight = (100_000 * (1 - Math.exp(-3000 / 8400))) / 9.81;
    expect((history.below3Km[0]! / (0.01 * 10 * weight)) * 100).toBeCloseTo(100, -1);
    expect(history.source).toBe('the scanned archive of SON');
  });

  it('is empty where a profile has no humidity, and of other tables nothing is taken', () => {
    expect(histories(false).size).toBe(0);
    const reader = new TransportTableReader();
    reader.begin(['station', 'time', 'below_3km_kg_per_m_s']);
    reader.take([['SON', '2031-07-15T05:00:00Z', '100']]);
    expect(reader.histories().size).toBe(0);
  });
});
