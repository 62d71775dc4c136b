/** What a press on a pane's drawing does from then on; places are CSS pixels from the drawing's left top corner. */
export interface Gesture {
  readonly cursor?: string;
  /** Held and moved beyond 4 px. */
  move?(x: number, y: number): void;
  /** Let go after a move. */
  drop?(x: number, y: number): void;
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

/** Listens to pointer and wheel on a pane's drawing. Returns the way to stop. */
export function listenToStage(stage: HTMLElement, acts: StageActs): () => void {
  const stop = new AbortController();
  const { signal } = stop;
  let held: { gesture: Gesture; x: number; y: number; moved: boolean } | null = null;
  const place = (event: MouseEvent): readonly [number, number] => {
    const box = stage.getBoundingClientRect();
    return [event.clientX - box.left, event.clientY - box.top];
  };
  const release = () => {
    held = null;
    stage.style.cursor = '';
  };
  const cancel = () => {
    held?.gesture.cancel?.();
    release();
  };
  const down = (event: PointerEvent) => {
    if (event.button !== 0 || held) return;
    const [x, y] = place(event);
    const gesture = acts.press(x, y, event);
    if (!gesture) return;
    held = { gesture, x, y, moved: false };
    stage.setPointerCapture(event.pointerId);
  };
  const move = (event: PointerEvent) => {
    const [x, y] = place(event);
    acts.point(x);
    if (!held) {
      stage.style.cursor = acts.hover(x, y);
      return;
    }
    if (!held.moved && Math.abs(x - held.x) < STILL_PX && Math.abs(y - held.y) < STILL_PX) return;
    held.moved = true;
    stage.style.cursor = held.gesture.cursor ?? 'grabbing';
    held.gesture.move?.(x, y);
  };
  const up = (event: PointerEvent) => {
    if (!held) return;
    const { gesture, moved } = held;
    const [x, y] = place(event);
    release();
    if (moved) gesture.drop?.(x, y);
    else gesture.click?.(x, y);
  };
  const onEscape = (event: KeyboardEvent) => {
    if (event.key !== 'Escape' || !held) return;
    event.stopPropagation();
    cancel();
  };
  const wheel = (event: WheelEvent) => {
    event.preventDefault();
    acts.wheel(place(event)[0], event);
  };
  stage.addEventListener('pointerdown', down, { signal });
  stage.addEventListener('pointermove', move, { signal });
  stage.addEventListener('pointerup', up, { signal });
  stage.addEventListener('pointercancel', cancel, { signal });
  stage.addEventListener('pointerleave', () => held || acts.point(null), { signal });
  stage.addEventListener('wheel', wheel, { signal, passive: false });
  stage.addEventListener('dblclick', (event) => acts.doubleClick?.(...place(event)), { signal });
  window.addEventListener('keydown', onEscape, { signal, capture: true });
  return () => {
    cancel();
    stop.abort();
  };
}
