import type { ReviewInputs } from '../../workers/analysis-api';
import type { SettledDoubt } from '../recording/doubt';
import type { AnalysisStore } from '../review/analysis-store';
import type { DoubtSearch, DoubtStore } from '../review/doubt-store';
import { asWork } from '../review/idle';
import type { SessionStore } from '../session/store';
import { inputsOf, sameInputs } from './analysis-runner';
import type { DoubtAccess } from './app-context';

/** The panes draw what an edit changed before doubts are looked for. */
const AFTER_FIGURES_MS = 60;

interface RunnerParts {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly doubts: DoubtStore;
  readonly doubtAccess: DoubtAccess;
}

interface Asked {
  readonly inputs: ReviewInputs;
  readonly settled: readonly SettledDoubt[];
}

/**
 * True where a list that was asked for holds for the study as it stands: what was settled since needs no new search, what
 * was opened again does.
 */
function answers(asked: Asked, inputs: ReviewInputs, settled: readonly SettledDoubt[]): boolean {
  const now = new Set(settled.map(({ id }) => id));
  return sameInputs(asked.inputs, inputs) && asked.settled.every(({ id }) => now.has(id));
}

const wait = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/**
 * Keeps the list of doubts in step with the session: looked for once the figures belong to the last edit, one search at a
 * time, the one under way given up where an edit makes it useless. Holds as long as the page lives. Returns the way to look
 * again after a failure.
 */
export function runDoubts({ session, analysis, doubts, doubtAccess }: RunnerParts): () => void {
  let asked: Asked | null = null;
  let running: AbortController | null = null;

  const show = (search: DoubtSearch) => {
    if (doubts.getState().search.kind !== search.kind) doubts.setState({ search });
  };

  function stop(): void {
    running?.abort();
    running = null;
    asked = null;
  }

  function follow(): void {
    const open = session.getState().session;
    if (!open) {
      stop();
      return;
    }
    const inputs = inputsOf(open);
    const settled = open.state.doubts;
    if (asked && answers(asked, inputs, settled)) {
      if (!running && doubts.getState().listed) doubts.setState({ edit: inputs.edit });
      return;
    }
    stop();
    const { findings, fileAtHand, edit } = analysis.getState();
    if (!findings || !fileAtHand || edit !== inputs.edit) show({ kind: 'waiting' });
    else void asWork(look({ inputs, settled }));
  }

  async function look(now: Asked): Promise<void> {
    const abort = new AbortController();
    running = abort;
    asked = now;
    show({ kind: 'looking' });
    await wait(AFTER_FIGURES_MS);
    if (abort.signal.aborted) return;
    const { signal } = abort;
    const reply = await doubtAccess.doubts(now.inputs, now.settled, { signal });
    if (running !== abort) return;
    running = null;
    if (!reply.ok) {
      doubts.setState({ search: { kind: 'failed', failure: reply.failure } });
      return;
    }
    const settledNow = new Set(session.getState().session?.state.doubts.map(({ id }) => id));
    const known = doubts.getState().listed ?? [];
    const settled = known.filter(({ id }) => settledNow.has(id));
    const again = new Set(reply.value.open.map(({ id }) => id));
    doubts.setState({
      listed: [...reply.value.open, ...settled.filter(({ id }) => !again.has(id))],
      edit: reply.value.edit,
      search: { kind: 'there' },
    });
    follow();
  }

  session.subscribe((now, before) => {
    if (now.session?.start !== before.session?.start) stop();
    if (now.session !== before.session) follow();
  });
  analysis.subscribe((now, before) => {
    if (
      now.edit !== before.edit ||
      now.findings !== before.findings ||
      now.fileAtHand !== before.fileAtHand
    )
      follow();
  });
  follow();
  return () => {
    stop();
    follow();
  };
}
