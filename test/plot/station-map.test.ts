import { describe, expect, it } from 'vitest';
import { drawStationMap, FONT, THEMES, type Look, type MapStation } from '../../src/plot/index.ts';
import { recordingPen } from './recording-pen.ts';

const look: Look = { theme: THEMES.dark, ratio: 1, font: FONT };
const place = { left: 0, top: 0, width: 400, height: 340 };
const at = (name: string, latitude: number, longitude: number, v = 10): MapStation => ({
  name,
  latitude,
  longitude,
  u: 0,
  v,
});

function drawn(stations: readonly MapStation[]): { lines: string[]; spot: (name: string) => { x: number; y: number } } {
  const { pen, lines } = recordingPen();
  drawStationMap(pen, { stations, words: ['words'], speedUnit: 'm/s' }, place, look);
  const dots = lines.filter((line) => /^arc .* 3\.5 /.test(line)).map((line) => line.split(' ').map(Number));
  return {
    lines,
    spot: (name) => {
      const dot = dots[stations.findIndex((station) => station.name === name)]!;
      return { x: dot[1]!, y: dot[2]! };
    },
  };
}

describe('station map', () => {
  it('lays north up, east right, both at one scale', () => {
    const { spot, lines } = drawn([at('A', 60, 10), at('B', 60, 12), at('C', 61, 10)]);
    const [a, b, c] = [spot('A'), spot('B'), spot('C')];
    expect(a.y).toBeCloseTo(b.y, 0);
    expect(a.x).toBeCloseTo(c.x, 0);
    expect(c.y).toBeLessThan(a.y);
    // At the mean latitude of 60.33 degrees two degrees eastward are 2 cos 60.33 = 0.990 of a degree northward.
    expect((b.x - a.x) / (a.y - c.y)).toBeCloseTo(0.99, 2);
    expect(lines).toContain('fillText N 386 303');
  });

  it('draws a scale bar of a round length, true to the map', () => {
    const { spot, lines } = drawn([at('A', 0, 0), at('B', 0, 1), at('C', 1, 0)]);
    const words = lines.find((line) => /^fillText \d+ km/.test(line))!;
    const kilometres = Number(/(\d+) km/.exec(words)![1]);
    // A degree of the mean sphere is 111.2 km.
    const perPixel = 111.195 / (spot('A').y - spot('C').y);
    const left = 8;
    const middle = Number(words.split(' ').at(-2));
    expect(2 * (middle - left) * perPixel).toBeCloseTo(kilometres, 0);
  });

  it('crosses the date line by the short way and says where a station has no wind', () => {
    const { spot, lines } = drawn([at('A', 0, 179.5), at('B', 0, -179.5), { ...at('C', 1, 180), u: NaN, v: NaN }]);
    expect(spot('B').x).toBeGreaterThan(spot('A').x);
    expect(lines.some((line) => line.startsWith('fillText no wind here'))).toBe(true);
  });

  it('does without positions', () => {
    expect(drawn([at('A', NaN, NaN)]).lines.join()).toContain('no station has a position');
    expect(drawn([at('A', 40, 5)]).lines.join()).not.toContain('NaN');
  });
});
