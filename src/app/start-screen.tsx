import { useCallback, useEffect, useState } from 'react';
import { CAUTIONS, PRIVACY } from '../recording/cautions';
import { useApp, useShell } from './app-context';
import type { CommandParts } from './command';
import type { KeptRow } from './controller';
import { localWords } from './study-words';

/** The page before a study is open: what the program is for, the ways in, the cautions. */
export function StartScreen({ parts }: { readonly parts: CommandParts }) {
  return (
    <main className="start">
      <div className="start-ways">
        <section aria-labelledby="start-title">
          <h2 id="start-title" className="start-title">
            Stomach and heart, read from one recording
          </h2>
          <p className="start-job">
            Bicadence reads a recording from electrodes on the abdomen, shows the stomach’s slow
            wave and the heartbeat on one clock, lets you mend and exclude what is wrong, and puts
            the figures of both into one signed report.
          </p>
        </section>
        <OpenWays parts={parts} />
        <KeptSessions />
      </div>
      <section className="start-cautions" aria-labelledby="start-cautions">
        <h3 id="start-cautions">Before you rely on it</h3>
        <ul>
          {CAUTIONS.map((caution) => (
            <li key={caution}>{caution}</li>
          ))}
        </ul>
      </section>
    </main>
  );
}

function OpenWays({ parts }: { readonly parts: CommandParts }) {
  const { page, controller } = parts;
  return (
    <>
      <section aria-labelledby="start-open">
        <h3 id="start-open">Open a recording</h3>
        <p>
          EDF, EDF+, BDF, BDF+ or delimited text. Choose a file, or drop one anywhere on this page.{' '}
          {PRIVACY}
        </p>
        <p className="button-row">
          <button type="button" className="button strong" onClick={page.chooseFile}>
            Open a file…
          </button>
          <button type="button" className="button" onClick={page.chooseSession}>
            Open a session file…
          </button>
        </p>
      </section>
      <section aria-labelledby="start-demo">
        <h3 id="start-demo">Look round first</h3>
        <p>
          The demo study is invented: 90 minutes that the program generates, of nobody. It opens
          like any file and says everywhere that it is made up.
        </p>
        <p className="button-row">
          <button type="button" className="button" onClick={() => void controller.openDemo()}>
            Try the demo study
          </button>
        </p>
      </section>
    </>
  );
}

function KeptSessions() {
  const { controller } = useApp();
  const [rows, setRows] = useState<readonly KeptRow[] | null>(null);
  const dialogOpen = useShell((state) => state.dialog.kind !== 'none');
  const refresh = useCallback(() => {
    let current = true;
    controller.keptSessions().then(
      (kept) => current && setRows(kept),
      () => current && setRows([]),
    );
    return () => {
      current = false;
    };
  }, [controller]);
  useEffect(() => (dialogOpen ? undefined : refresh()), [dialogOpen, refresh]);
  return (
    <section aria-labelledby="start-kept">
      <h3 id="start-kept">Continue a session</h3>
      {rows === null || rows.length === 0 ? (
        <p>
          {rows === null ? 'Looking for kept sessions…' : 'No session is kept in this browser.'}
        </p>
      ) : (
        <ul className="kept-list">
          {rows.map((row) => (
            <KeptSession key={row.quickKey} row={row} onForgotten={refresh} />
          ))}
        </ul>
      )}
    </section>
  );
}

interface KeptSessionProps {
  readonly row: KeptRow;
  readonly onForgotten: () => void;
}

function KeptSession({ row, onForgotten }: KeptSessionProps) {
  const { controller, shell } = useApp();
  const [sure, setSure] = useState(false);
  const forget = () => {
    controller.forget(row.quickKey).then(
      () => {
        shell.getState().say(`Session ${row.code} is forgotten.`);
        onForgotten();
      },
      () => shell.getState().sayProblem(`Session ${row.code} could not be forgotten. Try again.`),
    );
  };
  const edits = row.edits === 1 ? '1 edit' : `${row.edits} edits`;
  return (
    <li>
      <button
        type="button"
        className="button kept-open"
        onClick={() => void controller.continueKept(row.quickKey)}
      >
        <strong>{row.code}</strong>
        {row.invented ? <span className="badge">invented data</span> : null}
        <span className="quiet">
          {row.start === null ? 'start not known' : `recorded ${localWords(row.start)}`} · {edits}
        </span>
      </button>
      {sure ? (
        <span className="button-row">
          <button type="button" className="button slight" onClick={forget}>
            Forget for good
          </button>
          <button type="button" className="button slight" onClick={() => setSure(false)}>
            Keep
          </button>
        </span>
      ) : (
        <button
          type="button"
          className="button slight"
          aria-label={`Forget session ${row.code}…`}
          onClick={() => setSure(true)}
        >
          Forget…
        </button>
      )}
    </li>
  );
}
