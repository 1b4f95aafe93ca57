import { describe, expect, it } from 'vitest';
import {
  drawSectionSheet,
  FIELDS,
  FONT,
  legendOf,
  sheetFrame,
  THEMES,
  type Look,
  type SectionSheet,
} from '../../src/plot/index.ts';
import { recordingPen } from './recording-pen.ts';

const look: Look = { theme: THEMES.light, ratio: 2, font: FONT };
const HOUR = 3_600_000;
const sheet: SectionSheet = {
  title: 'Larkmoor Ridge, night of 8 to 9 November 2024',
  source: 'Wind profiler, last profile 6 min old',
  foot: 'An aid to judgement.',
  legend: legendOf('speed', FIELDS.speed.range, 'light', 'm/s'),
  heightUnit: 'm',
  extent: { startMs: 0, endMs: 6 * HOUR, bottom: 0, top: 1000 },
  scene: {
    pictures: [],
    winds: null,
    hemisphere: 'north',
    speedUnit: 'm/s',
    discs: [{ name: 'a', hubHeight: 100, rotorDiameter: 120 }],
    threads: [],
    calls: [],
    light: [],
    nowMs: NaN,
    timeZone: 'UTC',
  },
};
const size = { width: 2400, height: 1400 };

describe('drawSectionSheet', () => {
  it('says title, source, axes with unit, legend with unit, caution and clock', () => {
    const { pen, lines } = recordingPen();
    drawSectionSheet(pen, size, sheet, look);
    const said = lines.filter((line) => line.startsWith('fillText')).join('\n');
    for (const words of [
      sheet.title,
      sheet.source,
      sheet.foot,
      'height above ground, m',
      '02:00',
      '400',
      ' m/s ',
      'clock of UTC',
    ]) {
      expect(said).toContain(words);
    }
  });

  it('keeps everything on the sheet', () => {
    const frame = sheetFrame(size, sheet, look);
    expect(frame.left + frame.width).toBeLessThan(size.width);
    expect(frame.top + frame.height).toBeLessThan(size.height - 200);
    const { pen, lines } = recordingPen();
    drawSectionSheet(pen, size, sheet, look);
    for (const line of lines.filter((candidate) => candidate.startsWith('fillText'))) {
      const [x, y] = line.split(' ').slice(-2).map(Number) as [number, number];
      expect(x).toBeLessThanOrEqual(size.width);
      expect(y).toBeLessThanOrEqual(size.height);
    }
  });

  it('draws the same every time', () => {
    const { pen, lines } = recordingPen();
    drawSectionSheet(pen, size, sheet, look);
    expect(
      lines.filter((line) => !line.startsWith('fillRect') && !line.startsWith('fillStyle = rgb')),
    ).toMatchSnapshot();
  });
});
