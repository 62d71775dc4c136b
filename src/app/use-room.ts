import { useEffect, useState } from 'react';
import { asWork } from '../review/idle';
import type { AppParts } from './app-context';
import type { PageActs } from './command';

type Room = typeof import('./room/room');

/** The room view while it is in sight. */
export interface OpenRoom {
  readonly View: Room['RoomView'];
  readonly parts: ReturnType<Room['makeRoom']>;
}

const NOT_LOADED =
  'The room view could not be loaded. Check the connection to the server of this page, then try again.';

/** The way into the room view, which is fetched when it is wanted first, and the room while it is open. */
export function useRoom(parts: AppParts): {
  readonly room: OpenRoom | null;
  readonly enter: (page: PageActs) => void;
} {
  const [room, setRoom] = useState<OpenRoom | null>(null);
  useEffect(() => {
    if (!room) return;
    return () => {
      room.parts.end();
      document.querySelector<HTMLElement>('.room-door')?.focus();
    };
  }, [room]);
  const enter = (page: PageActs) => {
    const begin = ({ makeRoom, RoomView }: Room) =>
      setRoom({ View: RoomView, parts: makeRoom(parts, page, () => setRoom(null)) });
    const fail = () => parts.shell.getState().sayProblem(NOT_LOADED);
    void asWork(import('./room/room').then(begin, fail));
  };
  return { room, enter };
}
