import { editNumber } from '../session/store';
import type { Command, CommandParts, RoomActs } from './command';

/**
 * Commands of the page that act in the room view too: they move, step and edit the copy. All others rest there: they open,
 * print, save, or show a dialog.
 */
export const ACTS_IN_ROOM =
  /^(seconds-(left|right|page-left|page-right|in|out)|minutes-(left|right|in|out)|usual-widths|go-start|go-end|gain-(up|down|fit)|(next|previous)-(beat|span|bookmark)|beats-in-view|extend-(later|earlier)|clear-selection|add-beat|delete-selected|class-[NSVFQ]|beat-(sample|10)-(left|right)|exclude-seconds|span-for-(stomach|heart|both)|undo|redo|stop|theme|room)$/;

const roomRow = (
  id: string,
  words: string,
  keys: readonly string[],
  run: (room: RoomActs) => void,
  ready: (room: RoomActs) => boolean = () => true,
): Command => ({
  id,
  words,
  keys,
  group: 'room',
  when: 'room',
  ready: ({ page }) => page.room !== null && ready(page.room),
  run: ({ page }) => page.room && run(page.room),
});

const penOn = (room: RoomActs) => room.penOn();
const STEP_PX = 16;
const FAR_PX = 96;

const WAYS = [
  ['Left', 'left', -1, 0],
  ['Right', 'right', 1, 0],
  ['Up', 'up', 0, -1],
  ['Down', 'down', 0, 1],
] as const;

/** Acts of the room view alone. They come before those of the page, whose keys they take while the pen is on. */
export const ROOM_COMMANDS: readonly Command[] = [
  ...WAYS.flatMap(([key, way, x, y]) => [
    roomRow(
      `pen-${way}`,
      `Pen: ${way}`,
      [`Arrow${key}`],
      (r) => r.movePen(x * STEP_PX, y * STEP_PX),
      penOn,
    ),
    roomRow(
      `pen-far-${way}`,
      `Pen: far ${way}`,
      [`Shift+Arrow${key}`],
      (r) => r.movePen(x * FAR_PX, y * FAR_PX),
      penOn,
    ),
  ]),
  roomRow('pen-press', 'Pen: set down, or lift', ['Space'], (r) => r.pressPen(), penOn),
  roomRow('pen', 'Draw a mark that fades, or stop', ['D'], (r) => r.togglePen()),
  roomRow('row-above', 'Trace row above', ['ArrowUp'], (r) => r.stepRow(-1)),
  roomRow('row-below', 'Trace row below', ['ArrowDown'], (r) => r.stepRow(1)),
  roomRow('room-keys', 'Show or hide the keys', ['?', 'F1'], (r) => r.toggleKeys()),
];

const upToDate = ({ session, analysis }: CommandParts) => {
  const open = session.getState().session;
  const { findings, fileAtHand, progress, edit } = analysis.getState();
  return open !== null && findings !== null && fileAtHand && !progress && edit === editNumber(open);
};

/** Into the room view and out of it. */
export const ROOM_DOOR: readonly Command[] = [
  {
    id: 'room',
    words: 'Room view, or back to the review',
    keys: ['F9'],
    group: 'room',
    when: 'study',
    ready: (parts) => parts.page.room !== null || upToDate(parts),
    whyNot: (parts) => (upToDate(parts) ? '' : 'it waits for the recording and its figures'),
    run: ({ page }) => (page.room ? page.room.leave() : page.enterRoom()),
  },
  roomRow('leave-room', 'Leave the room view', ['Escape'], (r) =>
    r.penOn() ? r.togglePen() : r.leave(),
  ),
];
