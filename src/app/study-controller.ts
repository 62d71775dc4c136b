import type { Given, TextReading } from '../../workers/analysis-api';
import { createAnalysisClient } from '../../workers/analysis-client';
import { createHashClient } from '../../workers/hash-client';
import { startModuleWorker } from '../../workers/start-worker';
import { type Failure, Refusal } from '../recording/failure';
import type { Recording } from '../recording/recording';
import { DEFAULT_SETTINGS } from '../recording/settings';
import { type AnalysisStore, blankAnalysis, type SignalAccess } from '../review/analysis-store';
import { asWork } from '../review/idle';
import { lookAtStudy, type ViewStore } from '../review/view-store';
import type { Session } from '../session/document';
import { initialState, studyIdentity } from '../session/initial-state';
import type { Keeper } from '../session/keeper';
import { beginSession, redoableEdit, undoableEdit } from '../session/log';
import type { SessionStore } from '../session/store';
import { type AnalysisRunner, createAnalysisRunner } from './analysis-runner';
import { type DoubtAccess, withReviewer } from './app-context';
import { applyEdit } from './apply-edit';
import type { StudyController } from './controller';
import type { EvidenceAccess } from './evidence-runner';
import { lastStudy } from './last-study';
import { keptRow, LOST_OPENING, otherFile, otherReading } from './opening-words';
import type { ShellStore } from './shell-store';
import { createStudyEdits } from './study-edits';
import { createStudyFiles } from './study-files';
import { createStudyKeeping } from './study-keeping';

export interface ControllerParts {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly view: ViewStore;
  readonly shell: ShellStore;
  readonly keeper: Keeper;
  readonly analysisWorkerUrl: string;
  readonly hashWorkerUrl: string;
}

/** A study whose header has been read, until the person agrees that it is the one. */
interface Opening {
  readonly file: File;
  readonly recording: Recording;
  readonly quickKey: string;
  readonly ticket: number;
  readonly kept: Session | null;
}

/** Leads a study from the file through worker and session to the stores that the page draws from. */
export function createStudyController(parts: ControllerParts): StudyController & {
  readonly signals: SignalAccess;
  readonly doubtAccess: DoubtAccess;
  readonly evidenceAccess: EvidenceAccess;
} {
  const { session, analysis, view, shell, keeper } = parts;
  const client = createAnalysisClient(
    () => startModuleWorker(parts.analysisWorkerUrl),
    (failure) => {
      runner.refresh();
      if (!failure) return;
      analysis.setState({ fileAtHand: false });
      fail(failure);
    },
  );
  const hash = createHashClient(() => startModuleWorker(parts.hashWorkerUrl));
  const runner: AnalysisRunner = createAnalysisRunner({ client, session, analysis, view, shell });
  const keeping = createStudyKeeping({ keeper, hash, session, shell });
  const files = createStudyFiles({
    session,
    analysis,
    shell,
    keeping,
    client,
    watched: runner.watched,
  });
  const propose = (given: Given) =>
    runner.watched('Reading the recording', (watch) => client.propose(given, watch));
  const edits = createStudyEdits({
    session,
    shell,
    analysis,
    propose,
    refresh: () => runner.refresh(),
    confirmed: () => keeping.confirmed(),
  });
  let opening: Opening | null = null;
  /** The recording of the open study. */
  let openFile: File | null = null;
  let awaited: Session | null = null;
  /** The attempt to open made last; an earlier one that ends later is let go. */
  let attempt = 0;

  const fail = (failure: Failure, stopped = 'Stopped. What was open is as it was.'): void => {
    if (failure.kind === 'cancelled') shell.getState().say(stopped);
    else shell.getState().openDialog({ kind: 'failure', failure });
  };

  async function open(file: File, reading: TextReading | null): Promise<void> {
    attempt += 1;
    const own = attempt;
    const reply = await runner.watched('Opening the file', (watch) =>
      client.open(file, file.name, reading, watch),
    );
    if (own !== attempt) return;
    if (!reply.ok) {
      if (reply.failure.kind === 'needs-reading')
        shell.getState().openDialog({ kind: 'text-reading', file, failure: reply.failure });
      else fail(reply.failure);
      return;
    }
    const { recording, quickKey, ticket } = reply.value;
    if (awaited && awaited.state.study.quickKey !== quickKey) {
      fail(otherFile(file.name, awaited.state.study.code));
      awaited = null;
      return;
    }
    const kept = await keptSession(quickKey);
    if (own !== attempt) return;
    const fault = kept && otherReading(kept, recording);
    if (fault) {
      fail(fault);
      return;
    }
    opening = { file, recording, quickKey, ticket, kept };
    shell.getState().openDialog({
      kind: 'identity',
      recording,
      quickKey,
      found: recording.found,
      kept: kept && keptRow(kept),
    });
  }

  async function keptSession(quickKey: string): Promise<Session | null> {
    if (awaited?.state.study.quickKey === quickKey) return awaited;
    try {
      const found = await keeper.find(quickKey);
      if (found?.note) shell.getState().say(found.note);
      return found?.session ?? null;
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      fail(error.failure);
      return null;
    }
  }

  function blank(): void {
    runner.reset();
    keeping.end();
    session.getState().close();
    blankAnalysis(analysis);
  }

  async function begin(from: Opening, code: string): Promise<void> {
    const { file, recording, quickKey, ticket, kept } = from;
    blank();
    if (!(await client.accept(ticket))) {
      fail(LOST_OPENING);
      return;
    }
    const here = () => analysis.getState().recording === recording;
    analysis.setState({ recording, fileAtHand: true });
    lookAtStudy(view, recording.durationS);
    lastStudy.remember(quickKey);
    window.location.hash = '';
    const first = await runner.watched('Looking for the leads', (watch) =>
      client.firstRoles(watch),
    );
    if (first.ok && here())
      analysis.setState((before) => ({
        firstRoles: first.value,
        signalVersion: before.signalVersion + 1,
      }));
    const begun = kept ?? (await newSession(recording, quickKey, code));
    if (!begun || !here()) return;
    awaited = null;
    await beginWith(begun, file);
  }

  /** The session is the one worked on from here; of which file it is, is sure once that has been read to its end. */
  async function beginWith(begun: Session, file: File | null): Promise<void> {
    openFile = file;
    session.getState().begin(begun);
    await keeping.begin(begun);
    const closeOther = (failure: Failure) => {
      blank();
      fail(failure);
    };
    if (file) onceFigures(() => keeping.confirm(file, closeOther));
  }

  /** Reading the whole file for its hash waits for the first figures, since both want the processor. */
  function onceFigures(act: () => void): void {
    const { recording, findings } = analysis.getState();
    if (findings) {
      act();
      return;
    }
    const stop = analysis.subscribe((state) => {
      if (state.recording === recording && !state.findings) return;
      stop();
      if (state.recording === recording) act();
    });
  }

  async function newSession(
    recording: Recording,
    quickKey: string,
    code: string,
  ): Promise<Session | null> {
    const settings = DEFAULT_SETTINGS;
    const reply = await propose({ roles: null, phases: null, spans: null, settings });
    if (analysis.getState().recording !== recording) return null;
    if (!reply.ok) {
      blank();
      fail(reply.failure, 'Stopped. No study is open.');
      return null;
    }
    analysis.setState({ reasons: reply.value.reasons });
    const study = studyIdentity(recording, quickKey, code);
    return beginSession(initialState(study, { ...reply.value, settings }));
  }

  /** Makes and opens the demo study; false where a size is asked for that is not its: another invented study. */
  async function demoOf(sizeBytes: number | null): Promise<boolean> {
    const reply = await runner.watched('Making the demo study', (watch) => client.demo(watch));
    if (reply.ok && sizeBytes !== null && reply.value.size !== sizeBytes) return false;
    if (reply.ok) await open(new File([reply.value], 'invented-demo.edf'), null);
    else fail(reply.failure);
    return true;
  }

  async function continueKept(quickKey: string) {
    const kept = await keptSession(quickKey);
    if (!kept) return;
    awaited = kept;
    const { code, invented, sizeBytes } = kept.state.study;
    if (invented && (await demoOf(sizeBytes))) return;
    if (awaited === kept) shell.getState().openDialog({ kind: 'choose-same-file', code, quickKey });
  }

  /** One step back or forth through the edits, told with what it was. */
  const step =
    (due: typeof undoableEdit, take: () => string | null, told: string): (() => void) =>
    () => {
      const open = session.getState().session;
      if (!open || !due(open)) return;
      withReviewer({ session, shell }, () => {
        const name = take();
        if (name) shell.getState().tell(`${told}: ${name}`);
      });
    };

  return {
    signals: runner.signals,
    doubtAccess: client,
    evidenceAccess: client,
    openFile: open,
    async openDemo() {
      await demoOf(null);
    },
    async openSessionFile(file) {
      const read = await files.readSession(file);
      if (!read) return;
      const { quickKey, code } = read.state.study;
      awaited = null;
      const refusal = files.refuseOlder(read, await keptSession(quickKey));
      if (refusal) {
        fail(refusal);
        return;
      }
      awaited = read;
      const open = session.getState().session;
      if (open?.state.study.quickKey === quickKey) {
        await beginWith(read, openFile);
      } else shell.getState().openDialog({ kind: 'choose-same-file', code, quickKey });
    },
    continueKept,
    async resume() {
      const quickKey = lastStudy.recall();
      if (quickKey !== null) await continueKept(quickKey);
    },
    async confirmIdentity(code) {
      const confirmed = opening;
      opening = null;
      shell.getState().closeDialog();
      if (confirmed) await begin(confirmed, code);
    },
    cancelOpening() {
      attempt += 1;
      opening = null;
      awaited = null;
      shell.getState().closeDialog();
    },
    async keptSessions() {
      return (await keeper.list()).map((one) => ({ ...one, lastUtc: one.savedAtUtc }));
    },
    async forget(quickKey) {
      await keeper.forget(quickKey);
      lastStudy.forget(quickKey);
    },
    edit: (edit) => applyEdit({ session, shell }, edits, edit),
    lend: () => ({ client, giveBack: () => runner.refresh() }),
    undo: step(undoableEdit, () => session.getState().undo(), 'Undone'),
    redo: step(redoableEdit, () => session.getState().redo(), 'Done again'),
    findWithin: (request, options) => asWork(client.detectWithin(request, options)),
    ...edits.acts,
    ...files.acts,
    closeStudy() {
      blank();
      lastStudy.clear();
    },
    figuresOf: (states, options) => asWork(client.figuresOf(states, options)),
    stop: () => analysis.getState().progress?.stop(),
  };
}
