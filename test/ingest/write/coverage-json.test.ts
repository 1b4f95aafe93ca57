import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { writeCoverageJson } from '../../../src/ingest/index.ts';
import { BlockBuilder, concatBlocks, MARK, type ProfileBlock } from '../../../src/profile/index.ts';
import { readBytes } from '../netcdf/read-bytes.ts';
import { madeBlock } from './made-blocks.ts';

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);

describe('writeCoverageJson', () => {
  it('comes back as it was (property)', async () => {
    await fc.assert(
      fc.asyncProperty(fc.boolean().chain(madeBlock), async (block) => {
        const { blocks, problems, format } = await readBytes('made.nc', bytesOf(writeCoverageJson([block])));
        expect(problems).toEqual([]);
        expect(format).toBe('coverage-json');
        const back = concatBlocks(blocks);
        // Corrections are not counted in this format; a position stands whole or not at all.
        const placed = block.stations.map((station) =>
          Number.isNaN(station.latitude + station.longitude) ? { ...station, latitude: NaN, longitude: NaN } : station,
        );
        expect({ ...back, revision: block.revision, notes: {} }).toEqual({ ...block, stations: placed, notes: {} });
      }),
      { numRuns: 40 },
    );
  });

  it('writes a collection as the standard lays it down', () => {
    const builder = new BlockBuilder();
    builder.add({
      station: { id: 'heath', name: 'Heath', latitude: 52.5, longitude: 9.25, elevation: 71 },
      source: 'x.csv',
      timeMs: Date.UTC(2024, 5, 1, 12),
      levels: { heightAgl: [40, 80, 80, NaN], speed: [5, NaN, 6, 7], direction: [350, 355, 0, 1] },
    });
    const document = JSON.parse(writeCoverageJson([builder.finish()])) as Record<string, unknown>;
    expect(document).toMatchObject({
      type: 'CoverageCollection',
      parameters: {
        wind_speed: {
          type: 'Parameter',
          unit: { symbol: { value: 'm/s', type: 'http://www.opengis.net/def/uom/UCUM/' } },
          observedProperty: { id: 'http://vocab.nerc.ac.uk/standard_name/wind_speed', label: { en: 'Wind speed' } },
        },
      },
      coverages: [
        {
          type: 'Coverage',
          domain: {
            type: 'Domain',
            domainType: 'VerticalProfile',
            // The doubled height and the level without one have no place on an axis.
            axes: {
              x: { values: [9.25] },
              y: { values: [52.5] },
              z: { values: [40, 80] },
              t: { values: ['2024-06-01T12:00:00.000Z'] },
            },
          },
          ranges: {
            wind_speed: { type: 'NdArray', dataType: 'float', axisNames: ['z'], shape: [2], values: [5, null] },
            wind_from_direction: { values: [350, 355] },
          },
        },
      ],
    });
  });
});

describe('coverageJson', () => {
  interface Made {
    type: string;
    domain: { type: string; domainType: string; axes: Record<string, object>; referencing: object[] };
    parameters: object;
    ranges: Record<string, unknown>;
    'duskveer:profile'?: object;
  }
  const ff = { type: 'NdArray', dataType: 'float', axisNames: ['t', 'z', 'y', 'x'], shape: [1, 3, 1, 1] };
  const profile = (change: (coverage: Made) => void = () => undefined): string => {
    const coverage: Made = {
      type: 'Coverage',
      domain: {
        type: 'Domain',
        domainType: 'VerticalProfile',
        axes: {
          x: { values: [9] },
          y: { values: [52] },
          z: { start: 110, stop: 310, num: 3 },
          t: { values: ['2024-06-01T12:00Z'] },
        },
        referencing: [
          { coordinates: ['z'], system: { type: 'VerticalCRS', id: 'http://www.opengis.net/def/crs/EPSG/0/5773' } },
        ],
      },
      parameters: {
        ff: {
          type: 'Parameter',
          unit: { symbol: { value: '[kn_i]' } },
          observedProperty: { id: 'http://vocab.nerc.ac.uk/standard_name/wind_speed', label: { en: 'Wind' } },
        },
        ta: { type: 'Parameter', unit: { symbol: 'Cel' }, observedProperty: { label: { de: 'Temperatur' } } },
      },
      ranges: {
        ff: { ...ff, values: [10, null, 30] },
        ta: { type: 'NdArray', dataType: 'float', axisNames: ['z'], shape: [3], values: [10, 9, 8] },
      },
    };
    change(coverage);
    return JSON.stringify(coverage);
  };
  const read = async (text: string): Promise<{ block: ProfileBlock; codes: string[] }> => {
    const { blocks, problems } = await readBytes('p.covjson', bytesOf(text));
    return { block: concatBlocks(blocks), codes: problems.map(({ code }) => code) };
  };

  it('reads another writer: axis by steps, heights above sea level, units of UCUM, all axes named', async () => {
    const site = { unknownElevation: await read(profile()) };
    expect(site.unknownElevation.codes).toEqual(['ingest/no-elevation']);
    const { block, codes } = await read(profile((coverage) => (coverage['duskveer:profile'] = { elevation_m: 10 })));
    expect(codes).toEqual([]);
    expect([...block.heightAgl]).toEqual([100, 200, 300]);
    expect(block.speed[0]).toBeCloseTo(5.14444, 4);
    expect(block.speed[1]).toBeNaN();
    expect(block.temperature![2]).toBeCloseTo(281.15, 3);
    expect(block.stations[0]).toMatchObject({ id: '52.000 9.000', latitude: 52, longitude: 9 });
    expect(block.timeMs[0]).toBe(Date.UTC(2024, 5, 1, 12));
  });

  const changes: [string, string, (coverage: Made) => void][] = [
    ['values kept elsewhere', 'ingest/coverage-range', ({ ranges }) => (ranges.ff = 'http://example.org/ff')],
    ['values that do not fit', 'ingest/coverage-range', ({ ranges }) => (ranges.ff = { ...ff, values: [1, 2] })],
    ['a path', 'ingest/coverage-unusable', ({ domain }) => (domain.axes = { composite: {} })],
    ['an absurd axis', 'ingest/coverage-unusable', ({ domain }) => (domain.axes.z = { start: 0, stop: 1, num: 1e15 })],
    [
      'pressures for heights',
      'ingest/netcdf-no-profiles',
      ({ domain }) => {
        const axis = { name: { en: 'Pressure' }, unit: { symbol: 'hPa' } };
        domain.referencing = [{ coordinates: ['z'], system: { cs: { csAxes: [axis] } } }];
      },
    ],
  ];
  it.each(changes)('says of %s what is wrong', async (_, code, change) => {
    const { codes } = await read(profile(change));
    expect(codes).toContain(code);
  });

  it('keeps the sound coverages of a collection and numbers the others', async () => {
    const sound = JSON.parse(
      profile((coverage) => (coverage['duskveer:profile'] = { elevation_m: 10, mark: ['few-beams', '', ''] })),
    ) as object;
    const text = JSON.stringify({ type: 'CoverageCollection', coverages: [sound, { type: 'Coverage' }, sound] });
    const { blocks, problems } = await readBytes('p.covjson', bytesOf(text));
    expect(blocks[0]!.profileCount).toBe(2);
    expect([...blocks[0]!.mark]).toEqual([MARK['few-beams'], 0, 0, MARK['few-beams'], 0, 0]);
    expect(problems.map(({ where }) => where.record)).toEqual([2]);
  });

  it('says that broken JSON is broken', async () => {
    const { codes } = await read(profile().slice(0, -5));
    expect(codes).toEqual(['ingest/coverage-damaged']);
  });

  it('survives any change of its parts (property)', async () => {
    const intact = bytesOf(profile());
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.tuple(fc.nat(intact.length - 1), fc.integer({ min: 32, max: 126 })), { maxLength: 6 }),
        async (changes) => {
          const bytes = intact.slice();
          for (const [at, byte] of changes) bytes[at] = byte;
          const { problems, blocks } = await readBytes('p.covjson', bytes);
          expect(problems.some(({ code }) => code === 'ingest/reader-failed')).toBe(false);
          expect(problems.length + blocks.length).toBeGreaterThan(0);
        },
      ),
      { numRuns: 300 },
    );
  });
});
