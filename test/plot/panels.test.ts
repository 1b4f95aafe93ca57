import { describe, expect, it } from 'vitest';
import {
  colourScale,
  drawHodograph,
  drawLegend,
  drawProfiles,
  FIELDS,
  FONT,
  hodographScale,
  legendOf,
  THEMES,
  type Frame,
  type Look,
} from '../../src/plot/index.ts';
import {
  BlockBuilder,
  MARK,
  profileAt,
  unplacedStation,
  type LevelInput,
  type Profile,
} from '../../src/profile/index.ts';
import { recordingPen } from './recording-pen.ts';

const look: Look = { theme: THEMES.dark, ratio: 1, font: FONT };
const frame: Frame = { left: 0, top: 0, width: 240, height: 500, xLow: 0, xHigh: 24, yLow: 0, yHigh: 1000 };
const style = { scale: colourScale('speed', 'dark'), range: FIELDS.speed.range };

const profileOf = (levels: LevelInput): Profile => {
  const builder = new BlockBuilder();
  builder.add({ station: unplacedStation('here'), source: 'a', timeMs: 0, levels });
  return profileAt(builder.finish(), 0);
};
const named = (lines: string[], name: string): string[] => lines.filter((line) => line.split(' ')[0] === name);

describe('drawProfiles', () => {
  const profile = profileOf({
    heightAgl: [100, 200, 300, 400, 800, 900],
    speed: [4, 8, 12, 8, 6, 6],
    mark: [0, 0, 0, 0, 0, MARK['low-signal']],
  });

  it('joins neighbours, not over a gap, and leaves out rejected levels', () => {
    const { pen, lines } = recordingPen();
    drawProfiles(pen, frame, { profile }, [], look, style);
    expect(named(lines, 'moveTo')).toEqual(['moveTo 40 450', 'moveTo 60 100']);
    expect(named(lines, 'lineTo')).toEqual(['lineTo 80 400', 'lineTo 120 350', 'lineTo 80 300']);
    expect(named(lines, 'arc')).toHaveLength(5);
  });

  it('keeps labels of profiles apart', () => {
    const { pen, lines } = recordingPen();
    const earlier = profileOf({ heightAgl: [100, 200, 300, 400], speed: [4, 9, 13, 9] });
    drawProfiles(pen, frame, { profile, label: '02:40' }, [{ profile: earlier, label: '00:00' }], look, style);
    expect(named(lines, 'fillText')).toEqual(['fillText 02:40 131 350', 'fillText 00:00 101 400']);
  });

  it('draws the same every time', () => {
    const { pen, lines } = recordingPen();
    drawProfiles(pen, frame, { profile, label: '02:40' }, [], look, { ...style, nose: { height: 300, speed: 12 } });
    expect(lines).toMatchSnapshot();
  });

  it('draws nothing of nothing', () => {
    const { pen, lines } = recordingPen();
    drawProfiles(pen, frame, null, [], look, style);
    expect(named(lines, 'stroke')).toEqual([]);
  });
});

describe('hodograph', () => {
  const place = { x: 100, y: 100, radius: 100, unit: 'm/s' } as const;

  it('puts rings at round speeds of the reader’s unit', () => {
    const rings = (speed: number, unit: 'm/s' | 'kt'): readonly number[] =>
      hodographScale(
        { profile: profileOf({ heightAgl: [100], speed: [speed], direction: [200] }), ceiling: 1000 },
        { ...place, unit },
      ).rings;
    expect(rings(17, 'm/s')).toEqual([5, 10, 15, 20]);
    expect(rings(17, 'kt')).toEqual([10, 20, 30, 40]);
    expect(rings(3, 'm/s')).toEqual([2, 4]);
  });

  it('puts a south wind at the top and a west wind at the right', () => {
    const { pen, lines } = recordingPen();
    const profile = profileOf({ heightAgl: [100, 200], speed: [20, 20], direction: [180, 270] });
    drawHodograph(pen, { profile, ceiling: 1000 }, { ...place, outer: 20 }, look);
    const path = lines.slice(lines.indexOf('fillText 20 196 97') + 1);
    expect(named(path, 'moveTo')).toEqual(['moveTo 100 0']);
    expect(named(path, 'lineTo')).toEqual(['lineTo 200 100']);
  });

  it('draws the same every time', () => {
    const { pen, lines } = recordingPen();
    const profile = profileOf({ heightAgl: [100, 200, 300], speed: [5, 12, 9], direction: [180, 200, 230] });
    const trail = { speed: [10, NaN, 12, 13], direction: [170, NaN, 190, 200] };
    const turning = { speed: [11, 12, 13], direction: [170, 185, 200] };
    drawHodograph(pen, { profile, ceiling: 1000, trail, turning, nose: { speed: 12, direction: 200 } }, place, look);
    expect(lines).toMatchSnapshot();
  });
});

describe('legend', () => {
  it('tells both ends where these are round, and says the same in words', () => {
    const legend = legendOf('speed', { low: 0, high: 24 }, 'dark', 'm/s');
    expect(legend.ticks.map((tick) => tick.label)).toEqual(['0', '6', '12', '18', '24']);
    expect(legend.words).toBe('Colour shows wind speed from 0 to 24 m/s: the lighter, the more.');
    expect(legendOf('speed', { low: 0, high: 24 }, 'light', 'kt').ticks.map((tick) => tick.label)).toEqual([
      '0',
      '10',
      '20',
      '30',
      '40',
    ]);
    expect(legendOf('shear', FIELDS.shear.range, 'dark', 'm/s').ticks.map((tick) => tick.label)).toEqual([
      '−6',
      '−3',
      '0',
      '3',
      '6',
    ]);
    expect(legendOf('temperature', FIELDS.temperature.range, 'dark', 'm/s').ticks[0]!.label).toBe('−10');
    expect(legendOf('humidity-flux', FIELDS['humidity-flux'].range, 'dark', 'm/s').unit).toBe('g/m²/s');
  });

  it('tells the compass by letters', () => {
    expect(legendOf('direction', { low: 0, high: 360 }, 'dark', 'm/s').ticks.map((tick) => tick.label)).toEqual([
      'N',
      'E',
      'S',
      'W',
      'N',
    ]);
  });

  it('draws the strip as wide as told', () => {
    const { pen, lines } = recordingPen();
    drawLegend(pen, 10, 5, 256, legendOf('speed', { low: 0, high: 24 }, 'dark', 'm/s'), look);
    expect(named(lines, 'fillRect')).toHaveLength(256);
    expect(named(lines, 'fillText').at(0)).toBe('fillText 0 10 28');
    expect(named(lines, 'fillText').at(-1)).toBe('fillText m/s 274 14');
  });
});
