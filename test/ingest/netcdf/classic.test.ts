import fc from 'fast-check';
import { NetCDFReader } from 'netcdfjs';
import { describe, expect, it } from 'vitest';
import { DuskveerError } from '../../../src/air/index.ts';
import { openClassic } from '../../../src/ingest/netcdf/classic.ts';
import { buildClassic, type FileParts, type TypeName } from './build-classic.ts';

const open = (parts: FileParts) => openClassic(buildClassic(parts), 'made.nc');
const numbers = (parts: FileParts, name: string): number[] => [...open(parts).variables.get(name)!.numbers()];

describe('openClassic', () => {
  it.each([1, 2, 5] as const)('reads every type, signed and unsigned apart, in CDF-%i', (version) => {
    const cases: [TypeName, number[]][] = [
      ['i1', [-1, 127, -128]],
      ['i2', [-1, 32767, -32768]],
      ['i4', [-1, 2147483647, -2147483648]],
      ['f4', [-1.5, 3.25, 1e30]],
      ['f8', [-1.1, Math.PI, 1e300]],
      ...(version === 5
        ? ([
            ['u1', [255, 0, 128]],
            ['u2', [65535, 0, 32768]],
            ['u4', [4294967295, 0, 2147483648]],
            ['i8', [-1, 2 ** 40, -(2 ** 40)]],
            ['u8', [1, 2 ** 40, 0]],
          ] as [TypeName, number[]][])
        : []),
    ];
    const variables = Object.fromEntries(cases.map(([type, data]) => [type, { type, dimensions: ['n'], data }]));
    const parts: FileParts = { version, dimensions: { n: 3 }, variables };
    for (const [type, data] of cases) {
      expect(numbers(parts, type), type).toEqual(type === 'f4' ? data.map(Math.fround) : data);
    }
  });

  it('does not pad a variable that is alone in its records', () => {
    const parts: FileParts = {
      dimensions: { time: null },
      records: 5,
      variables: { a: { type: 'i2', dimensions: ['time'], data: [1, -2, 3, -4, 5] } },
    };
    expect(numbers(parts, 'a')).toEqual([1, -2, 3, -4, 5]);
  });

  it('pads each of several record variables, odd lengths too', () => {
    const parts: FileParts = {
      dimensions: { time: null, three: 3 },
      records: 3,
      variables: {
        a: { type: 'i2', dimensions: ['time'], data: [1, 2, 3] },
        b: { type: 'i1', dimensions: ['time', 'three'], data: [1, 2, 3, 4, 5, 6, 7, 8, -9] },
        c: { type: 'f8', dimensions: ['time'], data: [0.1, 0.2, 0.3] },
        fixed: { type: 'i1', dimensions: ['three'], data: [7, 8, 9] },
      },
    };
    expect(numbers(parts, 'a')).toEqual([1, 2, 3]);
    expect(numbers(parts, 'b')).toEqual([1, 2, 3, 4, 5, 6, 7, 8, -9]);
    expect(numbers(parts, 'c')).toEqual([0.1, 0.2, 0.3]);
    expect(numbers(parts, 'fixed')).toEqual([7, 8, 9]);
    expect([...open(parts).variables.get('b')!.numbers(1, 3)]).toEqual([4, 5, 6, 7, 8, -9]);
  });

  it.each([1, 5] as const)('counts the records itself when the writer left the count open (CDF-%i)', (version) => {
    const parts: FileParts = {
      version,
      dimensions: { time: null },
      records: 4,
      streaming: true,
      variables: {
        a: { type: 'i2', dimensions: ['time'], data: [1, 2, 3, 4] },
        b: { type: 'f4', dimensions: ['time'], data: [1, 2, 3, 4] },
      },
    };
    expect(numbers(parts, 'b')).toEqual([1, 2, 3, 4]);
    expect(open(parts).problems).toEqual([]);
  });

  it('keeps the whole records of a file cut short and says so', () => {
    const bytes = buildClassic({
      dimensions: { time: null },
      records: 4,
      variables: {
        a: { type: 'f4', dimensions: ['time'], data: [1, 2, 3, 4] },
        b: { type: 'f4', dimensions: ['time'], data: [5, 6, 7, 8] },
      },
    });
    const cut = openClassic(bytes.subarray(0, bytes.length - 5), 'cut.nc');
    expect([...cut.variables.get('b')!.numbers()]).toEqual([5, 6, 7]);
    expect(cut.problems.map(({ code }) => code)).toEqual(['ingest/netcdf-truncated']);
    expect(cut.problems[0]!.what).toBe('The file announces 4 records but ends after 3.');
  });

  it('reads names and attributes in UTF-8, and in the Western code page where they are not', () => {
    const dataset = open({ attributes: { place: 'Jülich', straße: 'ß' } });
    expect(dataset.attributes.get('place')).toBe('Jülich');
    expect(dataset.attributes.get('straße')).toBe('ß');
    const bytes = buildClassic({ attributes: { place: 'J?lich' } });
    bytes[bytes.indexOf('?'.charCodeAt(0))] = 0xfc;
    expect(openClassic(bytes, 'old.nc').attributes.get('place')).toBe('Jülich');
  });

  it('reads texts by their last dimension, without the padding', () => {
    const dataset = open({
      dimensions: { station: 2, letters: 5 },
      variables: {
        name: { type: 'text', dimensions: ['station', 'letters'], data: 'ab\0\0\0cdefg' },
        title: { type: 'text', dimensions: ['letters'], data: 'hello' },
      },
    });
    expect(dataset.variables.get('name')!.texts()).toEqual(['ab', 'cdefg']);
    expect(dataset.variables.get('name')!.dimensions).toEqual(['station']);
    expect(dataset.variables.get('title')!.texts()).toEqual(['hello']);
    expect(dataset.variables.get('title')!.shape).toEqual([]);
  });

  it('leaves the bytes it is given as they are', () => {
    const bytes = buildClassic({
      dimensions: { n: 2 },
      variables: { a: { type: 'f4', dimensions: ['n'], data: [1, 2] } },
    });
    const before = bytes.slice();
    // A Node buffer is a byte array whose slice does not copy.
    openClassic(Buffer.from(bytes.buffer), 'made.nc').variables.get('a')!.numbers();
    expect(bytes).toEqual(before);
  });

  it('agrees with another reader on floats and doubles (property)', () => {
    const value = fc.float({ noNaN: true, noDefaultInfinity: true });
    fc.assert(
      fc.property(
        fc.constantFrom(1 as const, 2 as const),
        fc.array(fc.tuple(value, value), { minLength: 1, maxLength: 9 }),
        fc.integer({ min: 1, max: 4 }),
        (version, rows, width) => {
          const a = rows.flatMap(([first]) => Array.from({ length: width }, (_, k) => Math.fround(first + k)));
          const b = rows.map(([, second]) => second / 3);
          const bytes = buildClassic({
            version,
            dimensions: { time: null, width },
            records: rows.length,
            variables: {
              a: { type: 'f4', dimensions: ['time', 'width'], data: a },
              b: { type: 'f8', dimensions: ['time'], data: b },
            },
          });
          const ours = openClassic(bytes, 'made.nc');
          const theirs = new NetCDFReader(bytes);
          expect([...ours.variables.get('a')!.numbers()]).toEqual((theirs.getDataVariable('a') as number[]).flat());
          expect([...ours.variables.get('b')!.numbers()]).toEqual((theirs.getDataVariable('b') as number[]).flat());
        },
      ),
      { numRuns: 50 },
    );
  });

  it.each([
    ['too many dimensions', (bytes: Uint8Array) => bytes.set([0, 0, 0, 10, 0x7f, 255, 255, 255], 8)],
    ['a list of another kind', (bytes: Uint8Array) => bytes.set([0, 0, 0, 11], 8)],
    ['a name longer than the file', (bytes: Uint8Array) => bytes.set([0x7f, 0, 0, 0], 16)],
  ])('refuses a header with %s, naming the byte', (_, spoil) => {
    const bytes = buildClassic({
      dimensions: { n: 2 },
      variables: { a: { type: 'f4', dimensions: ['n'], data: [1, 2] } },
    });
    spoil(bytes);
    expect(() => openClassic(bytes, 'bad.nc')).toThrow(DuskveerError);
    try {
      openClassic(bytes, 'bad.nc');
    } catch (error) {
      expect((error as DuskveerError).problem).toMatchObject({
        code: 'ingest/netcdf-damaged',
        where: { source: 'bad.nc', byte: expect.any(Number) as number },
      });
    }
  });

  it('refuses values beyond the end, without reserving memory for them', () => {
    const bytes = buildClassic({
      dimensions: { n: 2 },
      variables: { a: { type: 'f4', dimensions: ['n'], data: [1, 2] } },
    });
    // The length of the only dimension.
    bytes.set([0x7f, 255, 255, 255], 24);
    const dataset = openClassic(bytes, 'bad.nc');
    expect(() => dataset.variables.get('a')!.numbers()).toThrow('The values of a lie beyond the end of the file.');
  });
});
