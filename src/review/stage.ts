/** What a press on a pane's drawing does from then on; places are CSS pixels from the drawing's left top corner. */
export interface Gesture {
  readonly cursor?: string;
  /** Held and moved beyond 4 px; `free` while Alt or Shift keeps the place from snapping. */
  move?(x: number, y: number, free: boolean): void;
  /** Let go after a move. */
  drop?(x: number, y: number, free: boolean): void;
  /** Let go without a move. */
  click?(x: number, y: number): void;
  /** Escape, or the pointer was taken away: back to before the press. */
  cancel?(): void;
}

/** How a pane answers the pointer. */
export interface StageActs {
  press(x: number, y: number, event: PointerEvent): Gesture | null;
  /** CSS cursor for a place under the resting pointer. */
  hover(x: number, y: number): string;
  point(x: number | null): void;
  wheel(x: number, event: WheelEvent): void;
  doubleClick?(x: number, y: number): void;
}

const STILL_PX = 4;

interface Held {
  readonly gesture: Gesture;
  readonly x: number;
  readonly y: number;
  /** Alt was down already: it says what the press does, not how. */
  readonly alt: boolean;
  moved: boolean;
}

const isFree = ({ alt }: Held, { shiftKey, altKey }: PointerEvent): boolean =>
  shiftKey || (altKey && !alt);

/** The press that is held, and what it has become. */
class Hold {
  private held: Held | null = null;

  constructor(
    private readonly stage: HTMLElement,
    private readonly acts: StageActs,
    private readonly scale: number,
  ) {}

  get active(): boolean {
    return this.held !== null;
  }

  place(event: MouseEvent): readonly [number, number] {
    const box = this.stage.getBoundingClientRect();
    return [(event.clientX - box.left) / this.scale, (event.clientY - box.top) / this.scale];
  }

  down(event: PointerEvent): void {
    if (event.button !== 0 || this.held) return;
    const [x, y] = this.place(event);
    const gesture = this.acts.press(x, y, event);
    if (!gesture) return;
    this.held = { gesture, x, y, alt: event.altKey, moved: false };
    this.stage.setPointerCapture(event.pointerId);
  }

  move(event: PointerEvent): void {
    const { held, stage } = this;
    const [x, y] = this.place(event);
    this.acts.point(x);
    if (!held) {
      stage.style.cursor = this.acts.hover(x, y);
      return;
    }
    if (!held.moved && Math.abs(x - held.x) < STILL_PX && Math.abs(y - held.y) < STILL_PX) return;
    held.moved = true;
    stage.style.cursor = held.gesture.cursor ?? 'grabbing';
    held.gesture.move?.(x, y, isFree(held, event));
  }

  up(event: PointerEvent): void {
    if (!this.held) return;
    const { gesture, moved } = this.held;
    const free = isFree(this.held, event);
    const [x, y] = this.place(event);
    this.release();
    if (moved) gesture.drop?.(x, y, free);
    else gesture.click?.(x, y);
  }

  cancel(): void {
    this.held?.gesture.cancel?.();
    this.release();
  }

  private release(): void {
    this.held = null;
    this.stage.style.cursor = '';
  }
}

/** Listens to pointer and wheel on a pane's drawing, shown `scale` times as large. Returns the way to stop. */
export function listenToStage(stage: HTMLElement, acts: StageActs, scale = 1): () => void {
  const stop = new AbortController();
  const { signal } = stop;
  const hold = new Hold(stage, acts, scale);
  const onEscape = (event: KeyboardEvent) => {
    if (event.key !== 'Escape' || !hold.active) return;
    event.stopPropagation();
    hold.cancel();
  };
  const wheel = (event: WheelEvent) => {
    event.preventDefault();
    acts.wheel(hold.place(event)[0], event);
  };
  stage.addEventListener('pointerdown', (event) => hold.down(event), { signal });
  stage.addEventListener('pointermove', (event) => hold.move(event), { signal });
  stage.addEventListener('pointerup', (event) => hold.up(event), { signal });
  stage.addEventListener('pointercancel', () => hold.cancel(), { signal });
  stage.addEventListener('pointerleave', () => hold.active || acts.point(null), { signal });
  stage.addEventListener('wheel', wheel, { signal, passive: false });
  stage.addEventListener('dblclick', (event) => acts.doubleClick?.(...hold.place(event)), {
    signal,
  });
  window.addEventListener('keydown', onEscape, { signal, capture: true });
  return () => {
    hold.cancel();
    stop.abort();
  };
}
