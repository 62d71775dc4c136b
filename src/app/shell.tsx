import './styles.css';
import { type ReactNode, useCallback, useEffect, useMemo, useRef } from 'react';
import { useStore } from 'zustand';
import { type CommandLinks, CommandLinksProvider } from '../review/command-links';
import { paneCommands } from '../review/pane-commands';
import type { PaneProps } from '../review/pane-props';
import { type AppParts, AppProvider } from './app-context';
import type { CommandParts, PageActs } from './command';
import { canRun, commandOf } from './commands';
import { Dialogs } from './dialogs';
import { useEditStatus } from './edit-status';
import { FootLine } from './foot-line';
import { Messages } from './messages';
import { shownKey } from './own-keys';
import { ReportFrame } from './report-frame';
import { StartScreen } from './start-screen';
import { TopBar } from './top-bar';
import { useKeys } from './use-keys';
import { useFileDrop, useHash, useLeaveGuard, useTheme } from './use-page';
import { useRoom } from './use-room';
import { Workspace } from './workspace';

const REPORT_HASH = '#report';

interface ShellProps {
  readonly parts: AppParts;
  /** Draws the report; without it the page has no report view. */
  readonly renderReport?: () => ReactNode;
}

/** The page: bar, start screen or study, dialogs, messages, keys, drops. */
export function Shell({ parts, renderReport }: ShellProps) {
  const { shell, session, analysis } = parts;
  const fileInput = useRef<HTMLInputElement>(null);
  const hash = useHash();
  const { room, enter } = useRoom(parts);
  const page = usePageActs(fileInput, renderReport !== undefined, enter);
  const panes = useMemo(() => panePartsOf(parts), [parts]);
  const commandParts = useMemo<CommandParts>(
    () => ({ ...parts, page, panes: paneCommands(panes.stores, panes.signals, panes.act) }),
    [parts, page, panes],
  );
  const take = useTakeFiles(parts);
  const over = useFileDrop(room?.parts.refuseFiles ?? take);
  const theme = useTheme(room?.parts.commands.shell ?? shell);
  useLeaveGuard(session);
  useKeys(room ? null : commandParts);
  useEditStatus(parts);
  const links = useLinks(commandParts);
  const otherAsked = useOtherStudyAsked(parts);
  const sessionThere = useStore(session, (state) => state.session !== null);
  const recordingThere = useStore(analysis, (state) => state.recording !== null);
  const studyThere = sessionThere || recordingThere;
  const studyShown = studyThere && !otherAsked;
  useReviewFirst(studyShown, hash);
  const reportShown = studyShown && renderReport !== undefined && hash === REPORT_HASH;
  const askedOutside = useStore(shell, (state) => state.dialog.kind !== 'none');
  if (room) return <room.View parts={room.parts} theme={theme} askedOutside={askedOutside} />;
  return (
    <AppProvider value={parts}>
      <CommandLinksProvider value={links}>
        <div className={reportShown ? 'app report-open' : 'app'}>
          <TopBar parts={commandParts} studyShown={studyShown} reportShown={reportShown} />
          {reportShown ? <ReportFrame parts={commandParts}>{renderReport()}</ReportFrame> : null}
          {studyShown && !reportShown ? (
            <Workspace panes={{ ...panes, theme }} parts={commandParts} />
          ) : null}
          {studyShown ? null : <StartScreen parts={commandParts} />}
          <FootLine />
          <Messages />
          <Dialogs parts={commandParts} />
          {over ? <p className="drop-over">Drop the file to open it</p> : null}
          <input
            ref={fileInput}
            type="file"
            hidden
            aria-label="File to open"
            onChange={(event) => {
              take([...(event.target.files ?? [])]);
              event.target.value = '';
            }}
          />
        </div>
      </CommandLinksProvider>
    </AppProvider>
  );
}

/** What the panes know of the command table: the keys that act now, and the acts. */
function useLinks(parts: CommandParts): CommandLinks {
  const ownKeys = useStore(parts.shell, (state) => state.ownKeys);
  const plainKeys = useStore(parts.shell, (state) => state.plainKeys);
  return useMemo(
    () => ({
      keyOf: (id) => shownKey(commandOf(id), { ownKeys, plainKeys }),
      run: (id) => {
        const command = commandOf(id);
        if (canRun(command, parts)) command.run(parts);
      },
    }),
    [parts, ownKeys, plainKeys],
  );
}

/** True while a dialog asks about another study than the open one, so that nothing of this one is taken for it. */
function useOtherStudyAsked({ shell, session }: AppParts): boolean {
  const asked = useStore(shell, (state) => state.dialog);
  const open = useStore(session, (state) => state.session?.state.study.quickKey);
  return (
    asked.kind === 'identity' || (asked.kind === 'choose-same-file' && asked.quickKey !== open)
  );
}

/** A study opens on its traces: the report of what was open before is left. */
function useReviewFirst(studyShown: boolean, hash: string): void {
  useEffect(() => {
    if (!studyShown && hash === REPORT_HASH) window.location.replace('#');
  }, [studyShown, hash]);
}

/** What the panes are given: they speak and edit through the shell. */
function panePartsOf(parts: AppParts): Omit<PaneProps, 'theme'> {
  const { session, analysis, view, signals, controller, shell } = parts;
  return {
    stores: { session, analysis, view },
    signals,
    act: {
      edit: (edit) => controller.edit(edit),
      say: (text) => shell.getState().tell(text),
      reportError: (text) => shell.getState().sayProblem(text),
    },
  };
}

type InputRef = { readonly current: HTMLInputElement | null };

function usePageActs(
  fileInput: InputRef,
  reportThere: boolean,
  enter: (page: PageActs) => void,
): PageActs {
  const way = useRef(enter);
  way.current = enter;
  return useMemo(() => {
    const reportOpen = () => reportThere && window.location.hash === REPORT_HASH;
    const page: PageActs = {
      chooseFile: () => choose(fileInput, ''),
      chooseSession: () => choose(fileInput, '.json'),
      toggleReport: () => {
        window.location.hash = reportOpen() ? '' : REPORT_HASH;
      },
      reportOpen,
      focusFindings: () => document.getElementById('findings')?.focus(),
      reportThere,
      enterRoom: () => way.current(page),
      room: null,
    };
    return page;
  }, [fileInput, reportThere]);
}

function choose(fileInput: InputRef, accept: string): void {
  const input = fileInput.current;
  if (!input) return;
  input.accept = accept;
  input.click();
}

/** Opens what was chosen or dropped: a session by its name's end, anything else as a study. */
function useTakeFiles({ controller, shell }: AppParts): (files: readonly File[]) => void {
  return useCallback(
    (files) => {
      const [file] = files;
      if (!file) return;
      if (files.length > 1)
        shell.getState().say(`One file at a time: the first of ${files.length} is opened.`);
      void (/\.json$/i.test(file.name)
        ? controller.openSessionFile(file)
        : controller.openFile(file, null));
    },
    [controller, shell],
  );
}
