import { useEffect, useState } from 'react';
import type { Failure } from '../recording/failure';
import { FIGURES, type FigureDefinition } from '../recording/figure-catalogue';
import { figureWords } from '../recording/figure-words';
import type { Findings } from '../recording/findings';
import type { Session } from '../session/document';
import { editNumber } from '../session/store';
import { stateInputs } from './analysis-runner';
import { useAnalysis, useApp } from './app-context';
import { Tick } from './fields';
import { keepFigures, keptFigures, markOf } from './figures-kept';
import { FailureWords } from './small-dialogs';

/** The figures that the other session gives; null until they are there. */
function useOtherFigures(other: Session): {
  readonly findings: Findings | null;
  readonly failure: Failure | null;
} {
  const { controller } = useApp();
  const fileAtHand = useAnalysis((state) => state.fileAtHand);
  const [failure, setFailure] = useState<Failure | null>(null);
  const [, setTold] = useState(0);
  const mark = markOf(other, editNumber(other));
  const findings = keptFigures(mark) ?? null;
  const wanted = fileAtHand && findings === null;
  useEffect(() => {
    if (!wanted) return;
    const abort = new AbortController();
    const inputs = stateInputs(other.state, editNumber(other));
    void controller.figuresOf([inputs], { signal: abort.signal }).then((reply) => {
      if (abort.signal.aborted) return;
      if (reply.ok) keepFigures(mark, reply.value[0]);
      else setFailure(reply.failure);
      setTold((n) => n + 1);
    });
    return () => abort.abort();
  }, [wanted, other, mark, controller]);
  return { findings, failure };
}

interface FigureRow {
  readonly key: string;
  readonly label: string;
  readonly phase: string;
  readonly here: string;
  readonly there: string;
}

/** Every figure of every phase that either session has, in words. */
function rowsOf(here: Findings, there: Findings): readonly FigureRow[] {
  const names = [...new Set([...here.phases, ...there.phases].map(({ name }) => name))];
  return names.flatMap((phase) =>
    FIGURES.map(
      (figure): FigureRow => ({
        key: `${phase} ${figure.key}`,
        label: figure.unit === '' ? figure.label : `${figure.label}, ${figure.unit}`,
        phase,
        here: wordsIn(here, phase, figure),
        there: wordsIn(there, phase, figure),
      }),
    ),
  );
}

function wordsIn(findings: Findings, name: string, figure: FigureDefinition): string {
  const phase = findings.phases.find((one) => one.name === name);
  if (!phase) return `— (no ${name})`;
  const { large, small } = figureWords(phase.figures[figure.key], figure);
  return large === '—' ? `— (${small[0]})` : large;
}

/** The figures of both sessions beside each other: those that differ, or all. */
export function FiguresCompared({ other }: { readonly other: Session }) {
  const here = useAnalysis((state) => state.findings);
  const fileAtHand = useAnalysis((state) => state.fileAtHand);
  const { findings: there, failure } = useOtherFigures(other);
  const [all, setAll] = useState(false);
  if (failure) return <FailureWords failure={failure} />;
  if (!here || !there)
    return (
      <p role="status">
        {fileAtHand
          ? 'The figures of the other session are being computed.'
          : 'The figures of the other session can be computed once the recording’s file is open.'}
      </p>
    );
  const rows = rowsOf(here, there);
  const differing = rows.filter((row) => row.here !== row.there);
  return (
    <section className="compared-places" aria-label="Figures">
      <div className="compared-head">
        <h3>Figures</h3>
        <p>
          {differing.length === 0
            ? `All ${rows.length} figures are the same.`
            : `${differing.length} of ${rows.length} differ.`}
        </p>
        <Tick label="Show all figures" checked={all} onChange={setAll} />
      </div>
      {all || differing.length > 0 ? <FigureRows rows={all ? rows : differing} /> : null}
    </section>
  );
}

function FigureRows({ rows }: { readonly rows: readonly FigureRow[] }) {
  return (
    <table className="compared-table compared-figures">
      <thead>
        <tr>
          <th scope="col">figure</th>
          <th scope="col">phase</th>
          <th scope="col">here</th>
          <th scope="col">there</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ key, label, phase, here, there }) => (
          <tr key={key}>
            <th scope="row">{label}</th>
            <td>{phase}</td>
            <td>{here}</td>
            <td>{there}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
