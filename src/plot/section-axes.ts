// Chart options for the section and for the profile beside it: the library draws axes and keeps the cursor, the house draws
// what is inside. Both panels have the same room above and below, so that they share the height axis to the pixel.

import type uPlot from 'uplot';
import { toHeightUnit, toSpeedUnit, type HeightUnit, type SpeedUnit } from '../air/index.ts';
import type { Frame, Look } from './pen.ts';
import type { SectionExtent } from './section-extent.ts';
import { discsWidth, ROOM_BELOW } from './section-scene.ts';
import { frameOf, timeAxis, valueAxis } from './uplot-adapter.ts';

interface PanelOptions {
  /** CSS pixels of the whole panel, axes included. */
  readonly width: number;
  readonly height: number;
  readonly look: Look;
  readonly heightUnit: HeightUnit;
  /** Draws under the grid lines. */
  readonly drawUnder: (context: CanvasRenderingContext2D, frame: Frame) => void;
  /** Draws over them. */
  readonly drawOver: (context: CanvasRenderingContext2D, frame: Frame) => void;
  /** Told where the cursor stands, null when it leaves. Nothing is redrawn. */
  readonly onCursor?: (at: { readonly x: number; readonly height: number } | null) => void;
}

export interface SectionAxesOptions extends PanelOptions {
  readonly extent: SectionExtent;
  readonly timeZone: string;
  /** Turbine types that stand between axis numbers and frame. */
  readonly discCount: number;
  /** Told when the reader has drawn a frame to zoom into, and with null for the way back. */
  readonly onZoom?: (extent: SectionExtent | null) => void;
}

export interface ProfileAxesOptions extends PanelOptions {
  readonly bottom: number;
  readonly top: number;
  /** Right end of the speed axis, m/s. */
  readonly fastest: number;
  readonly speedUnit: SpeedUnit;
}

/** CSS pixels above the frame, and from the frame to the right edge: half a number's width. */
export const ROOM_ABOVE = 8;
const ROOM_RIGHT = 22;
const NUMBERS_WIDTH = 46;
const LABEL_WIDTH = 20;

/** Options for a section; its scales are `x` and `height`. Give it `emptyData`. */
export function sectionOptions(options: SectionAxesOptions): uPlot.Options {
  const { extent, look, timeZone, heightUnit, discCount, onZoom } = options;
  const gap = 8 + discsWidth(discCount);
  return {
    ...panelOptions(options),
    scales: {
      x: { time: false, auto: false, min: extent.startMs, max: extent.endMs },
      height: { auto: false, min: extent.bottom, max: extent.top },
    },
    axes: [
      { ...timeAxis(look, timeZone), size: ROOM_BELOW, gap: 8 },
      {
        ...valueAxis(look, 60, toHeightUnit(1, heightUnit)),
        scale: 'height',
        gap,
        size: gap + NUMBERS_WIDTH,
        label: `height above ground, ${heightUnit}`,
        labelSize: LABEL_WIDTH,
        labelGap: 2,
      },
    ],
    cursor: {
      points: { show: false },
      drag: { x: true, y: true, uni: 24, dist: 4, setScale: false },
      bind: {
        dblclick: () => () => {
          onZoom?.(null);
          return null;
        },
      },
    },
    hooks: {
      ...panelHooks(options, 'x'),
      setSelect: [
        (chart) => {
          const { left, top, width, height } = chart.select;
          if (width <= 0 && height <= 0) return;
          onZoom?.({
            startMs: chart.posToVal(left, 'x'),
            endMs: chart.posToVal(left + width, 'x'),
            bottom: chart.posToVal(top + height, 'height'),
            top: chart.posToVal(top, 'height'),
          });
          chart.setSelect({ left: 0, top: 0, width: 0, height: 0 }, false);
        },
      ],
    },
  };
}

/** Options for the profile panel; its scales are `x` (speed) and `height`. Give it `emptyData`. */
export function profileOptions(options: ProfileAxesOptions): uPlot.Options {
  const { look, bottom, top, fastest, speedUnit, heightUnit } = options;
  return {
    ...panelOptions(options),
    padding: [ROOM_ABOVE, ROOM_RIGHT, 0, ROOM_RIGHT],
    scales: {
      x: { time: false, auto: false, min: 0, max: fastest },
      height: { auto: false, min: bottom, max: top },
    },
    axes: [
      { ...valueAxis(look, 56, toSpeedUnit(1, speedUnit)), size: ROOM_BELOW, gap: 8 },
      { ...valueAxis(look, 60, toHeightUnit(1, heightUnit)), scale: 'height', size: 0, values: () => [] },
    ],
    cursor: { x: false, points: { show: false }, drag: { x: false, y: false, setScale: false } },
    hooks: panelHooks(options, 'x'),
  };
}

/** The library wants data where the house draws itself: two ends, nothing between. */
export function emptyData(low: number, high: number): uPlot.AlignedData {
  return [
    [low, high],
    [null, null],
  ];
}

/** Brings a section to another extent in one redraw. */
export function showExtent(chart: uPlot, { startMs, endMs, bottom, top }: SectionExtent): void {
  chart.batch(() => {
    chart.setScale('x', { min: startMs, max: endMs });
    chart.setScale('height', { min: bottom, max: top });
  });
}

/** Moves a panel's cursor to a height, and to a place across if one is given; null takes it away. Nothing is redrawn. */
export function showCursor(chart: uPlot, at: { readonly x?: number; readonly height: number } | null): void {
  if (at === null) {
    chart.setCursor({ left: -10, top: -10 }, false);
    return;
  }
  const left = at.x === undefined ? 0 : chart.valToPos(at.x, 'x');
  chart.setCursor({ left, top: chart.valToPos(at.height, 'height') }, false);
}

function panelOptions({
  width,
  height,
}: PanelOptions): Pick<uPlot.Options, 'width' | 'height' | 'padding' | 'legend' | 'series'> {
  return {
    width,
    height,
    padding: [ROOM_ABOVE, ROOM_RIGHT, 0, 0],
    legend: { show: false },
    series: [{}, { scale: 'height', show: true }],
  };
}

function panelHooks({ drawUnder, drawOver, onCursor }: PanelOptions, xScale: string): uPlot.Hooks.Arrays {
  return {
    drawClear: [(chart) => keepStyle(chart.ctx, () => drawUnder(chart.ctx, frameOf(chart, xScale, 'height')))],
    draw: [(chart) => keepStyle(chart.ctx, () => drawOver(chart.ctx, frameOf(chart, xScale, 'height')))],
    setCursor: [
      (chart) => {
        const { left = -1, top = -1 } = chart.cursor;
        if (left < 0 || top < 0) onCursor?.(null);
        else onCursor?.({ x: chart.posToVal(left, xScale), height: chart.posToVal(top, 'height') });
      },
    ],
  };
}

/** The library remembers what style it set last and does not set it again: it must find it as it left it. */
function keepStyle(context: CanvasRenderingContext2D, draw: () => void): void {
  context.save();
  draw();
  context.restore();
}
