import './history.css';
import { memo, useMemo, useState } from 'react';
import type { Hide } from '../export/report-hiding';
import type { Interval } from '../recording/span';
import { LOG_KIND_WORDS, LOG_KINDS, type LogKind } from '../session/log-words';
import { formatClock } from '../units/time';
import { useAnalysis, useApp, useSession, useView } from './app-context';
import type { PageActs } from './command';
import { heartRateOf, showPlace } from './comparing';
import { Dialog } from './dialog';
import { Choice, Field } from './fields';
import { type LogRow, logRows, useFitting } from './log-list';
import { useHide } from './use-hide';

/** Lines shown at once. */
const SHOWN = 50;
const ALL = 'all';

/** Who changed what, when, from what to what; a line goes to its place in the panes. */
export function LogDialog({ page }: { readonly page: PageActs }) {
  const { shell, view } = useApp();
  const session = useSession((state) => state.session);
  const recording = useAnalysis((state) => state.recording);
  const hidden = useView((state) => state.identityHidden);
  const rows = useMemo(
    () => (session ? logRows(session, heartRateOf(recording)) : []),
    [session, recording],
  );
  const reviewers = useMemo(() => [...new Set(rows.map(({ line }) => line.reviewer))], [rows]);
  const hide = useHide();
  const shown = useMemo(
    (): Shown => ({
      hide,
      hidden,
      nameOf: (reviewer) =>
        hidden ? `reviewer ${reviewers.length - reviewers.indexOf(reviewer)}` : reviewer,
      go: (place) => {
        shell.getState().closeDialog();
        showPlace(page, view, place);
      },
    }),
    [hide, hidden, reviewers, shell, page, view],
  );
  if (!session) return null;
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Log"
      subtitle="Every edit, newest first. No line is ever changed or taken out."
      size="large"
      onClose={close}
    >
      {rows.length === 0 ? (
        <p>Nothing has been edited yet: all is as the program proposed it.</p>
      ) : (
        <LogList rows={rows} reviewers={reviewers} shown={shown} />
      )}
    </Dialog>
  );
}

/** How rows are shown: who is named, and what a place does. */
interface Shown {
  readonly hide: Hide;
  readonly hidden: boolean;
  readonly nameOf: (reviewer: string) => string;
  readonly go: (place: Interval) => void;
}

interface LogListProps {
  readonly rows: readonly LogRow[];
  readonly reviewers: readonly string[];
  readonly shown: Shown;
}

function LogList({ rows, reviewers, shown }: LogListProps) {
  const [kind, setKind] = useState<LogKind | typeof ALL>(ALL);
  const [reviewer, setReviewer] = useState(ALL);
  const [text, setText] = useState('');
  const [most, setMost] = useState(SHOWN);
  const found = useFitting(rows, {
    kind: kind === ALL ? null : kind,
    reviewer: reviewer === ALL ? null : (reviewers[Number(reviewer)] ?? null),
    text,
  });
  const anew =
    <T,>(set: (value: T) => void) =>
    (value: T) => {
      setMost(SHOWN);
      set(value);
    };
  const kinds = LOG_KINDS.map((one) => [one, LOG_KIND_WORDS[one]] as const);
  const names = reviewers.map((name, i) => [String(i), shown.nameOf(name)] as const);
  const left = found.rows.length - most;
  return (
    <>
      <div className="log-filters">
        <Choice
          label="About"
          value={kind}
          options={[[ALL, 'everything'], ...kinds]}
          onChange={anew(setKind)}
        />
        <Choice
          label="By"
          value={reviewer}
          options={[[ALL, 'everybody'], ...names]}
          onChange={anew(setReviewer)}
        />
        <Field label="With the words" value={text} onChange={anew(setText)} autoFocus />
        <p role="status" className="quiet log-count">
          {found.rows.length} of {rows.length} {rows.length === 1 ? 'line' : 'lines'}
          {found.complete ? '' : ', looking on'}
        </p>
      </div>
      {found.rows.length === 0 && found.complete ? (
        <p>No line fits. Choose everything and everybody, or other words.</p>
      ) : (
        <LogTable rows={found.rows.slice(0, most)} shown={shown} />
      )}
      {left > 0 ? (
        <button type="button" className="button log-more" onClick={() => setMost(most + SHOWN)}>
          Show {Math.min(left, SHOWN)} more of {left}
        </button>
      ) : null}
    </>
  );
}

function LogTable({ rows, shown }: Pick<LogListProps, 'rows' | 'shown'>) {
  return (
    <table className="log-table">
      <thead>
        <tr>
          <th scope="col">edit</th>
          <th scope="col">when, UTC</th>
          <th scope="col">who</th>
          <th scope="col">what, from what to what</th>
          <th scope="col">where</th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <LogLineRow key={row.line.n} row={row} shown={shown} />
        ))}
      </tbody>
    </table>
  );
}

interface LogLineProps {
  readonly row: LogRow;
  readonly shown: Shown;
}

/** Drawn once, however often the list around it is. */
const LogLineRow = memo(function LogLineRow({ row, shown }: LogLineProps) {
  const { n, atUtc, reviewer } = row.line;
  const { act, changes, place } = row.words();
  const { hide } = shown;
  return (
    <tr>
      <th scope="row">{n}</th>
      <td>{shown.hidden ? 'hidden' : atUtc.slice(0, 19).replace('T', ' ')}</td>
      <td>{shown.nameOf(reviewer)}</td>
      <td>
        {hide(act)}
        {[...new Set(changes)].map((words) => (
          <span key={words} className="log-change">
            {hide(words)}
          </span>
        ))}
      </td>
      <td>
        {place ? (
          <button
            type="button"
            className="go"
            aria-label={`Go to the place of edit ${n}, ${formatClock(place.fromS)}`}
            onClick={() => shown.go(place)}
          >
            {formatClock(place.fromS)}
          </button>
        ) : null}
      </td>
    </tr>
  );
});
