import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  colourScale,
  FIELDS,
  scaleColour,
  SectionPainter,
  type FieldName,
  type SectionGrid,
  type SectionView,
} from '../../src/plot/index.ts';
import { brutePixel } from './brute-force.ts';

/** A grid with gaps in time, cells of any length, gaps in height, ties, doubt. */
const grids = (field: FieldName): fc.Arbitrary<SectionGrid> =>
  fc
    .record({ columns: fc.integer({ min: 0, max: 70 }), rows: fc.integer({ min: 1, max: 40 }), seed: fc.nat() })
    .map(({ columns, rows, seed }) => {
      const random = generator(seed);
      const startMs = new Float64Array(columns);
      const endMs = new Float64Array(columns);
      let time = 0;
      for (let column = 0; column < columns; column++) {
        startMs[column] = time += random() < 0.2 ? Math.floor(random() * 5) : 0;
        endMs[column] = time += 1 + Math.floor(random() * 4);
      }
      const edges = new Float32Array(rows + 1);
      for (let row = 1; row <= rows; row++) edges[row] = edges[row - 1]! + 1 + Math.floor(random() * 30);
      const cells = columns * rows;
      const low = field === 'shear' ? -8 : 0;
      // Whole numbers, so that equal values and equal winds are common.
      const value = (): number => (random() < 0.2 ? NaN : low + Math.floor(random() * 17));
      const doubtWords = Math.ceil(rows / 32);
      const doubt = new Uint32Array(columns * doubtWords);
      for (let column = 0; column < columns; column++) {
        for (let row = 0; row < rows; row++) {
          if (random() < 0.05) doubt[column * doubtWords + (row >> 5)]! |= 1 << (row & 31);
        }
      }
      const values = Float32Array.from({ length: cells }, value);
      // A doubtful cell without a value is no cell.
      for (let at = 0; at < cells; at++) {
        const [column, row] = [Math.floor(at / rows), at % rows];
        if (Number.isNaN(values[at]!)) doubt[column * doubtWords + (row >> 5)]! &= ~(1 << (row & 31));
      }
      return {
        field,
        columnCount: columns,
        rowCount: rows,
        startMs,
        endMs,
        edges,
        values,
        strength: field === 'direction' ? values.map((each) => (Number.isNaN(each) ? -Infinity : value() || 0)) : null,
        doubt,
        doubtWords,
      };
    });

const views: fc.Arbitrary<SectionView> = fc
  .record({
    startMs: fc.double({ min: -20, max: 200, noNaN: true }),
    span: fc.double({ min: 0.5, max: 300, noNaN: true }),
    bottom: fc.double({ min: 0, max: 300, noNaN: true }),
    depth: fc.double({ min: 1, max: 900, noNaN: true }),
    width: fc.integer({ min: 1, max: 23 }),
    height: fc.integer({ min: 1, max: 19 }),
  })
  .map(({ startMs, span, bottom, depth, width, height }) => ({
    startMs,
    endMs: startMs + span,
    bottom,
    top: bottom + depth,
    width,
    height,
  }));

const range = { low: -8, high: 17 };

describe.each(['speed', 'shear', 'direction'] as const)('SectionPainter with %s', (field) => {
  const scale = colourScale(FIELDS[field].scale, 'dark');
  it('shows in each pixel exactly what brute force finds (property)', () => {
    fc.assert(
      fc.property(grids(field), views, (grid, view) => {
        const pixels = new SectionPainter(grid).paint(view, { scale, range, hatch: 0 });
        for (let y = 0; y < view.height; y++) {
          for (let x = 0; x < view.width; x++) {
            const at = 4 * (y * view.width + x);
            const { value } = brutePixel(grid, FIELDS[field].pixelRule, view, x, y);
            const want = scaleColour(scale, range, value);
            expect([...pixels.subarray(at, at + 4)]).toEqual(want === null ? [0, 0, 0, 0] : [...want, 255]);
          }
        }
      }),
      { numRuns: 60 },
    );
  });
});

describe('SectionPainter', () => {
  const scale = colourScale('speed', 'dark');

  it('hatches where anything doubtful falls in, and nowhere else (property)', () => {
    fc.assert(
      fc.property(grids('speed'), views, (grid, view) => {
        const painter = new SectionPainter(grid);
        const plain = painter.paint(view, { scale, range, hatch: 0 });
        const hatched = painter.paint(view, { scale, range, hatch: 1 });
        for (let y = 0; y < view.height; y++) {
          for (let x = 0; x < view.width; x++) {
            const at = 4 * (y * view.width + x) + 3;
            const { doubtful } = brutePixel(grid, 'greatest', view, x, y);
            expect(hatched[at]! < plain[at]!).toBe(doubtful);
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  it('fades by trust', () => {
    const grid: SectionGrid = {
      field: 'speed',
      columnCount: 2,
      rowCount: 1,
      startMs: Float64Array.of(0, 10),
      endMs: Float64Array.of(10, 20),
      edges: Float32Array.of(0, 100),
      values: Float32Array.of(5, 5),
      strength: null,
      doubt: new Uint32Array(2),
      doubtWords: 1,
    };
    const view = { startMs: 0, endMs: 20, bottom: 0, top: 100, width: 4, height: 1 };
    const pixels = new SectionPainter(grid).paint(view, { scale, range, trust: Float32Array.of(1, 0.5) });
    expect([3, 7, 11, 15].map((at) => pixels[at])).toEqual([255, 255, 128, 128]);
  });

  it('paints again into the same bytes', () => {
    fc.assert(
      fc.property(grids('speed'), views, views, (grid, first, second) => {
        const painter = new SectionPainter(grid);
        const size = { width: 12, height: 7 };
        const out = painter.paint({ ...first, ...size }, { scale, range });
        painter.paint({ ...second, ...size }, { scale, range }, out);
        expect(out).toEqual(new SectionPainter(grid).paint({ ...second, ...size }, { scale, range }));
      }),
      { numRuns: 30 },
    );
  });
});

/** A linear congruential generator (multiplier and increment from Numerical Recipes, 2nd ed., section 7.1). */
function generator(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state >>> 8) / 2 ** 24;
  };
}
