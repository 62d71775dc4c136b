import { createStore, type StoreApi } from 'zustand/vanilla';

/** A place on the page in CSS pixels. */
export interface PagePoint {
  readonly x: number;
  readonly y: number;
}

/** One drawn mark; it fades once it is done. */
export interface Mark {
  readonly id: number;
  readonly points: readonly PagePoint[];
  readonly done: boolean;
}

/** What the room view shows beside the review: kept nowhere. */
export interface RoomState {
  /** Key of the trace row brought forward; null: the first that can be. */
  readonly rowKey: string | null;
  /** Where the ring stands; null until the mouse or the pen has moved. */
  readonly ring: PagePoint | null;
  readonly penOn: boolean;
  readonly penDown: boolean;
  readonly marks: readonly Mark[];
  readonly keysShown: boolean;
}

export type RoomStore = StoreApi<RoomState>;

/** A mark stays so long after it is done, its fading included. */
export const MARK_MS = 7000;

export const createRoomStore = (): RoomStore =>
  createStore<RoomState>()(() => ({
    rowKey: null,
    ring: null,
    penOn: false,
    penDown: false,
    marks: [],
    keysShown: true,
  }));

const onPage = ({ x, y }: PagePoint): PagePoint => ({
  x: Math.min(Math.max(0, x), window.innerWidth),
  y: Math.min(Math.max(0, y), window.innerHeight),
});

const middle = (): PagePoint => ({ x: window.innerWidth / 2, y: window.innerHeight / 2 });

/** Moves ring and pen to a place; a pen that is down draws there. */
export function movePenTo(room: RoomStore, point: PagePoint): void {
  const ring = onPage(point);
  const { penDown, marks } = room.getState();
  const last = marks.at(-1);
  const drawn =
    penDown && last && !last.done
      ? [...marks.slice(0, -1), { ...last, points: [...last.points, ring] }]
      : marks;
  room.setState({ ring, marks: drawn });
}

/** Moves ring and pen by a distance. */
export function movePenBy(room: RoomStore, byX: number, byY: number): void {
  const { x, y } = room.getState().ring ?? middle();
  movePenTo(room, { x: x + byX, y: y + byY });
}

/** Sets the pen down where the ring stands: a new mark begins. */
export function setPenDown(room: RoomStore): void {
  const { ring, marks } = room.getState();
  const start = ring ?? middle();
  const id = (marks.at(-1)?.id ?? 0) + 1;
  room.setState({
    ring: start,
    penDown: true,
    marks: [...marks, { id, points: [start], done: false }],
  });
}

/** Lifts the pen: the mark is done, and goes after a while. */
export function liftPen(room: RoomStore): void {
  const { marks, penDown } = room.getState();
  if (!penDown) return;
  const drawn = marks.at(-1);
  room.setState({
    penDown: false,
    marks: marks.map((one) => (one === drawn ? { ...one, done: true } : one)),
  });
  setTimeout(
    () => room.setState((now) => ({ marks: now.marks.filter(({ id }) => id !== drawn?.id) })),
    MARK_MS,
  );
}

/** Takes the pen up or puts it away; returns what it is now, in words. */
export function togglePen(room: RoomStore): string {
  const { penOn, ring } = room.getState();
  if (penOn) {
    liftPen(room);
    room.setState({ penOn: false });
    return 'Pen away';
  }
  room.setState({ penOn: true, ring: ring ?? middle() });
  return 'Pen: drag, or arrows to move and Space to set down and lift; Esc puts it away';
}
