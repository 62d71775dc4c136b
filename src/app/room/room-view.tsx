import './room.css';
import { type CSSProperties, type ReactNode, useEffect, useRef, useSyncExternalStore } from 'react';
import { useStore } from 'zustand';
import { bookmarkHere, bookmarkWords } from '../../review/bookmarks';
import { WholeStudyPane } from '../../review/panes';
import { ForwardPane, useForwardRows } from '../../review/room-pane';
import type { ThemeName } from '../../review/theme-tokens';
import { AppProvider } from '../app-context';
import type { CommandParts } from '../command';
import { CommandButton } from '../command-button';
import { COMMANDS, commandOf } from '../commands';
import { useEditStatus } from '../edit-status';
import { keysOf } from '../own-keys';
import { ACTS_IN_ROOM } from '../room-commands';
import { useKeys } from '../use-keys';
import { PenLayer } from './pen-layer';
import { RoomFigures } from './room-figures';
import { OFF_IN_ROOM, type RoomParts } from './room-parts';
import { paneScale } from './room-scale';

interface RoomViewProps {
  readonly parts: RoomParts;
  readonly theme: ThemeName;
  /** True while the review itself waits for an answer that this view does not show. */
  readonly askedOutside: boolean;
}

/** The review on a meeting-room screen: large, without who it is, by keys, nothing saved. */
export function RoomView({ parts, theme, askedOutside }: RoomViewProps) {
  const { commands, panes, room, rows: known } = parts;
  const scale = useSyncExternalStore(onResize, () =>
    paneScale(window.innerWidth, window.innerHeight),
  );
  const rows = useForwardRows({ stores: panes.stores });
  known.current = rows;
  const rowKey = useStore(room, (state) => state.rowKey);
  const row =
    rows.find(({ key }) => key === rowKey) ??
    rows.find((one) => one.kind === 'signal' && one.signal === 'slow-wave') ??
    rows[0];
  useEffect(() => {
    if (!row) return;
    room.setState({ rowKey: row.key });
    panes.stores.view.setState({ selectedRow: row.key });
  }, [row, room, panes]);
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => heading.current?.focus(), []);
  useRoomKeys(commands);
  useEditStatus(commands);
  const invented = commands.analysis.getState().recording?.invented ?? false;
  return (
    <AppProvider value={commands}>
      <div className="room" style={{ '--room-scale': scale } as CSSProperties}>
        <header className="room-bar">
          <h1 ref={heading} tabIndex={-1}>
            Room view
          </h1>
          <p>
            <strong>Shown, not saved.</strong> Edits made here end with it.
          </p>
          {invented ? <span className="badge">invented data</span> : null}
          <CommandButton command={commandOf('leave-room')} parts={commands} showKey />
        </header>
        <main className="room-main">
          <Large className="room-strip">
            <WholeStudyPane {...panes} theme={theme} scale={scale} />
          </Large>
          <Large className="room-trace">
            {row ? <ForwardPane {...panes} theme={theme} scale={scale} row={row} /> : null}
          </Large>
          <RoomFigures commands={commands} before={parts.before} />
        </main>
        <footer className="room-foot">
          <Place commands={commands} />
          <Says commands={commands} askedOutside={askedOutside} />
          <KeyStrip parts={parts} />
        </footer>
        <PenLayer room={room} />
        <p className="room-unprinted">
          The room view is not printed. Leave it and print the report from the review.
        </p>
      </div>
    </AppProvider>
  );
}

const onResize = (tell: () => void) => {
  window.addEventListener('resize', tell);
  return () => window.removeEventListener('resize', tell);
};

/** A part laid out as on the page and shown as large as the room wants it. */
function Large({
  className,
  children,
}: {
  readonly className: string;
  readonly children: ReactNode;
}) {
  return (
    <div className={`room-large ${className}`}>
      <div className="room-small-inside">{children}</div>
    </div>
  );
}

/** Keys that belong to the browser and would show or print what the room is not to see. */
const KEPT_FROM_BROWSER = /^(Ctrl\+P|Ctrl\+Shift\+P|Ctrl\+R|Ctrl\+Shift\+R|F5|Ctrl\+U)$/;

function useRoomKeys(commands: CommandParts): void {
  useKeys(commands, (name) => {
    const { ownKeys } = commands.shell.getState();
    const named = COMMANDS.filter((one) => keysOf(one, ownKeys).includes(name));
    const acts = named.some(({ id, when }) => when === 'room' || ACTS_IN_ROOM.test(id));
    if (acts || (named.length === 0 && !KEPT_FROM_BROWSER.test(name))) return false;
    const about = named.length > 0 ? `${named[0].words.replace('…', '')}: ` : '';
    commands.shell.getState().tell(`${about}${OFF_IN_ROOM}`);
    return true;
  });
}

/** The bookmark the panes stand at, with its note. */
function Place({ commands }: { readonly commands: CommandParts }) {
  const bookmarks = useStore(commands.session, (state) => state.session?.state.bookmarks) ?? [];
  const seconds = useStore(commands.view, (state) => state.seconds);
  const here = bookmarkHere(bookmarks, { seconds });
  if (!here) return null;
  return (
    <p className="room-place">
      <strong>{here.bookmark.note}</strong>{' '}
      <span className="quiet">
        {bookmarkWords({ ...here.bookmark, note: '' }, here.number, bookmarks.length)}
      </span>
    </p>
  );
}

interface SaysProps {
  readonly commands: CommandParts;
  readonly askedOutside: boolean;
}

/** What the last act did, and whether something waits outside. */
function Says({ commands, askedOutside }: SaysProps) {
  const status = useStore(commands.shell, (state) => state.status);
  const message = useStore(commands.shell, (state) => state.messages.at(-1)?.text ?? '');
  const waits = askedOutside
    ? 'Something waits for an answer outside this view. Leave it to see what.'
    : '';
  return (
    <p className="room-says" role="status">
      {[waits, status || message].filter(Boolean).join(' ')}
    </p>
  );
}

const STRIP = ['row-above', 'row-below', 'next-bookmark', 'pen', 'undo', 'room-keys'] as const;
const STRIP_WORDS: Readonly<Partial<Record<(typeof STRIP)[number], string>>> = {
  'row-above': 'Row above',
  'row-below': 'Row below',
  pen: 'Draw',
  undo: 'Undo',
  'room-keys': 'Hide keys',
};

function KeyStrip({ parts }: { readonly parts: RoomParts }) {
  const shown = useStore(parts.room, (state) => state.keysShown);
  useStore(parts.commands.session, (state) => state.session);
  if (!shown) return null;
  return (
    <nav className="room-keys" aria-label="Keys of the room view">
      {STRIP.map((id) => (
        <CommandButton
          key={id}
          command={commandOf(id)}
          parts={parts.commands}
          words={STRIP_WORDS[id] ?? commandOf(id).words}
          showKey
        />
      ))}
    </nav>
  );
}
