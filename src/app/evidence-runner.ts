import type { ReviewInputs } from '../../workers/analysis-api';
import type { AnalysisClient } from '../../workers/analysis-client';
import type { SettledDoubt } from '../recording/doubt';
import { EVIDENCE_PARTS, type EvidencePart } from '../recording/evidence/evidence';
import { evidenceLines } from '../recording/evidence/evidence-words';
import type { DoubtStore } from '../review/doubt-store';
import type { EvidenceSearch, EvidenceStore } from '../review/evidence-store';
import { NO_EVIDENCE } from '../review/evidence-store';
import type { SessionStore } from '../session/store';
import { inputsOf, sameInputs } from './analysis-runner';

export type EvidenceAccess = Pick<AnalysisClient, 'evidence' | 'settingsMap' | 'selfCheck'>;

interface RunnerParts {
  readonly session: SessionStore;
  readonly doubts: DoubtStore;
  readonly evidence: EvidenceStore;
  readonly evidenceAccess: EvidenceAccess;
}

interface Asked {
  readonly inputs: ReviewInputs;
  readonly settled: readonly SettledDoubt[];
}

const same = (a: Asked, b: Asked): boolean =>
  sameInputs(a.inputs, b.inputs) && a.settled === b.settled;

/**
 * Keeps the evidence in step with the session: one part after the other, begun once figures and doubts belong to the last
 * edit, given up where an edit makes it useless. Holds as long as the page lives. What was stopped or failed is begun again by
 * `acts.again`.
 */
export function runEvidence({ session, doubts, evidence, evidenceAccess }: RunnerParts): void {
  let asked: Asked | null = null;
  let running: AbortController | null = null;

  const show = (part: EvidencePart, search: EvidenceSearch) =>
    evidence.setState(({ searches }) => ({ searches: { ...searches, [part]: search } }));

  function stop(): void {
    running?.abort();
    running = null;
    asked = null;
  }

  function follow(): void {
    const open = session.getState().session;
    if (!open) {
      stop();
      evidence.setState({ ...NO_EVIDENCE });
      return;
    }
    const now = { inputs: inputsOf(open), settled: open.state.doubts };
    if (asked && same(asked, now)) {
      if (!running) belongTo(now.inputs.edit);
      return;
    }
    stop();
    const { search, edit } = doubts.getState();
    if (search.kind !== 'there' || edit !== now.inputs.edit) {
      for (const part of EVIDENCE_PARTS) show(part, { kind: 'waiting' });
      return;
    }
    void compute(now);
  }

  /** Edits of words alone reach no figure: what is there belongs to them too. */
  function belongTo(edit: number): void {
    evidence.setState(({ found }) => ({
      found: Object.fromEntries(
        Object.entries(found).map(([part, one]) => [part, { ...one, edit }]),
      ),
    }));
  }

  async function compute(now: Asked): Promise<void> {
    const abort = new AbortController();
    running = abort;
    asked = now;
    for (const part of EVIDENCE_PARTS) {
      const onProgress = (_: string, done: number) => {
        if (running === abort) show(part, { kind: 'looking', done });
      };
      show(part, { kind: 'looking', done: 0 });
      const { signal } = abort;
      const reply = await evidenceAccess.evidence(now.inputs, now.settled, part, {
        signal,
        onProgress,
      });
      if (running !== abort) return;
      if (reply.ok) {
        const { edit, value } = reply.value;
        evidence.setState(({ found }) => ({ found: { ...found, [part]: { edit, value } } }));
        show(part, { kind: 'there' });
      } else show(part, { kind: 'failed', failure: reply.failure });
    }
    running = null;
    follow();
  }

  session.subscribe((now, before) => {
    if (now.session?.start !== before.session?.start) {
      stop();
      evidence.setState({ ...NO_EVIDENCE });
    }
    if (now.session !== before.session) follow();
  });
  doubts.subscribe((now, before) => {
    if (now.search !== before.search || now.edit !== before.edit) follow();
  });
  evidence.setState({
    linesOf: evidenceLines,
    acts: {
      stop: () => running?.abort(),
      again() {
        stop();
        follow();
      },
    },
  });
  follow();
}
