import type { Findings } from '../../recording/findings';
import { createDoubtStore } from '../../review/doubt-store';
import { paneCommands } from '../../review/pane-commands';
import type { PaneProps } from '../../review/pane-props';
import type { Row } from '../../review/rows';
import { redoableEdit, undoableEdit } from '../../session/log';
import { createAnalysisRunner } from '../analysis-runner';
import type { AppParts } from '../app-context';
import { applyEdit } from '../apply-edit';
import type { CommandParts, PageActs, RoomActs } from '../command';
import type { StudyController } from '../controller';
import { createStudyEdits } from '../study-edits';
import { copyReview, type ReviewCopy } from './review-copy';
import {
  createRoomStore,
  liftPen,
  movePenBy,
  type RoomStore,
  setPenDown,
  togglePen,
} from './room-store';

/** The room view's own parts: a copy of the review, and acts that reach nothing else. */
export interface RoomParts {
  readonly commands: CommandParts;
  readonly panes: Omit<PaneProps, 'theme' | 'scale'>;
  readonly room: RoomStore;
  /** The figures as they were on entering, to compare with. */
  readonly before: Findings | null;
  /** Rows that can be brought forward; the view keeps them up to date. */
  readonly rows: { current: readonly Row[] };
  /** Says that files are not opened here. */
  readonly refuseFiles: () => void;
  /** Stops the copy's work and gives the worker back to the review. */
  end(): void;
}

/** What is said of an act that rests in the room view. */
export const OFF_IN_ROOM = 'Off in the room view, which opens, prints and saves nothing';

/** Makes the room view of the open review; `leave` takes it out of sight. */
export function makeRoom(parts: AppParts, page: PageActs, leave: () => void): RoomParts {
  const copy = copyReview(parts);
  const lent = parts.controller.lend();
  const runner = createAnalysisRunner({ client: lent.client, ...copy });
  const edits = createStudyEdits({
    ...copy,
    propose: (given) =>
      runner.watched('Reading the recording', (watch) => lent.client.propose(given, watch)),
    refresh: () => runner.refresh(),
    confirmed: async () => false,
  });
  const say = (words: string) => copy.shell.getState().tell(words);
  const controller = roomController(parts.controller, copy, (edit) => applyEdit(copy, edits, edit));
  const panes: RoomParts['panes'] = {
    stores: copy,
    signals: runner.signals,
    act: {
      edit: (edit) => controller.edit(edit),
      say,
      reportError: (words) => copy.shell.getState().sayProblem(words),
    },
  };
  const room = createRoomStore();
  const rows: RoomParts['rows'] = { current: [] };
  const acts = roomActs(room, copy, rows, leave);
  return {
    commands: {
      ...copy,
      controller,
      signals: runner.signals,
      doubts: createDoubtStore(),
      doubtAccess: parts.doubtAccess,
      evidence: parts.evidence,
      evidenceAccess: parts.evidenceAccess,
      panes: paneCommands(panes.stores, panes.signals, panes.act),
      page: { ...page, reportOpen: () => false, room: acts },
    },
    panes,
    room,
    before: copy.analysis.getState().findings,
    rows,
    refuseFiles: () => say(`Files: ${OFF_IN_ROOM}`),
    end() {
      runner.reset();
      const log = copy.session.getState().session?.log ?? [];
      if (log.length > 0) lent.giveBack();
    },
  };
}

/** A controller that edits the copy and refuses everything else. */
function roomController(
  real: StudyController,
  { session, analysis, shell }: ReviewCopy,
  edit: StudyController['edit'],
): StudyController {
  const tell = (words: string) => shell.getState().tell(words);
  const refuse = () => tell(OFF_IN_ROOM);
  const refused = Object.fromEntries(Object.keys(real).map((act) => [act, refuse]));
  return {
    ...real,
    ...refused,
    edit,
    undo() {
      const open = session.getState().session;
      if (open && undoableEdit(open)) tell(`Undone: ${session.getState().undo()}`);
    },
    redo() {
      const open = session.getState().session;
      if (open && redoableEdit(open)) tell(`Done again: ${session.getState().redo()}`);
    },
    stop: () => analysis.getState().progress?.stop(),
  };
}

function roomActs(
  room: RoomStore,
  { shell, view }: ReviewCopy,
  rows: RoomParts['rows'],
  leave: () => void,
): RoomActs {
  const tell = (words: string) => shell.getState().tell(words);
  return {
    leave,
    stepRow(way) {
      const all = rows.current;
      if (all.length === 0) return;
      const { rowKey } = room.getState();
      const here = Math.max(
        0,
        all.findIndex(({ key }) => key === rowKey),
      );
      const at = (here + way + all.length) % all.length;
      const { key, name, note } = all[at];
      room.setState({ rowKey: key });
      view.setState({ selectedRow: key });
      tell(`${[name, note].filter(Boolean).join(', ')}: row ${at + 1} of ${all.length}`);
    },
    penOn: () => room.getState().penOn,
    togglePen: () => tell(togglePen(room)),
    movePen: (byX, byY) => movePenBy(room, byX, byY),
    pressPen() {
      const { penDown } = room.getState();
      if (penDown) liftPen(room);
      else setPenDown(room);
      tell(penDown ? 'Pen lifted' : 'Pen down');
    },
    toggleKeys: () => room.setState((now) => ({ keysShown: !now.keysShown })),
  };
}
