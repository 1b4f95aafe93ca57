import { gzipSync } from 'node:zlib';
import { zipSync } from 'fflate';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Cancelled, DuskveerError } from '../../src/air/index.ts';
import {
  bytesSource,
  DEFAULT_LIMITS,
  readProfiles,
  type FileFormat,
  type ReadOptions,
} from '../../src/ingest/index.ts';
import { gunzipped } from '../../src/ingest/gzip.ts';
import { readWith } from '../../src/ingest/read-profiles.ts';
import { BlockBuilder, unplacedStation } from '../../src/profile/index.ts';
import { PLAIN_SITE } from '../../src/site/index.ts';
import { bytesOf, pieces, readToEnd } from '../support/sources.ts';

/** A format of the simplest kind: after the word `toy`, a line a profile, each its time. `!` fails, `?` is a problem. */
const TOY: FileFormat = {
  name: 'toy',
  title: 'toy lines',
  recognise: (head) => new TextDecoder().decode(head.subarray(0, 3)) === 'toy',
  async *read(source) {
    let text = '';
    for await (const piece of source.stream()) text += new TextDecoder().decode(piece);
    for (const line of text.split('\n').slice(1)) {
      if (line === '!') throw new RangeError('far out');
      if (line === '!!') throw new DuskveerError({ code: 'ingest/toy', what: 'No.', mend: 'Yes.', where: { line: 2 } });
      const builder = new BlockBuilder();
      const problems = line === '?' ? [{ code: 'ingest/toy', what: 'Hm.', mend: 'Oh.', where: {} }] : [];
      if (line !== '?' && line !== '') {
        const levels = { heightAgl: [10], speed: [1], direction: [1] };
        builder.add({ station: unplacedStation('s'), source: source.name, timeMs: Number(line), levels });
      }
      yield { block: builder.finish(), problems };
    }
  },
};

const NOON = Date.UTC(2024, 5, 1, 12);
const OPTIONS: ReadOptions = {
  site: PLAIN_SITE,
  limits: DEFAULT_LIMITS,
  signal: undefined,
  onProgress: undefined,
  referenceTimeMs: undefined,
  stationList: [],
};
const readToy = (bytes: Uint8Array, options: Partial<ReadOptions> = {}, name = 'a.toy'): ReturnType<typeof readToEnd> =>
  readToEnd(readWith([TOY], bytesSource(name, bytes), { ...OPTIONS, ...options }));
const codes = ({ problems }: { problems: readonly { code: string }[] }): string[] => problems.map(({ code }) => code);

describe('the front door', () => {
  it('reads what a format recognises, plain, gzipped, in several members, in zip and in zip of gzip', async () => {
    const plain = bytesOf(`toy\n${NOON}\n${NOON + 600_000}`);
    const first = gzipSync(plain.subarray(0, 9));
    const second = gzipSync(plain.subarray(9));
    const members = new Uint8Array([...first, ...second]);
    for (const bytes of [plain, gzipSync(plain), members, gzipSync(gzipSync(plain))]) {
      const got = await readToy(bytes);
      expect(codes(got)).toEqual([]);
      expect([...got.block.timeMs]).toEqual([NOON, NOON + 600_000]);
    }
    const archive = zipSync({ 'a.toy': plain, 'b/c.toy.gz': gzipSync(plain), stored: [plain, { level: 0 }] });
    const got = await readToy(archive, {}, 'all.zip');
    expect(codes(got)).toEqual([]);
    expect(got.block.profileCount).toBe(6);
    expect(got.block.sources).toEqual(['all.zip/a.toy', 'all.zip/b/c.toy.gz', 'all.zip/stored']);
  });

  it('reads the same whatever the pieces the bytes come in', async () => {
    const bytes = gzipSync(bytesOf(`toy\n${NOON}\n`.repeat(1) + `${NOON + 1000}\n`.repeat(200)));
    for (const length of [1, 7, 1000]) {
      const got = await readToEnd(readWith([TOY], pieces('a.toy', bytes, length), OPTIONS));
      expect(got.block.profileCount).toBe(201);
    }
  });

  it('names empty files, unknown formats and what they look like', async () => {
    expect(codes(await readToy(new Uint8Array(0)))).toEqual(['ingest/empty']);
    expect(codes(await readToy(gzipSync(new Uint8Array(0))))).toEqual(['ingest/empty']);
    const looks = async (bytes: Uint8Array): Promise<string> => (await readToy(bytes)).problems[0]!.what;
    expect(await looks(bytesOf('%PDF-1.7'))).toContain('a PDF document');
    expect(await looks(bytesOf('<!doctype html><p>'))).toContain('a web page');
    expect(await looks(bytesOf('Dear all,\nplease'))).toContain('text beginning “Dear all,”');
    expect(await looks(new Uint8Array([0, 1, 0xfe]))).toContain('bytes 00 01 fe');
    const [problem] = (await readToy(bytesOf('Dear all'))).problems;
    expect(problem).toMatchObject({ code: 'ingest/unknown-format', where: { source: 'a.toy' } });
    expect(problem!.mend).toContain('toy lines');
  });

  it('keeps what came before a failure and puts file and place to every problem', async () => {
    const crashed = await readToy(bytesOf(`toy\n${NOON}\n?\n!\n${NOON}`));
    expect(crashed.block.profileCount).toBe(1);
    expect(codes(crashed)).toEqual(['ingest/toy', 'ingest/reader-failed']);
    expect(crashed.problems.every(({ where }) => where.source === 'a.toy')).toBe(true);
    const thrown = await readToy(bytesOf('toy\n!!'));
    expect(thrown.problems[0]!.where).toEqual({ source: 'a.toy', line: 2 });
    expect(codes(await readToy(bytesOf('toy\n')))).toEqual(['ingest/no-profiles']);
  });

  it('keeps what a damaged or truncated packed file held', async () => {
    const packed = gzipSync(bytesOf(`toy\n${`${NOON}\n`.repeat(5000)}`), { level: 1 });
    const got = await readToy(packed.subarray(0, packed.length - 20));
    expect(codes(got)).toContain('ingest/damaged-packing');
    expect(got.block.profileCount).toBeGreaterThan(1000);
    packed[packed.length - 8]! ^= 1;
    expect(codes(await readToy(packed))).toEqual(['ingest/damaged-packing']);
    const archive = zipSync({ 'a.toy': bytesOf('toy\n1') });
    expect(codes(await readToy(archive.subarray(0, archive.length - 30)))).toEqual(['ingest/damaged-packing']);
  });

  it('stops where a packed file expands without end, by size and by share', async () => {
    const zeros = gzipSync(new Uint8Array(2 ** 20));
    const small = { ...DEFAULT_LIMITS, unpackedBytes: 2 ** 19 };
    const bytes = new Uint8Array([...gzipSync(bytesOf(`toy\n${NOON}\n`)), ...zeros]);
    expect(codes(await readToy(bytes, { limits: small }))).toContain('ingest/expands-too-far');
    const bomb = gunzipped(bytesSource('bomb', gzipSync(new Uint8Array(70 * 2 ** 20))), DEFAULT_LIMITS);
    let unpacked = 0;
    const drain = async (): Promise<void> => {
      for await (const piece of bomb.stream()) unpacked += piece.length;
    };
    await expect(drain()).rejects.toThrow('expands without end');
    expect(unpacked).toBeLessThan(100 * 2 ** 20);
  });

  it('refuses packing within packing without end, and office documents', async () => {
    let bytes = bytesOf('toy\n1');
    for (let k = 0; k < 5; k++) bytes = gzipSync(bytes);
    expect(codes(await readToy(bytes))).toEqual(['ingest/packed-too-deep']);
    const workbook = zipSync({ '[Content_Types].xml': bytesOf('<x/>'), 'xl/workbook.xml': bytesOf('<x/>') });
    expect(codes(await readToy(workbook))).toEqual(['ingest/workbook']);
  });

  it('leaves out profiles with times that cannot be true, and says so', async () => {
    const times = [NOON, 3_600_000, Date.UTC(2099, 0, 1), NaN, Date.UTC(1970, 5, 1), 1e300];
    const got = await readToy(bytesOf(`toy\n${times.join('\n')}`));
    expect([...got.block.timeMs]).toEqual([NOON, Date.UTC(1970, 5, 1)]);
    expect(new Set(codes(got))).toEqual(new Set(['ingest/wrong-time']));
    expect(got.problems[0]).toMatchObject({ where: { source: 'a.toy', record: 2 } });
    expect(got.problems[0]!.what).toContain('1970-01-01');
    const late = await readToy(bytesOf(`toy\n${NOON + 2 * 86_400_000}`), { referenceTimeMs: NOON });
    expect(codes(late)).toEqual(['ingest/wrong-time']);
  });

  it('stops at the limit of levels', async () => {
    const got = await readToy(bytesOf(`toy\n${`${NOON}\n`.repeat(9)}`), { limits: { ...DEFAULT_LIMITS, levels: 3 } });
    expect(codes(got)).toEqual(['ingest/too-many-levels']);
    expect(got.block.profileCount).toBe(4);
  });

  it('turns a source that breaks off into a problem, and passes only Cancelled on', async () => {
    const breaking = {
      name: 'feed',
      size: undefined,
      // eslint-disable-next-line @typescript-eslint/require-await -- nothing to wait for
      async *stream() {
        yield bytesOf(`toy\n${NOON}\n`);
        throw new Error('unplugged');
      },
    };
    const got = await readToEnd(readWith([TOY], breaking, OPTIONS));
    expect(got.block.profileCount).toBe(1);
    expect(got.problems[0]).toMatchObject({ code: 'ingest/bytes-stopped', where: { source: 'feed', byte: 18 } });
    const stopped = AbortSignal.abort();
    await expect(readToy(bytesOf('toy\n1'), { signal: stopped })).rejects.toThrow(Cancelled);
  });

  it('reports progress that only grows and ends at the size of the file', async () => {
    const seen: number[] = [];
    const bytes = bytesOf(`toy\n${`${NOON}\n`.repeat(50)}`);
    const options = { ...OPTIONS, onProgress: ({ bytesRead }: { bytesRead: number }) => seen.push(bytesRead) };
    await readToEnd(readWith([TOY], pieces('a.toy', bytes, 100), options));
    expect(seen).toEqual([...seen].sort((a, b) => a - b));
    expect(seen.at(-1)).toBe(bytes.length);
  });

  it('lets no exception out, whatever the bytes (property)', async () => {
    const packed = gzipSync(bytesOf(`toy\n${NOON}\n`.repeat(20)));
    const archive = zipSync({ 'a.toy': bytesOf(`toy\n${NOON}`), b: bytesOf('other') });
    const flips = fc.array(fc.tuple(fc.nat(), fc.nat({ max: 255 })), { maxLength: 6 });
    await fc.assert(
      fc.asyncProperty(fc.constantFrom(packed, archive), flips, fc.nat(), async (bytes, changes, cut) => {
        const mutated = bytes.slice(0, cut % 3 === 0 ? cut % bytes.length : bytes.length);
        for (const [at, value] of changes) mutated[at % mutated.length] = value;
        const got = await readToEnd(readProfiles(bytesSource('x', mutated)));
        expect(got.problems.length).toBeGreaterThan(0);
      }),
    );
    await fc.assert(
      fc.asyncProperty(fc.uint8Array({ maxLength: 200 }), async (bytes) => {
        for (const { what, mend, where } of (await readToEnd(readProfiles(bytesSource('x', bytes)))).problems) {
          expect(what.length > 0 && mend.length > 0 && where.source !== undefined).toBe(true);
        }
      }),
    );
  });
});
