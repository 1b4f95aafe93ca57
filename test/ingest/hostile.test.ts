// What a broken sender or a hostile hand can put before the readers: files without end, lengths that lie. Nothing may be
// held of a stream but what a reader needs.

import { describe, expect, it } from 'vitest';
import { readProfiles, readStationList, type ByteSource } from '../../src/ingest/index.ts';
import { joined, message } from '../support/bufr-writer.ts';
import { igraText } from '../support/make-igra.ts';
import { profilerReport } from '../support/profiler-report.ts';
import { bytesOf, pieces, readToEnd } from '../support/sources.ts';
import { HEADER, report, WIND } from './bufr/templates.ts';

/**
 * MiB that reading may add to what the process holds. The longest BUFR message is 16 MiB, twice while it is put together, and
 * what was let go is not freed at once.
 */
const MOST_MEMORY = 192;
const OPTIONS = { referenceTimeMs: Date.UTC(2024, 5, 30) };

/** A beginning, and then the same without end; notes how much the process held at most. */
function endless(begin: Uint8Array, text: string, megabytes = 100): { source: ByteSource; grown: () => number } {
  const piece = bytesOf(text.repeat(Math.ceil(2 ** 18 / text.length))).subarray(0, 2 ** 18);
  let before = Infinity;
  let most = 0;
  const look = (): void => {
    const { heapUsed, external } = process.memoryUsage();
    before = Math.min(before, heapUsed + external);
    most = Math.max(most, heapUsed + external);
  };
  return {
    grown: () => (most - before) / 2 ** 20,
    source: {
      name: 'endless',
      size: undefined,
      // eslint-disable-next-line @typescript-eslint/require-await -- nothing to wait for
      async *stream() {
        look();
        yield begin;
        for (let k = 0; k < megabytes * 4; k++) {
          // A reader may work on what it is given in place.
          yield piece.slice();
          if (k % 8 === 0) look();
        }
      },
    },
  };
}

const SOUNDING = igraText({
  id: 'XXM00010999',
  year: 2024,
  month: 6,
  day: 1,
  hour: 12,
  release: 1130,
  latitude: 50,
  longitude: 8,
  levels: [
    {
      major: 1,
      minor: 1,
      pressure: 100_000,
      height: 120,
      temperature: 200,
      relative: null,
      depression: 30,
      direction: 200,
      speed: 50,
    },
  ],
});
const TABLE = 'time,height,speed,direction\n2024-06-01T00:00Z,100,5,200\n2024-06-01T00:10Z,100,5,200\n';

describe('a hundred megabytes without a line end', () => {
  it.each([
    ['a bulletin', bytesOf('TTAA 15121 10999 99995 14656 18005 '), '92745 10620 '],
    ['a bulletin of one group', bytesOf('TTAA 15121 10999 99995 14656 18005 '), 'A'],
    ['an archive', bytesOf(SOUNDING), '1'],
    ['a table', bytesOf(TABLE), '7'],
    ['a table of one open quotation', bytesOf(TABLE), '"a'],
    ['BUFR messages that never end', joined('BUFR', new Uint8Array([0xff, 0xff, 0xff, 4])), 'x'],
  ])(
    '%s',
    async (_, begin, text) => {
      const { source, grown } = endless(begin, text);
      for await (const { problems } of readProfiles(source, OPTIONS)) {
        for (const { code } of problems) expect(code).not.toBe('ingest/reader-failed');
      }
      expect(grown()).toBeLessThan(MOST_MEMORY);
    },
    60_000,
  );

  it.each([
    ['bulletins that only begin', bytesOf('TTAA 15121 10999 99995 14656 18005 '), 'TTAA 15121 '],
    ['BUFR messages that only begin', profilerReport(1, 0), 'BUFR'],
  ])(
    '%s, ten megabytes of them',
    async (_, begin, text) => {
      const { source, grown } = endless(begin, text, 10);
      const { problems } = await readToEnd(readProfiles(source, OPTIONS));
      for (const { code } of problems) expect(code).not.toBe('ingest/reader-failed');
      expect(grown()).toBeLessThan(MOST_MEMORY);
    },
    60_000,
  );

  it('a list of stations', async () => {
    const { source, grown } = endless(bytesOf('id,name,lat,lon\n10999,Fenmoor,52,8\n'), '9');
    await expect(readStationList(source)).rejects.toThrow(/line end/u);
    expect(grown()).toBeLessThan(MOST_MEMORY);
  }, 60_000);
});

describe('a BUFR message whose length lies', () => {
  const sound = message({ descriptors: [...HEADER, ...WIND], data: report() });

  it('is read or named, and its neighbours are read, whichever bit of the length is flipped', async () => {
    for (let bit = 0; bit < 24; bit++) {
      const lying = sound.slice();
      lying[4 + (bit >> 3)]! ^= 128 >> (bit & 7);
      const { block, problems } = await readToEnd(readProfiles(pieces('x', joined(sound, lying, sound), 100)));
      expect(block.profileCount, `bit ${bit}`).toBeGreaterThanOrEqual(2);
      expect(problems.length, `bit ${bit}`).toBeGreaterThan(0);
      for (const { code } of problems) expect(code).not.toBe('ingest/reader-failed');
    }
  });

  it('counts of 65535 x 65535 end where the bits end, whatever they repeat', async () => {
    for (const inner of [['007007', '011001', '011002'], ['011002'], ['205100'], ['008021']]) {
      const count = inner.length.toString();
      const outer = String(inner.length + 2);
      const descriptors = [
        ...HEADER,
        `1${outer.padStart(2, '0')}000`,
        '031002',
        `1${count.padStart(2, '0')}000`,
        '031002',
      ];
      const bytes = message({ descriptors: [...descriptors, ...inner], data: new Uint8Array(500).fill(0xff) });
      const started = performance.now();
      const { problems } = await readToEnd(readProfiles(pieces('x', bytes, 100)));
      expect(performance.now() - started).toBeLessThan(4000);
      expect(problems).toHaveLength(1);
    }
  });
});
