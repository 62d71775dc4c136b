import { useState } from 'react';
import { leftWords, timeLeft } from '../review/minutes-left';
import type { SessionState } from '../session/document';
import { formatClock } from '../units/time';
import { type TimeFrame, timeText } from '../units/typed-time';
import {
  type AppParts,
  useAnalysis,
  useApp,
  useSession,
  useView,
  withReviewer,
} from './app-context';
import { Dialog } from './dialog';
import { FormActions } from './form-actions';
import { addRow, type PhaseRow, proposedFed, readPhases, rowsOf } from './phase-draft';
import { type AimedField, PhaseTable } from './phase-table';
import { timeRule, useSnapPlaces, useTimeFrame } from './time-field';

/** Phases by typed times, with the file's annotations and the reviewer's events at hand. */
export function PhasesDialog() {
  const state = useSession((now) => now.session?.state);
  return state ? <PhasesForm before={state} /> : null;
}

interface PhasesFormProps {
  readonly before: SessionState;
}

function PhasesForm({ before }: PhasesFormProps) {
  const parts = useApp();
  const frame = useTimeFrame();
  const [rows, setRows] = useState(() => rowsOf(before.phases));
  const [field, setField] = useState<AimedField | null>(null);
  const [tried, setTried] = useState(false);
  const { phases, errors } = readPhases(rows, frame);
  const close = () => parts.shell.getState().closeDialog();
  const save = () => {
    setTried(true);
    if (Object.keys(errors).length === 0) savePhases(parts, before, phases, close);
  };
  const put = (seconds: number) =>
    setRows((now) =>
      now.map((row) =>
        field && row.id === field.id ? { ...row, [field.end]: timeText(seconds) } : row,
      ),
    );
  return (
    <Dialog
      title="Phases"
      subtitle={`The recording is ${formatClock(frame.durationS)} long. ${timeRule(frame)}`}
      onClose={close}
      onSubmit={save}
      actions={<FormActions stay="Leave as it was" go="Use these phases" onStay={close} />}
    >
      <PhaseTable
        rows={rows}
        frame={frame}
        errors={tried ? errors : onlyTyped(rows, errors)}
        field={field}
        onField={setField}
        onChange={setRows}
      />
      <Left state={before} phases={Object.keys(errors).length > 0 ? [] : phases} />
      <RowActs rows={rows} frame={frame} onChange={setRows} />
      <TimeChips field={field} onPut={put} />
    </Dialog>
  );
}

/** One undo step, where anything changed. */
function savePhases(
  parts: AppParts,
  before: SessionState,
  phases: SessionState['phases'],
  close: () => void,
): void {
  if (phasesText(rowsOf(phases)) === phasesText(rowsOf(before.phases))) {
    close();
    return;
  }
  withReviewer(parts, () => {
    parts.controller.changePhases(phases);
    close();
  });
}

const phasesText = (rows: readonly PhaseRow[]): string =>
  rows.map((row) => `${row.name} ${row.from} ${row.to}`).join('\n');

/** While nobody has tried to save, rows with an empty field are not yet faulty. */
function onlyTyped(rows: readonly PhaseRow[], errors: ReturnType<typeof readPhases>['errors']) {
  const typed = rows.filter((row) => row.from.trim() !== '' && row.to.trim() !== '');
  return Object.fromEntries(
    typed.flatMap((row) => (errors[row.id] ? [[row.id, errors[row.id]]] : [])),
  );
}

/** The minutes of the typed phases and what is left of them; nothing while something is wrong with one. */
function Left({
  state,
  phases,
}: {
  readonly state: SessionState;
  readonly phases: SessionState['phases'];
}) {
  const gaps = useAnalysis((now) => now.recording?.gaps) ?? [];
  if (phases.length === 0) return null;
  const { spans, roles, study } = state;
  const left = timeLeft({ phases, spans, roles, gaps, durationS: study.durationS });
  return <p className="small quiet">{left.map(leftWords).join('; ')}.</p>;
}

interface RowActsProps {
  readonly rows: readonly PhaseRow[];
  readonly frame: TimeFrame;
  readonly onChange: (rows: readonly PhaseRow[]) => void;
}

function RowActs({ rows, frame, onChange }: RowActsProps) {
  const fed = proposedFed(rows, frame);
  return (
    <p className="button-row">
      <button type="button" className="button slight" onClick={() => onChange(addRow(rows, frame))}>
        Add a phase
      </button>
      {fed ? (
        <button type="button" className="button slight" onClick={() => onChange(fed.rows)}>
          {fed.words}
        </button>
      ) : null}
    </p>
  );
}

interface TimeChipsProps {
  readonly field: AimedField | null;
  readonly onPut: (seconds: number) => void;
}

const MOST_CHIPS = 80;

function TimeChips({ field, onPut }: TimeChipsProps) {
  const hidden = useView((view) => view.identityHidden);
  const chips = useSnapPlaces();
  if (chips.length === 0)
    return <p className="quiet">The file has no annotations to take times from.</p>;
  return (
    <section aria-labelledby="chips-title">
      <h3 id="chips-title">Times from annotations and events</h3>
      <p className="small quiet">
        {field === null
          ? 'Go to a time above, then choose one here to put it there.'
          : `Chosen time goes to the ${field.end === 'from' ? 'start' : 'end'} of ${field.name}.`}
      </p>
      <ul className="chips">
        {chips.slice(0, MOST_CHIPS).map((chip) => (
          <li key={`${chip.atS} ${chip.text}`}>
            <button
              type="button"
              className="button slight"
              disabled={field === null}
              onClick={() => onPut(chip.atS)}
            >
              {timeText(chip.atS)} {hidden ? '' : chip.text}
            </button>
          </li>
        ))}
      </ul>
      {chips.length > MOST_CHIPS ? (
        <p className="small quiet">The first {MOST_CHIPS} are listed.</p>
      ) : null}
    </section>
  );
}
