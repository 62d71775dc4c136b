/** What a page has been seen to do; times are ms of its own clock, 0 while not there yet. */
export interface Watched {
  /** A file was given to the page. */
  chosenMs: number;
  /** The identity dialog stood there; the person agreed to it. */
  dialogMs: number;
  agreedMs: number;
  /** The first frame with a recorded lead drawn, and with every signal row of both panes drawn. */
  tracesMs: number;
  allRowsMs: number;
  /** All figures stand in Findings and nothing is under way. */
  figuresMs: number;
  /** The last edit by a key, the first frame after it with the figures of that edit, and the first with nothing under way. */
  editMs: number;
  editFiguresMs: number;
  settledMs: number;
  /** Tasks over 50 ms on the main thread. */
  readonly longTasks: { readonly atMs: number; readonly ms: number }[];
  /** When frames were made while `recording`. */
  readonly frames: number[];
  recording: boolean;
}

declare global {
  interface Window {
    watched: Watched;
  }
}

/**
 * Runs inside the page before its own scripts and uses nothing from outside of itself. It looks once a frame, so a time is
 * that of the frame in which a thing is seen.
 */
export function watchPage(): void {
  const watched: Watched = {
    chosenMs: 0,
    dialogMs: 0,
    agreedMs: 0,
    tracesMs: 0,
    allRowsMs: 0,
    figuresMs: 0,
    editMs: 0,
    editFiguresMs: 0,
    settledMs: 0,
    longTasks: [],
    frames: [],
    recording: false,
  };
  window.watched = watched;
  const drawn = new Set<HTMLCanvasElement>();
  const { stroke } = CanvasRenderingContext2D.prototype;
  /** A trace is the only thing stroked as a path object; the grid's lines are not. */
  CanvasRenderingContext2D.prototype.stroke = function (this, path?: Path2D) {
    if (path && this.canvas instanceof HTMLCanvasElement) drawn.add(this.canvas);
    Reflect.apply(stroke, this, path ? [path] : []);
  };
  const isDrawn = (row: Element) => [...drawn].some((canvas) => row.contains(canvas));
  const rows = (...signals: string[]) => [
    ...document.querySelectorAll(
      signals.map((signal) => `[data-part^="plot "][data-part*=":${signal}:"]`).join(),
    ),
  ];
  const all = () => rows('recorded', 'slow-wave', 'heartbeat');
  const there = (selector: string) => document.querySelector(selector) !== null;
  const settled = () =>
    document.documentElement.dataset.idle === 'true' && !there('[aria-busy="true"]');
  /** The edit that the figures in sight belong to, in the words of Findings; what is being computed anew is none. */
  const figuresOf = () => {
    const said =
      document.querySelector('#findings .findings-head [role="status"]')?.textContent ?? '';
    return /edit \d+/.exec(said)?.[0] ?? figuresBefore;
  };
  let figuresBefore = '';
  const note = (key: 'dialogMs' | 'tracesMs' | 'allRowsMs' | 'figuresMs', seen: () => boolean) => {
    if (watched[key] === 0 && seen()) watched[key] = performance.now();
  };
  const look = (): void => {
    if (watched.recording) watched.frames.push(performance.now());
    if (watched.chosenMs > 0) note('dialogMs', () => there('dialog[open] form'));
    if (watched.agreedMs > 0) note('tracesMs', () => rows('recorded').some(isDrawn));
    if (watched.tracesMs > 0) note('figuresMs', () => there('#findings table') && settled());
    if (watched.tracesMs > 0) note('allRowsMs', () => all().every(isDrawn));
    if (watched.allRowsMs > 0) CanvasRenderingContext2D.prototype.stroke = stroke;
    if (watched.editMs > 0 && watched.editFiguresMs === 0 && figuresOf() !== figuresBefore)
      watched.editFiguresMs = performance.now();
    if (watched.editFiguresMs > 0 && watched.settledMs === 0 && settled())
      watched.settledMs = performance.now();
    requestAnimationFrame(look);
  };
  requestAnimationFrame(look);
  const listen = (type: string, act: (target: Element, event: Event) => void) =>
    addEventListener(
      type,
      (event) => {
        if (event.target instanceof Element) act(event.target, event);
      },
      { capture: true },
    );
  listen('change', (target) => {
    if (target.matches('[type="file"]')) watched.chosenMs = performance.now();
  });
  listen('click', (target) => {
    if (watched.dialogMs > 0 && watched.agreedMs === 0 && target.closest('[type="submit"]'))
      watched.agreedMs = performance.now();
  });
  listen('keydown', (_, event) => {
    figuresBefore = figuresOf();
    watched.editMs = event.timeStamp;
    watched.editFiguresMs = 0;
    watched.settledMs = 0;
  });
  new PerformanceObserver((list) => {
    for (const { startTime, duration } of list.getEntries())
      watched.longTasks.push({ atMs: startTime, ms: duration });
  }).observe({ type: 'longtask', buffered: true });
}
