import './history.css';
import { useEffect, useMemo, useRef, useState } from 'react';
import type { Failure } from '../recording/failure';
import type { FigureDefinition } from '../recording/figure-catalogue';
import { figureWords } from '../recording/figure-words';
import type { Findings } from '../recording/findings';
import type { Session } from '../session/document';
import { type FigureState, figureStates } from '../session/figure-states';
import { actWords, logEntries } from '../session/log-words';
import { editNumber } from '../session/store';
import { stateInputs } from './analysis-runner';
import { useAnalysis, useApp, useSession, useView } from './app-context';
import { keepFigures, keptFigures, markOf } from './figures-kept';
import { FailureWords } from './small-dialogs';
import { useHide } from './use-hide';

/** Edits looked at one by one; what went before them is told together. */
const MOST_EDITS = 40;

interface FigureHistoryProps {
  readonly definition: FigureDefinition;
  /** Name of the phase or part. */
  readonly part: string;
}

/** What a figure was as the program found it, and what each edit made of it. */
export function FigureHistory({ definition, part }: FigureHistoryProps) {
  const session = useSession((state) => state.session);
  const states = useMemo(() => session && figureStates(session, MOST_EDITS), [session]);
  if (!session || !states) return null;
  if (states.along.length === 0)
    return (
      <p className="small quiet">
        No edit has reached the figures: this is as the program found it.
      </p>
    );
  const all = [states.start, ...states.along];
  return (
    <Known
      key={editNumber(session)}
      {...{ session, all, definition, part }}
      together={states.together}
    />
  );
}

interface KnownProps extends FigureHistoryProps {
  readonly session: Session;
  readonly all: readonly FigureState[];
  readonly together: number;
}

/** The history once all of its figures are there; a way to compute them until then. */
function Known({ session, all, together, definition, part }: KnownProps) {
  const { missing, compute, work } = useMissing(session, all);
  if (missing === 0) return <History {...{ session, all, together, definition, part }} />;
  return (
    <section className="figure-history" aria-label="History">
      <h3>History</h3>
      {work.kind === 'failed' ? <FailureWords failure={work.failure} /> : null}
      {work.kind === 'running' ? (
        <p className="button-row">
          <progress max={1} value={work.done} aria-label="Computing the figures of earlier edits" />
          <button type="button" className="button slight" onClick={work.stop}>
            Stop
          </button>
        </p>
      ) : (
        <Start missing={missing} onStart={compute} />
      )}
    </section>
  );
}

function Start({ missing, onStart }: { readonly missing: number; readonly onStart: () => void }) {
  const fileAtHand = useAnalysis((state) => state.fileAtHand);
  if (!fileAtHand)
    return <p className="small quiet">It can be computed once the recording’s file is open.</p>;
  return (
    <p className="button-row">
      <button type="button" className="button" onClick={onStart}>
        Show what the edits changed
      </button>
      <span className="small quiet">
        {missing === 1 ? 'One state' : `${missing} states`} of the session to compute.
      </span>
    </p>
  );
}

type Work =
  | { readonly kind: 'none' }
  | { readonly kind: 'running'; readonly done: number; readonly stop: () => void }
  | { readonly kind: 'failed'; readonly failure: Failure };

/** The figures that are not kept, and a way to have the worker compute them; leaving the dialog stops it. */
function useMissing(session: Session, all: readonly FigureState[]) {
  const { controller } = useApp();
  const [work, setWork] = useState<Work>({ kind: 'none' });
  const running = useRef<AbortController | null>(null);
  useEffect(() => () => running.current?.abort(), []);
  const missing = all.filter(({ edit }) => !keptFigures(markOf(session, edit)));
  const compute = () => {
    const abort = new AbortController();
    running.current = abort;
    const stop = () => abort.abort();
    setWork({ kind: 'running', done: 0, stop });
    const inputs = missing.map(({ state, edit }) => stateInputs(state, edit));
    const onProgress = (_: string, done: number) => setWork({ kind: 'running', done, stop });
    void controller.figuresOf(inputs, { signal: abort.signal, onProgress }).then((reply) => {
      if (reply.ok)
        reply.value.forEach((findings, i) => {
          keepFigures(markOf(session, missing[i].edit), findings);
        });
      const stopped = reply.ok || reply.failure.kind === 'cancelled';
      setWork(stopped ? { kind: 'none' } : { kind: 'failed', failure: reply.failure });
    });
  };
  return { missing: missing.length, compute, work };
}

/** One state of the figure: what led to it, and its words. */
interface Step {
  readonly edit: number;
  readonly who: string;
  readonly what: string;
  readonly words: string;
}

/** The figure in words as it stands in some findings; a withheld one with its reason. */
function wordsIn(findings: Findings | undefined, { definition, part }: FigureHistoryProps): string {
  const phase = findings?.phases.find(({ name }) => name === part);
  if (!phase) return `— (no ${part})`;
  const { large, small } = figureWords(phase.figures[definition.key], definition);
  return large === '—' ? `— (${small[0]})` : large;
}

/** The states in which the figure reads otherwise than in the one before, the first and the last always. */
function stepsOf(props: KnownProps): readonly Step[] {
  const { session, all, together } = props;
  const entries = logEntries(session, { rateHzOf: () => null });
  const steps = all.map(({ edit }): Step => {
    const words = wordsIn(keptFigures(markOf(session, edit)), props);
    if (edit === 0) return { edit, who: '', what: 'as the program found it', words };
    if (edit === together) return { edit, who: '', what: `edits 1–${edit}, together`, words };
    const entry = entries[edit - 1];
    return { edit, who: entry.line.reviewer, what: actWords(entry), words };
  });
  return steps.filter((step, i) => i === 0 || step.words !== steps[i - 1].words);
}

function History(props: KnownProps) {
  const hidden = useView((state) => state.identityHidden);
  const hide = useHide();
  const steps = stepsOf(props);
  const { session, definition, part } = props;
  const [first, last] = [steps[0], steps[steps.length - 1]];
  const edits = editNumber(session);
  const after = edits === 1 ? '1 edit' : `${edits} edits`;
  const change =
    steps.length === 1
      ? `${first.words} ${definition.unit}, the same after ${after}`
      : `${first.words} → ${last.words} ${definition.unit} after ${after}`;
  return (
    <section className="figure-history" aria-label="History">
      <p>
        {definition.label}, {part}: <strong>{change}</strong>
        <span className="small quiet"> Edits that left it as it was are not listed.</span>
      </p>
      <table className="history-table">
        <caption>History</caption>
        <thead>
          <tr>
            <th scope="col">edit</th>
            {hidden ? null : <th scope="col">who</th>}
            <th scope="col">what</th>
            <th scope="col">
              {definition.label}, {definition.unit}
            </th>
          </tr>
        </thead>
        <tbody>
          {steps.map(({ edit, who, what, words }) => (
            <tr key={edit}>
              <th scope="row">{edit === 0 ? '—' : edit}</th>
              {hidden ? null : <td>{who}</td>}
              <td>{hide(what)}</td>
              <td>{words}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
