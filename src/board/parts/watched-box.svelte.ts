// The room an element has been given, for what is drawn to measure.

/** Size and fineness of the element it is attached to: `<div {@attach box.watch}>`. */
export class WatchedBox {
  /** CSS pixels; 0 until the element stands on the page. */
  width = $state(0);
  height = $state(0);
  /** Device pixels to a CSS pixel. */
  ratio = $state(1);

  readonly watch = (host: Element): (() => void) => {
    const watcher = new ResizeObserver(([entry]) => {
      if (entry === undefined) return;
      this.width = Math.floor(entry.contentRect.width);
      this.height = Math.floor(entry.contentRect.height);
      this.ratio = devicePixelRatio;
    });
    watcher.observe(host);
    return () => watcher.disconnect();
  };
}
