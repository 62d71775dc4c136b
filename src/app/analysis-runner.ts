import type { ReviewInputs } from '../../workers/analysis-api';
import type { AnalysisClient } from '../../workers/analysis-client';
import { type AnalysisStore, type SignalAccess, takeAnalysis } from '../review/analysis-store';
import { asWork, beginWork, endWork } from '../review/idle';
import { forgetDrawnGains, type ViewStore } from '../review/view-store';
import type { Session, SessionState } from '../session/document';
import { editNumber, type SessionStore } from '../session/store';
import { keepFigures, markOf } from './figures-kept';
import type { ShellStore } from './shell-store';

/** Work shorter than this shows no progress line. */
const SHOW_PROGRESS_AFTER_MS = 200;

/** What the worker is to compute from, as the session stands. */
export function inputsOf(session: Session): ReviewInputs {
  return stateInputs(session.state, editNumber(session));
}

/** What the worker is to compute from, for any state; figures carry the number of the edit. */
export function stateInputs(state: SessionState, edit: number): ReviewInputs {
  const { roles, phases, settings, spans, beats } = state;
  return { edit, roles, phases, settings, spans, beats };
}

/** True where both give the same figures: edits of words and protocol do not reach the worker. */
export function sameInputs(a: ReviewInputs, b: ReviewInputs): boolean {
  return (
    a.roles === b.roles &&
    a.phases === b.phases &&
    a.settings === b.settings &&
    a.spans === b.spans &&
    a.beats === b.beats
  );
}

/** What the size of a drawn slow wave or heartbeat hangs on. */
const routesOf = ({ slowRoute, heartRoute, fractional }: ReviewInputs['settings']): string =>
  JSON.stringify([slowRoute, heartRoute, fractional.order]);

/** True where the signals themselves are to be made again, so that work under way is of no use any more. */
function otherSignals(a: ReviewInputs, b: ReviewInputs): boolean {
  return a.roles !== b.roles || a.settings !== b.settings;
}

/** Keeps the results in step with the session: one computation at a time, always ending with the last edit. */
export interface AnalysisRunner {
  readonly signals: SignalAccess;
  /** Shows a progress line for long work and lets it be stopped; the signal is for the call. */
  watched<T>(step: string, work: (watch: Watch) => Promise<T>): Promise<T>;
  /** Computes again from the session as it stands, after the worker was started again or a study was opened. */
  refresh(): void;
  /** Forgets what was sent and stops all work, before another study. */
  reset(): void;
}

export interface Watch {
  readonly signal: AbortSignal;
  readonly onProgress: (step: string, done: number) => void;
}

interface RunnerParts {
  readonly client: AnalysisClient;
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly view: ViewStore;
  readonly shell: ShellStore;
}

export function createAnalysisRunner({
  client,
  session,
  analysis,
  view,
  shell,
}: RunnerParts): AnalysisRunner {
  let sent: ReviewInputs | null = null;
  /** By which routes the signals in sight were made; null before the first. */
  let madeBy: string | null = null;
  /** Grows with every study, so that a late reply is not taken for this one's. */
  let visit = 0;
  const abortable = new Set<AbortController>();
  let running: { readonly inputs: ReviewInputs; readonly abort: () => void } | null = null;

  async function watched<T>(first: string, work: (watch: Watch) => Promise<T>): Promise<T> {
    const controller = new AbortController();
    abortable.add(controller);
    const startMs = performance.now();
    const stop = () => controller.abort();
    const onProgress = (step: string, done: number) => {
      clearTimeout(shown);
      if (performance.now() - startMs > SHOW_PROGRESS_AFTER_MS)
        analysis.setState({ progress: { step, done, stop } });
    };
    const shown = setTimeout(() => onProgress(first, 0), SHOW_PROGRESS_AFTER_MS + 1);
    beginWork();
    try {
      return await work({ signal: controller.signal, onProgress });
    } finally {
      clearTimeout(shown);
      abortable.delete(controller);
      if (abortable.size === 0) analysis.setState({ progress: null });
      endWork();
    }
  }

  function follow(): void {
    const open = session.getState().session;
    if (!open || !analysis.getState().fileAtHand) return;
    const inputs = inputsOf(open);
    if (running) {
      if (otherSignals(running.inputs, inputs)) running.abort();
      return;
    }
    if (sent && sameInputs(sent, inputs)) {
      analysis.setState({ edit: inputs.edit });
      return;
    }
    void run(inputs, markOf(open, inputs.edit));
  }

  async function run(inputs: ReviewInputs, mark: object): Promise<void> {
    const anew = !sent || otherSignals(sent, inputs);
    const started = visit;
    sent = inputs;
    analysis.setState({ stopped: false });
    const reply = await watched('Computing the figures', (watch) => {
      const abort = new AbortController();
      const stop = () => abort.abort();
      watch.signal.addEventListener('abort', stop, { once: true });
      running = { inputs, abort: stop };
      return client.analyse(inputs, { ...watch, signal: abort.signal });
    });
    running = null;
    if (visit !== started) return follow();
    if (reply.ok) {
      takeAnalysis(analysis, reply.value);
      keepFigures(mark, reply.value.findings);
      const before = madeBy;
      madeBy = routesOf(inputs.settings);
      if (before !== null && before !== madeBy) forgetDrawnGains(view);
      if (anew || reply.value.separation !== null)
        analysis.setState((before) => ({ signalVersion: before.signalVersion + 1 }));
      return follow();
    }
    sent = null;
    if (reply.failure.kind === 'cancelled') {
      if (!movedOn(inputs)) {
        analysis.setState({ stopped: true });
        shell.getState().say('Stopped. The figures stay grey until they are computed again.');
      }
    } else if (reply.failure.kind !== 'crashed') {
      shell.getState().openDialog({ kind: 'failure', failure: reply.failure });
    }
    if (movedOn(inputs)) follow();
  }

  const movedOn = (inputs: ReviewInputs): boolean => {
    const open = session.getState().session;
    return open !== null && editNumber(open) !== inputs.edit;
  };

  session.subscribe((now, before) => {
    if (now.session !== before.session) follow();
  });

  return {
    watched,
    refresh() {
      sent = null;
      follow();
    },
    reset() {
      sent = null;
      madeBy = null;
      visit += 1;
      for (const controller of abortable) controller.abort();
    },
    signals: {
      async columns(request) {
        const reply = await asWork(client.columns(request));
        return reply.ok ? reply.value : null;
      },
      async placeBeat(nearS) {
        const reply = await asWork(client.placeBeat(nearS));
        if (reply.ok) return reply.value;
        shell.getState().sayProblem(reply.failure.message);
        return null;
      },
    },
  };
}
