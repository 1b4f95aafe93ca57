import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  colourScale,
  drawInflow,
  drawInflowCursor,
  drawInflowSheet,
  drawStormHodograph,
  FIELDS,
  FONT,
  inflowFrames,
  THEMES,
  windAtHeight,
  windPlane,
  type InflowScene,
  type Look,
  type StormHodograph,
} from '../../src/plot/index.ts';
import { recordingPen } from './recording-pen.ts';

const look: Look = { theme: THEMES.dark, ratio: 1, font: FONT };
const colours = { scale: colourScale('speed', 'dark'), range: FIELDS.speed.range };
const heights = [0, 500, 1500, 3000, 6000];
const wind = { count: 5, heightAgl: heights, u: [0, 2, 5, 8, 20], v: [3, 15, 10, 6, 4] };
const scene: InflowScene = {
  air: {
    heightAgl: heights,
    pressure: [96_000, 90_700, 80_800, 67_300, 45_600],
    temperature: [298, 299, 291, 279, 257],
    dewPoint: [291, 289, 284, 262, NaN],
  },
  wind,
  windTop: 3000,
  parcel: {
    name: 'jet-fed',
    heightAgl: [500, 1200, 3000, 6000],
    temperature: [299, 292.2, 284, 264],
    virtualTemperature: [301, 293.5, 286, 265],
    surroundings: [301, 294.5, 280, 257.5],
    lcl: 1200,
    lfc: 1500,
    el: 11_000,
    cape: 1500,
    cin: -20,
  },
  layers: [{ name: 'jet’s layer', bottom: 300, top: 1200 }],
  nose: { height: 500, speed: 15.1 },
  top: 5000,
  hemisphere: 'north',
  speedUnit: 'm/s',
  heightUnit: 'm',
};
const hodograph: StormHodograph = {
  wind,
  windTop: 3000,
  ceiling: 10_000,
  nose: { height: 500, u: 2, v: 15 },
  vectors: [
    { name: 'storm motion', u: 4, v: 3, mark: 'motion' },
    { name: 'builds upwind', u: 10, v: -8, mark: 'arrow' },
    { name: 'cloud layer', u: 12, v: 7, mark: 'dot' },
    { name: 'left mover', u: NaN, v: NaN, mark: 'dot' },
  ],
  shaded: { bottom: 0, top: 3000 },
  speedUnit: 'm/s',
  heightUnit: 'm',
  colours,
};
const texts = (lines: string[]): string[] =>
  lines
    .filter((line) => line.startsWith('fillText'))
    .map((line) => line.replace(/^fillText (.*) -?[\d.]+ -?[\d.]+$/, '$1'));

describe('drawInflow', () => {
  it('stands diagram, barbs and speed on one height axis', () => {
    const { diagram, barbs, speed } = inflowFrames({ left: 0, top: 0, width: 900, height: 500 }, scene, look);
    for (const frame of [barbs, speed]) {
      expect([frame.top, frame.height, frame.yLow, frame.yHigh]).toEqual([
        diagram.top,
        diagram.height,
        diagram.yLow,
        diagram.yHigh,
      ]);
    }
    expect(diagram.left + diagram.width).toBeLessThan(barbs.left);
    expect(barbs.left + barbs.width).toBeLessThan(speed.left);
    expect(speed.left + speed.width).toBeLessThanOrEqual(900);
    expect(speed.xHigh).toBeGreaterThan(15.1);
  });

  it('shows all lines in view, whatever the air (property)', () => {
    fc.assert(
      fc.property(fc.integer({ min: 220, max: 320 }), fc.integer({ min: 0, max: 25 }), (temperature, spread) => {
        const air = {
          ...scene.air,
          temperature: heights.map((z) => temperature - 0.0065 * z),
          dewPoint: heights.map((z) => temperature - 0.0065 * z - spread),
        };
        const { diagram } = inflowFrames(
          { left: 0, top: 0, width: 900, height: 500 },
          { ...scene, air, parcel: null },
          look,
        );
        const across = heights.filter((z) => z <= 5000).map((z) => temperature - 0.0065 * z + 0.009761 * z);
        expect(diagram.xLow).toBeLessThan(Math.min(...across) - spread);
        expect(diagram.xHigh).toBeGreaterThan(Math.max(...across));
      }),
    );
  });

  it('names lines, heights and what lies above the picture in words', () => {
    const { pen, lines } = recordingPen();
    drawInflow(pen, { width: 900, height: 500 }, scene, look, colours);
    expect(texts(lines)).toEqual(
      expect.arrayContaining([
        'temperature',
        'dew point',
        'jet-fed parcel',
        'condensation (LCL)',
        'free convection (LFC)',
        'equilibrium (EL) above the picture',
        'jet’s layer',
        'nose',
        'temperature °C, carried to the ground',
        'wind m/s',
      ]),
    );
  });

  it('draws the same every time', () => {
    const { pen, lines } = recordingPen();
    drawInflow(pen, { width: 600, height: 300 }, { ...scene, top: 3000 }, look, colours);
    expect(lines).toMatchSnapshot();
  });

  it('draws wind alone where there is no air, and air alone where there is no wind', () => {
    const none = { heightAgl: [], pressure: [], temperature: [], dewPoint: [] };
    for (const bare of [
      { ...scene, air: none, parcel: null },
      { ...scene, wind: { count: 0, heightAgl: [], u: [], v: [] }, nose: null },
    ]) {
      const { pen, lines } = recordingPen();
      drawInflow(pen, { width: 900, height: 500 }, bare, look, colours);
      expect(lines.join('\n')).not.toMatch(/NaN|Infinity/);
    }
  });

  it('puts the cursor’s dots on the curves at one height', () => {
    const { pen, lines } = recordingPen();
    const frames = inflowFrames({ left: 0, top: 0, width: 900, height: 500 }, scene, look);
    const at = { height: 500, temperature: 299, dewPoint: 289, parcelVirtual: NaN, speed: 15.1 };
    drawInflowCursor(pen, frames, at, look);
    const arcs = lines.filter((line) => line.startsWith('arc')).map((line) => line.split(' '));
    expect(arcs).toHaveLength(3);
    expect(new Set(arcs.map((arc) => arc[2])).size).toBe(1);
  });

  it('writes title, sources and caution on the sheet', () => {
    const { pen, lines } = recordingPen();
    const sheet = {
      title: 'Plain, 1 July',
      lines: ['Wind: here.', 'Air: there.'],
      foot: 'An aid.',
      scene,
      hodograph,
      colours,
    };
    drawInflowSheet(pen, { width: 1600, height: 900 }, sheet, look);
    expect(texts(lines)).toEqual(
      expect.arrayContaining(['Plain, 1 July', 'Wind: here.', 'Air: there.', 'An aid.', 'builds upwind']),
    );
  });
});

describe('the storm’s hodograph', () => {
  const box = { left: 10, top: 20, width: 400, height: 300 };

  it('comes back to the wind that it was given, with one scale for both axes (property)', () => {
    const plane = windPlane(hodograph, box, look);
    fc.assert(
      fc.property(
        fc.double({ min: -60, max: 60, noNaN: true }),
        fc.double({ min: -60, max: 60, noNaN: true }),
        (u, v) => {
          const [backU, backV] = plane.wind(...plane.point(u, v));
          expect(backU).toBeCloseTo(u, 9);
          expect(backV).toBeCloseTo(v, 9);
        },
      ),
    );
    const [x0, y0] = plane.point(0, 0);
    expect(plane.point(1, 0)[0] - x0).toBeCloseTo(y0 - plane.point(0, 1)[1], 9);
  });

  it('holds every wind and motion in the box, and stands still while the motion is dragged', () => {
    const plane = windPlane(hodograph, box, look);
    for (let k = 0; k < wind.count; k++) {
      const [x, y] = plane.point(wind.u[k]!, wind.v[k]!);
      expect(x).toBeGreaterThan(box.left);
      expect(x).toBeLessThan(box.left + box.width);
      expect(y).toBeGreaterThan(box.top);
      expect(y).toBeLessThan(box.top + box.height);
    }
    const dragged = {
      ...hodograph,
      vectors: hodograph.vectors.map((one) => (one.mark === 'motion' ? { ...one, u: 80 } : one)),
    };
    expect(windPlane(dragged, box, look).point(0, 0)).toEqual(plane.point(0, 0));
  });

  it('names heights, nose and motions, and leaves out what is not known', () => {
    const { pen, lines } = recordingPen();
    drawStormHodograph(pen, hodograph, box, look);
    const said = texts(lines);
    expect(said).toEqual(
      expect.arrayContaining(['nose', '500 m', '1 km', '3 km', '6 km', 'storm motion', 'builds upwind', 'cloud layer']),
    );
    expect(said).not.toContain('left mover');
    expect(lines.join('\n')).not.toMatch(/NaN/);
  });

  it('draws the same every time', () => {
    const { pen, lines } = recordingPen();
    drawStormHodograph(pen, hodograph, box, look);
    expect(lines).toMatchSnapshot();
  });

  it('interpolates between levels and nowhere else', () => {
    expect(windAtHeight(wind, 1000)).toEqual([3.5, 12.5]);
    expect(windAtHeight(wind, 6000)).toEqual([20, 4]);
    expect(windAtHeight(wind, 6001)).toBeNull();
  });
});
