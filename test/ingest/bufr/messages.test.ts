// Finding messages, headers of all editions, damage of every kind: what is sound is read, what is not is named.

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Profile } from '../../../src/profile/index.ts';
import { joined, message, type MessageParts } from '../../support/bufr-writer.ts';
import { randomFrom } from '../../support/random.ts';
import { readBytes } from './support.ts';
import { HEADER, LEVELS, report, WIND } from './templates.ts';

const parts = (more: Partial<MessageParts> = {}): MessageParts => ({
  descriptors: [...HEADER, ...WIND],
  data: report(),
  ...more,
});

function expectSound(profile: Profile | undefined): void {
  expect(profile?.station).toMatchObject({ id: '99321', latitude: 47.25, longitude: 3.5, elevation: 120 });
  expect(profile!.timeMs).toBe(Date.UTC(2031, 9, 4, 20, 10));
  expect([...profile!.heightAgl]).toEqual(LEVELS.map(({ height }) => height! - 120));
  LEVELS.forEach(({ speed, direction }, k) => {
    if (speed === null) expect(profile!.speed[k]).toBeNaN();
    else expect(profile!.speed[k]).toBeCloseTo(speed, 5);
    if (direction === null) expect(profile!.direction[k]).toBeNaN();
    else expect(profile!.direction[k]).toBe(direction);
  });
}

describe('messages', () => {
  it.each([2, 3, 4] as const)('of edition %i, with and without section 2', async (edition) => {
    for (const section2 of [undefined, new Uint8Array([1, 2, 3, 4])]) {
      const { profiles, problems } = await readBytes('x', message(parts({ edition, ...(section2 && { section2 }) })));
      expect(problems).toEqual([]);
      expectSound(profiles[0]);
    }
  });

  it('in any company: headings, text, zeros, halves of the word between them, whole pieces or bytes', async () => {
    const one = message(parts());
    const file = joined(
      '\u0001\r\r\nIUWX01 EGXX 042010\r\r\n',
      one,
      '\0\0',
      one,
      'BUF BUFR but no message, BUFRRR ',
      one,
      'BU',
    );
    const { profiles, problems } = await readBytes('x', file);
    expect(problems).toEqual([]);
    expect(profiles).toHaveLength(3);
    profiles.forEach(expectSound);
  });

  it('tell the revision of the report', async () => {
    for (const edition of [3, 4] as const) {
      const { profiles } = await readBytes('x', message(parts({ edition, revision: 2 })));
      expect(profiles[0]!.revision).toBe(2);
    }
  });

  it('with a wrong length, a missing end mark or padding are read, and it is said', async () => {
    const next = message(parts());
    const wrong = message(parts());
    wrong[4] = 0x7f;
    const unmarked = message(parts());
    unmarked.fill(0x20, unmarked.length - 4);
    const { profiles, problems } = await readBytes('x', joined(wrong, unmarked, next));
    expect(profiles).toHaveLength(3);
    profiles.forEach(expectSound);
    expect(problems.map(({ code, mild, where }) => [code, mild, where.record])).toEqual([
      ['ingest/bufr-length', true, 1],
      ['ingest/bufr-end-mark', true, 2],
    ]);
  });

  it('damaged beyond reading are named with message and byte, and the others go on', async () => {
    const sound = message(parts());
    const badSection = message(parts());
    badSection[8] = 0x70;
    const badCount = message(parts());
    const { profiles, problems } = await readBytes('x', joined(sound, badSection, sound, badCount.subarray(0, 70)));
    expect(profiles).toHaveLength(2);
    expect(problems.map(({ code, where }) => [code, where.record, where.byte])).toEqual([
      ['ingest/bufr-damaged', 2, sound.length],
      ['ingest/bufr-truncated', 4, 3 * sound.length],
    ]);
    for (const { what, mend } of problems) expect(what.length * mend.length).toBeGreaterThan(0);
  });

  it('whose data end too early fail with the reason; reports before stay', async () => {
    const two = new Uint8Array([...report().bytes()]);
    const { problems, profiles } = await readBytes('x', message(parts({ data: two.subarray(0, -3) })));
    expect(profiles).toEqual([]);
    expect(problems[0]).toMatchObject({ code: 'ingest/bufr-truncated' });
  });

  it('of old editions, other tables, no report are named', async () => {
    const old = message(parts({ edition: 3 }));
    old[7] = 1;
    old.set([0, 0, 18], 4);
    const file = joined(old, message(parts({ masterTable: 10 })), message(parts({ reports: 0 })));
    const { problems, profiles } = await readBytes('x', file);
    expect(profiles).toEqual([]);
    expect(problems.map(({ code }) => code)).toEqual([
      'ingest/bufr-edition',
      'ingest/bufr-unsupported',
      'ingest/bufr-damaged',
    ]);
  });

  it('with unknown descriptors say which, and whether only the sender can know', async () => {
    const descriptors = [...HEADER, ...WIND];
    const file = joined(
      message(parts({ descriptors: [...descriptors, '012249'] })),
      message(parts({ descriptors: [...descriptors, '313099'] })),
    );
    const { problems } = await readBytes('x', file);
    expect(problems.map(({ what }) => what)).toEqual([
      expect.stringMatching(/0 12 249.*sender/u),
      expect.stringMatching(/3 13 099.*tables at hand/u),
    ]);
  });
});

describe('damage without end', () => {
  const damaged = async (descriptors: readonly string[], data = new Uint8Array(200).fill(0xff)): Promise<string[]> => {
    const started = performance.now();
    const { problems, profiles } = await readBytes('x', message({ descriptors, data }));
    expect(profiles).toEqual([]);
    expect(performance.now() - started).toBeLessThan(4000);
    return problems.map(({ code }) => code);
  };

  it('65535 times 65535 levels end where the bits end', async () => {
    expect(await damaged([...HEADER, '105000', '031002', '103000', '031002', '007007', '011001', '011002'])).toEqual([
      'ingest/bufr-truncated',
    ]);
  });

  it('data that stand once and count 65535 times 65535 are bounded', async () => {
    expect(
      await damaged([...HEADER, '106000', '031012', '104000', '031012', '007007', '011001', '011002', '011003']),
    ).toEqual(['ingest/bufr-too-large']);
    expect(await damaged([...HEADER, ...WIND, '103000', '031012', '101000', '031012', '205001'])).toEqual([
      expect.stringMatching(/truncated|too-large/u),
    ]);
  });

  it('replications of nothing, beyond the list or nested for ever are refused', async () => {
    expect(await damaged([...HEADER, ...WIND, '102255', '201130', '201000'])).toEqual(['ingest/bufr-damaged']);
    expect(await damaged([...HEADER, '109000', '031001', '007007', '011002'])).toEqual(['ingest/bufr-damaged']);
    expect(await damaged([...HEADER, '101000', '007007', '011002'])).toEqual(['ingest/bufr-damaged']);
    const nested = Array.from({ length: 40 }, (_, k) => `1${String(41 - k).padStart(2, '0')}255`);
    expect(await damaged([...nested, '007007', '011002'])).toEqual(['ingest/bufr-too-large']);
  });

  it('operators that leave no width, or stay open inside a replication, are refused', async () => {
    expect(await damaged([...HEADER, '201001', ...WIND])).toEqual(['ingest/bufr-damaged']);
    expect(await damaged([...HEADER, '104003', '201130', '007007', '011001', '011002'])).toEqual([
      'ingest/bufr-unsupported',
    ]);
  });

  it('a compressed message of 65535 reports is bounded', async () => {
    const data = new Uint8Array(3000);
    const started = performance.now();
    const { problems } = await readBytes(
      'x',
      message({
        descriptors: [...HEADER, '103200', '007007', '011001', '011002'],
        data,
        compressed: true,
        reports: 65535,
      }),
    );
    expect(performance.now() - started).toBeLessThan(4000);
    expect(problems.map(({ code }) => code)).toEqual(['ingest/bufr-too-large']);
  });
});

describe('flipped bits and cut files', () => {
  it('never crash, hang or make more profiles than messages (property)', async () => {
    const sound = joined(
      'heading ',
      message(parts()),
      message(parts({ edition: 3 })),
      message(parts({ compressed: false })),
    );
    await fc.assert(
      fc.asyncProperty(fc.integer(), fc.integer({ min: 1, max: 12 }), fc.nat(), async (seed, flips, cut) => {
        const random = randomFrom(seed);
        const bytes = sound.slice(0, sound.length - (cut % 60));
        for (let k = 0; k < flips; k++) {
          bytes[Math.floor(random() * bytes.length)]! ^= 1 << Math.floor(random() * 8);
        }
        const { profiles, problems } = await readBytes('x', bytes);
        for (const { code, what } of problems) {
          expect(code).not.toBe('ingest/reader-failed');
          expect(what).not.toBe('');
        }
        expect(profiles.length + problems.length).toBeLessThan(70_000);
      }),
      { numRuns: 400 },
    );
  }, 60_000);
});
