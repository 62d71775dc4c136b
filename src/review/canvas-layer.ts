/** A canvas over or under the rows of a pane, drawn in CSS pixels whatever the device pixel ratio. */
export class CanvasLayer {
  ratio = 1;
  private family = 'sans-serif';
  widthPx = 0;
  heightPx = 0;

  /** `scale`: how much larger than CSS pixels the canvas is shown. */
  constructor(
    private readonly canvas: HTMLCanvasElement,
    private readonly scale = 1,
  ) {}

  resize(widthPx: number, heightPx: number): void {
    this.ratio = (window.devicePixelRatio || 1) * this.scale;
    this.family = getComputedStyle(this.canvas).fontFamily;
    this.widthPx = widthPx;
    this.heightPx = heightPx;
    this.canvas.width = Math.max(1, Math.round(widthPx * this.ratio));
    this.canvas.height = Math.max(1, Math.round(heightPx * this.ratio));
    this.canvas.style.width = `${widthPx}px`;
    this.canvas.style.height = `${heightPx}px`;
  }

  /** A clear brush in CSS pixels; null where the browser gives none. */
  begin(): CanvasRenderingContext2D | null {
    const brush = this.canvas.getContext('2d');
    if (!brush) return null;
    brush.setTransform(this.ratio, 0, 0, this.ratio, 0, 0);
    brush.clearRect(0, 0, this.widthPx, this.heightPx);
    return brush;
  }

  /** The canvas font of the page at a size in CSS pixels. */
  font(sizePx: number, weight = 400): string {
    return `${weight} ${sizePx}px ${this.family}`;
  }
}

/** Where an element stands, in its own CSS pixels, where it is shown `scale` times as large. */
export function boxOf(
  element: Element,
  scale: number,
): { readonly top: number; readonly width: number; readonly height: number } {
  const { top, width, height } = element.getBoundingClientRect();
  return { top: top / scale, width: width / scale, height: height / scale };
}

/**
 * Calls back with an element's size in CSS pixels, at first, whenever it changes and when the device pixel ratio does.
 * Returns the way to stop.
 */
export function watchSize(element: Element, changed: () => void): () => void {
  const observer = new ResizeObserver(changed);
  observer.observe(element);
  let media: MediaQueryList | null = null;
  const ratioChanged = () => {
    media?.removeEventListener('change', ratioChanged);
    media = matchMedia(`(resolution: ${window.devicePixelRatio}dppx)`);
    media.addEventListener('change', ratioChanged);
    changed();
  };
  ratioChanged();
  return () => {
    observer.disconnect();
    media?.removeEventListener('change', ratioChanged);
  };
}
