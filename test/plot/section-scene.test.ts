import { describe, expect, it } from 'vitest';
import {
  drawDiscs,
  drawNightStrip,
  drawSectionOver,
  drawSectionUnder,
  drawThread,
  FONT,
  pickBarbs,
  THEMES,
  WindLookup,
  xPixel,
  xValue,
  yPixel,
  yValue,
  type Frame,
  type Look,
  type SectionScene,
  type Thread,
} from '../../src/plot/index.ts';
import { BlockBuilder, MARK, unplacedStation } from '../../src/profile/index.ts';
import { recordingPen } from './recording-pen.ts';

const look: Look = { theme: THEMES.dark, ratio: 1, font: FONT };
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
/** Ten hours across 1000 pixels, 1000 m up 500 pixels. */
const frame: Frame = { left: 100, top: 10, width: 1000, height: 500, xLow: 0, xHigh: 10 * HOUR, yLow: 0, yHigh: 1000 };

const count = (lines: string[], name: string): number => lines.filter((line) => line.split(' ')[0] === name).length;

describe('frame', () => {
  it('maps values to pixels and back', () => {
    expect([xPixel(frame, 5 * HOUR), yPixel(frame, 250)]).toEqual([600, 385]);
    expect([xValue(frame, 600), yValue(frame, 385)]).toEqual([5 * HOUR, 250]);
  });
});

describe('drawThread', () => {
  const thread: Thread = {
    timeMs: [0, 1, 2, 3, 6, 7].map((hour) => hour * HOUR),
    height: [300, 320, NaN, 340, 360, 380],
    kind: 'observed',
    joinMs: 1.5 * HOUR,
  };

  it('breaks at a missing nose and over a gap, and shows a lone point', () => {
    const { pen, lines } = recordingPen();
    drawThread(pen, frame, thread, look);
    // Two runs of two points, each with its halo, and one dot of two rings.
    expect(count(lines, 'stroke')).toBe(4);
    expect(count(lines, 'arc')).toBe(2);
    expect(count(lines, 'fill')).toBe(2);
  });

  it('draws the outlook dashed in its band', () => {
    const { pen, lines } = recordingPen();
    const outlook = { timeMs: [0, HOUR], height: [300, 340], low: [280, NaN], high: [320, 400], joinMs: HOUR } as const;
    drawThread(pen, frame, { ...outlook, kind: 'outlook' }, look);
    expect(lines).toContain('setLineDash [7,5]');
    expect(lines).toMatchSnapshot();
  });
});

describe('drawDiscs', () => {
  it('stands to scale: tower to the hub, radius half the diameter', () => {
    const { pen, lines } = recordingPen();
    drawDiscs(pen, frame, [{ name: 'a', hubHeight: 100, rotorDiameter: 120 }], look);
    // 1000 m up 500 pixels: hub 50 pixels above the ground, radius 30.
    expect(lines).toContain('ellipse 91 460 4 30 0 0 6.3');
    expect(lines).toContain('lineTo 91 460');
  });

  it('shows none whose hub is out of view', () => {
    const { pen, lines } = recordingPen();
    drawDiscs(pen, { ...frame, yLow: 200 }, [{ name: 'a', hubHeight: 100, rotorDiameter: 120 }], look);
    expect(lines).toEqual([]);
  });
});

describe('drawNightStrip', () => {
  const timeText = (timeMs: number): string => `${timeMs / HOUR} h`;
  it('names sunset and sunrise where they are', () => {
    const { pen, lines } = recordingPen();
    const ends = [-1, 2, 3, 8, 9, 11].map((hour) => hour * HOUR);
    const lights = ['day', 'dusk', 'night', 'dusk', 'day'] as const;
    const spans = lights.map((light, k) => ({ light, startMs: ends[k]!, endMs: ends[k + 1]! }));
    drawNightStrip(pen, frame, 520, spans, look, { timeText });
    expect(lines.filter((line) => line.startsWith('fillText'))).toEqual([
      'fillText sunset 2 h 270 545',
      'fillText sunrise 9 h 967 545',
    ]);
    expect(count(lines, 'fillRect')).toBe(5);
  });

  it('says so where the position is not known', () => {
    const { pen, lines } = recordingPen();
    drawNightStrip(pen, frame, 520, [{ light: 'unknown', startMs: 0, endMs: 10 * HOUR }], look, { timeText });
    expect(count(lines, 'fillRect')).toBe(0);
    expect(lines.join()).toContain('no position');
  });
});

const station = unplacedStation('here');
const winds = (): WindLookup => {
  const builder = new BlockBuilder();
  for (let k = 0; k < 60; k++) {
    const levels = {
      heightAgl: [50, 150, 250, 350, 450],
      speed: [5, 6, 7, 8, 9],
      direction: [200, 210, 220, 230, 240],
      mark: [0, 0, MARK['low-signal'], 0, 0],
    };
    if (k < 20 || k >= 40) builder.add({ station, source: 'a', timeMs: k * 10 * MINUTE, levels });
  }
  return new WindLookup([builder.finish()]);
};

describe('WindLookup', () => {
  it('finds the nearest profile and the nearest usable level, none beyond the bounds', () => {
    const found = winds().profileNear(44 * MINUTE, 5 * MINUTE)!;
    expect(found.block.timeMs[found.index]).toBe(40 * MINUTE);
    expect(winds().profileNear(300 * MINUTE, 30 * MINUTE)).toBeNull();
    expect(WindLookup.levelNear(found.block, found.index, 240, 200)?.height).toBe(150);
    expect(WindLookup.levelNear(found.block, found.index, 800, 200)).toBeNull();
  });
});

describe('pickBarbs', () => {
  it('takes measured winds only, about one to a tile, none in gaps', () => {
    const picked = pickBarbs(winds(), frame, look);
    // 64 and 56 pixels are 38 minutes and 112 m, so tiles of an hour and 125 m.
    const times = [...new Set(picked.map((wind) => wind.timeMs / MINUTE))];
    expect(times).toEqual([30, 90, 150, 190, 400, 450, 510, 570]);
    expect([...new Set(picked.map((wind) => wind.height))]).toEqual([50, 150, 350, 450]);
    picked.forEach((wind) => expect(wind.speed).toBe(5 + [50, 150, 250, 350, 450].indexOf(wind.height)));
  });

  it('draws none where one wind would have to speak for too long', () => {
    expect(pickBarbs(winds(), { ...frame, xHigh: 1000 * HOUR }, look)).toEqual([]);
  });
});

describe('a scene', () => {
  const scene: SectionScene = {
    pictures: [],
    winds: winds(),
    hemisphere: 'south',
    speedUnit: 'm/s',
    discs: [{ name: 'a', hubHeight: 100, rotorDiameter: 120 }],
    threads: [{ timeMs: [0, HOUR, 2 * HOUR], height: [300, 320, 310], kind: 'observed', joinMs: HOUR }],
    calls: [
      { startMs: 9.5 * HOUR, endMs: 9.9 * HOUR, bottom: 10, top: 60, words: 'fall 30 MW, 70 in 100' },
      { startMs: 12 * HOUR, endMs: 13 * HOUR, bottom: 10, top: 60, words: 'out of view' },
    ],
    light: [{ light: 'night', startMs: 0, endMs: 10 * HOUR }],
    nowMs: 2 * HOUR + 10 * MINUTE,
    aheadWords: 'outlook',
    timeZone: 'UTC',
  };

  it('draws the same every time', () => {
    const { pen, lines } = recordingPen();
    drawSectionUnder(pen, frame, scene, look);
    drawSectionOver(pen, frame, { ...scene, winds: null }, look);
    expect(lines).toMatchSnapshot();
  });

  it('keeps words of a call inside the frame, and leaves out what is out of view', () => {
    const { pen, lines } = recordingPen();
    drawSectionOver(pen, frame, scene, look);
    const words = lines.find((line) => line.startsWith('fillText fall'))!;
    // 21 letters of 6.5 pixels: begins 140.5 left of the right edge.
    expect(words).toBe('fillText fall 30 MW, 70 in 100 959.5 474');
    expect(lines.join()).not.toContain('out of view');
  });

  it('has no now line on a night long past', () => {
    const { pen, lines } = recordingPen();
    drawSectionOver(pen, frame, { ...scene, nowMs: NaN }, look);
    expect(lines.join()).not.toContain('now');
  });
});
