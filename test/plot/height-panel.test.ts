import { describe, expect, it } from 'vitest';
import { drawHeightPanel, FONT, heightPanelRange, THEMES, type HeightPanel } from '../../src/plot/index.ts';
import { recordingPen } from './recording-pen.ts';

const panel: HeightPanel = {
  lines: [{ heightAgl: [0, 500, 1000, 2000], value: [-1, NaN, 3, 90], spread: [0.5, NaN, NaN, 1] }],
  title: 'test, 1/s',
  factor: 1,
  offset: 0,
  layer: { bottom: 200, top: 400 },
  zero: true,
  heightUnit: 'm',
  heights: true,
};

describe('height panel', () => {
  it('spans what lies between the heights in view, with its spread and zero', () => {
    const { low, high } = heightPanelRange(panel, 0, 1000);
    // From -1.5 to 3 with six hundredths to spare.
    expect(low).toBeCloseTo(-1.5 - 0.27, 9);
    expect(high).toBeCloseTo(3.27, 9);
    expect(heightPanelRange({ ...panel, lines: [] }, 0, 1000)).toEqual({ low: 0, high: 1 });
    const positive = { ...panel, lines: [{ heightAgl: [0, 10], value: [2, 4] }] };
    expect(heightPanelRange(positive, 0, 1000).low).toBe(0);
  });

  it('breaks its line where a value is missing', () => {
    const { pen, lines } = recordingPen();
    const frame = { left: 50, top: 0, width: 100, height: 100, xLow: -2, xHigh: 4, yLow: 0, yHigh: 2000 };
    drawHeightPanel(pen, frame, panel, { theme: THEMES.dark, ratio: 1, font: FONT });
    expect(lines.join('\n')).not.toContain('NaN');
    // -1 of -2 to 4 is a sixth of the way across; 3 five sixths, at half of the height.
    expect(lines).toContain('moveTo 66.7 100');
    expect(lines).toContain('moveTo 133.3 50');
  });
});
