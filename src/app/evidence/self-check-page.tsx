import './self-check.css';
import { useEffect, useState } from 'react';
import type { Failure } from '../../recording/failure';
import {
  type CheckLine,
  checkCount,
  failedChecks,
  type SelfCheck,
} from '../../recording/self-check';
import { asWork } from '../../review/idle';
import { PROGRAM } from '../../units/program';
import { useApp } from '../app-context';
import { FailureWords } from '../small-dialogs';

type Run =
  | { readonly kind: 'running'; readonly step: string; readonly done: number }
  | { readonly kind: 'done'; readonly check: SelfCheck }
  | { readonly kind: 'failed'; readonly failure: Failure };

const BEGUN: Run = { kind: 'running', step: 'Starting', done: 0 };

/** Runs the check values while the page is in sight, and shows each with what came out. */
export function SelfCheckPage() {
  const [round, setRound] = useState(1);
  return <OneRun key={round} onAgain={() => setRound(round + 1)} />;
}

function OneRun({ onAgain }: { readonly onAgain: () => void }) {
  const run = useRun();
  if (run.kind === 'running')
    return (
      <p className="quiet" role="status">
        {run.step}, {Math.floor(100 * run.done)} %. It takes about ten seconds; leaving this page
        stops it.
      </p>
    );
  return (
    <>
      {run.kind === 'failed' ? (
        <FailureWords failure={run.failure} />
      ) : (
        <Outcome check={run.check} />
      )}
      <button type="button" className="button self-check-again" onClick={onAgain}>
        Run again
      </button>
    </>
  );
}

/** One run of all checks from the first drawing on; it is given up when the page goes out of sight. */
function useRun(): Run {
  const { evidenceAccess } = useApp();
  const [run, setRun] = useState<Run>(BEGUN);
  useEffect(() => {
    const abort = new AbortController();
    const { signal } = abort;
    const tell = (next: Run) => {
      if (!signal.aborted) setRun(next);
    };
    const onProgress = (step: string, done: number) => tell({ kind: 'running', step, done });
    void asWork(evidenceAccess.selfCheck({ signal, onProgress })).then((reply) =>
      tell(
        reply.ok
          ? { kind: 'done', check: reply.value }
          : { kind: 'failed', failure: reply.failure },
      ),
    );
    return () => abort.abort();
  }, [evidenceAccess]);
  return run;
}

function Outcome({ check }: { readonly check: SelfCheck }) {
  const failed = failedChecks(check);
  return (
    <>
      <p role="status">
        <strong>{checkCount(check)}.</strong> {PROGRAM}.{' '}
        {failed === 0
          ? 'This machine makes the values that theory and literature give.'
          : 'Do not rely on figures made on this machine before the reason is known: tell who maintains the program, with the lines marked FAIL.'}
      </p>
      <table className="data-table self-check">
        <caption>Check values, in the order of the project’s list</caption>
        <thead>
          <tr>
            <th scope="col">id</th>
            <th scope="col">what, and its source</th>
            <th scope="col">expected</th>
            <th scope="col">got</th>
            <th scope="col">tolerance</th>
            <th scope="col">result</th>
          </tr>
        </thead>
        <tbody>
          {check.lines.map((line) => (
            <Line key={`${line.id} ${line.what}`} line={line} />
          ))}
        </tbody>
      </table>
      <p className="small">Of the project’s list these are not run:</p>
      <ul className="plain-list small">
        {check.leftOut.map(({ ids, why }) => (
          <li key={ids.join()}>
            {ids.join(', ')}: {why}.
          </li>
        ))}
      </ul>
    </>
  );
}

function Line({ line: { id, what, source, expected, got, tolerance, passed } }: LineProps) {
  return (
    <tr>
      <th scope="row">{id}</th>
      <td>
        {what}
        <span className="self-check-source">{source}</span>
      </td>
      <td>{expected}</td>
      <td>{got}</td>
      <td>{tolerance}</td>
      <td>{passed ? 'pass' : <strong>FAIL</strong>}</td>
    </tr>
  );
}

interface LineProps {
  readonly line: CheckLine;
}
