// A painted section kept as a picture, so that it can be drawn again at once while the next one is still being painted.

import { within, xPixel, yPixel, type Frame, type Pen } from './pen.ts';
import type { SectionView } from './pixel-ranges.ts';

type Canvas = Pick<OffscreenCanvas, 'width' | 'height' | 'getContext'>;

export class SectionPicture {
  readonly #canvas: Canvas;
  #view: SectionView | null = null;

  /** @param canvas where the picture is kept; its own unless told */
  constructor(canvas: Canvas = new OffscreenCanvas(1, 1)) {
    this.#canvas = canvas;
  }

  /** The view that the picture shows; null before the first. */
  get view(): SectionView | null {
    return this.#view;
  }

  /** Takes over what the painter painted of a view. */
  set(pixels: Uint8ClampedArray<ArrayBuffer>, view: SectionView): void {
    if (this.#canvas.width !== view.width) this.#canvas.width = view.width;
    if (this.#canvas.height !== view.height) this.#canvas.height = view.height;
    const context = this.#canvas.getContext('2d') as OffscreenCanvasRenderingContext2D;
    context.putImageData(new ImageData(pixels, view.width, view.height), 0, 0);
    this.#view = view;
  }

  clear(): void {
    this.#view = null;
  }

  /** Draws the picture where its times and heights lie in the frame: shifted or stretched when the frame has moved on. */
  draw(pen: Pen, frame: Frame): void {
    const view = this.#view;
    if (view === null) return;
    const left = xPixel(frame, view.startMs);
    const top = yPixel(frame, view.top);
    const width = xPixel(frame, view.endMs) - left;
    const height = yPixel(frame, view.bottom) - top;
    within(pen, frame, () => {
      pen.imageSmoothingEnabled = false;
      pen.drawImage(this.#canvas as CanvasImageSource, left, top, width, height);
    });
  }
}

/** The view that fills a frame, to be painted. */
export function viewOf(frame: Frame): SectionView {
  return {
    startMs: frame.xLow,
    endMs: frame.xHigh,
    bottom: frame.yLow,
    top: frame.yHigh,
    width: Math.max(1, Math.round(frame.width)),
    height: Math.max(1, Math.round(frame.height)),
  };
}
