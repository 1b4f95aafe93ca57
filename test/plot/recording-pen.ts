// A pen that writes down what it is told to draw, for snapshots: one line a call, numbers to a tenth of a pixel, a style
// told only where it changed since the last mark on the canvas.

import type { Pen } from '../../src/plot/index.ts';

const STYLES = [
  'fillStyle',
  'strokeStyle',
  'lineWidth',
  'lineCap',
  'lineJoin',
  'font',
  'textAlign',
  'textBaseline',
  'globalAlpha',
] as const;
const MARKS = new Set(['stroke', 'fill', 'fillRect', 'strokeRect', 'fillText', 'strokeText']);

export interface Recording {
  readonly pen: Pen;
  /** All calls so far. */
  readonly lines: string[];
}

export function recordingPen(): Recording {
  const lines: string[] = [];
  const style: Record<string, unknown> = { globalAlpha: 1 };
  const told: Record<string, unknown> = { globalAlpha: 1 };
  const written = (value: unknown): string => {
    if (typeof value === 'number') return String(Number(value.toFixed(1)) + 0);
    return typeof value === 'string' ? value : JSON.stringify(value);
  };
  const call =
    (name: string) =>
    (...args: unknown[]): void => {
      if (MARKS.has(name)) {
        for (const key of STYLES) {
          if (style[key] === told[key] || style[key] === undefined) continue;
          lines.push(`${key} = ${written(style[key])}`);
          told[key] = style[key];
        }
      }
      lines.push(`${name} ${args.map(written).join(' ')}`.trim());
    };
  const pen = new Proxy(style, {
    get: (_, key: string) => {
      // Every letter is taken to be half its size wide.
      if (key === 'measureText') return (text: string) => ({ width: text.length * 0.5 * fontSize(style.font) });
      return key in style ? style[key] : call(key);
    },
    set: (_, key: string, value: unknown) => {
      style[key] = value;
      return true;
    },
  });
  return { pen: pen as unknown as Pen, lines };
}

function fontSize(font: unknown): number {
  return Number(/([\d.]+)px/.exec(String(font))?.[1] ?? 10);
}
