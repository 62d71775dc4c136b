import { useState } from 'react';
import type { Annotation, Recording } from '../recording/recording';
import type { SessionState, TimedNote } from '../session/document';
import { setField } from '../session/edits';
import { formatClock } from '../units/time';
import {
  type AppParts,
  useAnalysis,
  useApp,
  useSession,
  useView,
  withReviewer,
} from './app-context';
import { Dialog } from './dialog';
import { type EventsDraft, EventsEditor } from './events-editor';
import { FormActions } from './form-actions';
import {
  addRow,
  NO_EVENT,
  type PhaseRow,
  proposedFed,
  readPhases,
  rowsOf,
  timeText,
  withTypedEvent,
} from './phase-draft';
import { PhaseTable, type TimeField } from './phase-table';

/** Phases by typed times, with the file's annotations and the reviewer's events at hand. */
export function PhasesDialog() {
  const state = useSession((now) => now.session?.state);
  const recording = useAnalysis((now) => now.recording);
  return state ? <PhasesForm before={state} recording={recording} /> : null;
}

interface PhasesFormProps {
  readonly before: SessionState;
  readonly recording: Recording | null;
}

function PhasesForm({ before, recording }: PhasesFormProps) {
  const parts = useApp();
  const { durationS } = before.study;
  const [rows, setRows] = useState(() => rowsOf(before.phases));
  const [noted, setNoted] = useState(() => eventsDraft(before.events));
  const [field, setTimeField] = useState<TimeField | null>(null);
  const [tried, setTried] = useState(false);
  const { phases, errors } = readPhases(rows, durationS);
  const close = () => parts.shell.getState().closeDialog();
  const save = () => {
    setTried(true);
    const grown = withTypedEvent(noted.events, noted.typed, durationS);
    if (!grown.ok) setNoted({ ...noted, tried: true });
    if (!grown.ok || Object.keys(errors).length > 0) return;
    saveAll(parts, before, { phases, events: grown.events }, close);
  };
  const put = (seconds: number) =>
    setRows((now) =>
      now.map((row) =>
        field && row.id === field.id ? { ...row, [field.end]: timeText(seconds) } : row,
      ),
    );
  return (
    <Dialog
      title="Phases and events"
      subtitle={`Times from the start of the recording, which is ${formatClock(durationS)} long: seconds, m:ss or h:mm:ss.`}
      onClose={close}
      onSubmit={save}
      actions={<FormActions stay="Leave as it was" go="Use these phases" onStay={close} />}
    >
      <PhaseTable
        rows={rows}
        errors={tried ? errors : onlyTyped(rows, errors)}
        field={field}
        onField={setTimeField}
        onChange={setRows}
      />
      <RowActs rows={rows} durationS={durationS} onChange={setRows} />
      <TimeChips
        annotations={recording?.annotations ?? []}
        events={noted.events}
        field={field}
        onPut={put}
      />
      <EventsEditor draft={noted} durationS={durationS} onChange={setNoted} />
    </Dialog>
  );
}

const eventsDraft = (events: readonly TimedNote[]): EventsDraft => ({
  events,
  typed: NO_EVENT,
  tried: false,
});

/** One undo step for the phases and one for the events, each only where it changed. */
function saveAll(
  parts: AppParts,
  before: SessionState,
  { phases, events }: Pick<SessionState, 'phases' | 'events'>,
  close: () => void,
): void {
  const newPhases = phasesText(rowsOf(phases)) !== phasesText(rowsOf(before.phases));
  const newEvents = events !== before.events;
  if (!newPhases && !newEvents) {
    close();
    return;
  }
  withReviewer(parts, () => {
    if (newPhases) parts.controller.changePhases(phases);
    const now = parts.session.getState().session?.state;
    if (now && newEvents) parts.controller.edit(setField(now, 'events', events, 'change events'));
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

interface RowActsProps {
  readonly rows: readonly PhaseRow[];
  readonly durationS: number;
  readonly onChange: (rows: readonly PhaseRow[]) => void;
}

function RowActs({ rows, durationS, onChange }: RowActsProps) {
  const fed = proposedFed(rows, durationS);
  return (
    <p className="button-row">
      <button
        type="button"
        className="button slight"
        onClick={() => onChange(addRow(rows, durationS))}
      >
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
  readonly annotations: readonly Annotation[];
  readonly events: readonly TimedNote[];
  readonly field: TimeField | null;
  readonly onPut: (seconds: number) => void;
}

interface Chip {
  readonly atS: number;
  readonly text: string;
}

const sameChip = (a: Chip, b: Chip): boolean => a.atS === b.atS && a.text === b.text;
const MOST_CHIPS = 80;

function TimeChips({ annotations, events, field, onPut }: TimeChipsProps) {
  const hidden = useView((view) => view.identityHidden);
  const chips = [
    ...annotations.flatMap(({ onsetS, durationS, text }) => [
      { atS: onsetS, text },
      ...(durationS !== null && durationS > 0
        ? [{ atS: onsetS + durationS, text: `end of ${text}` }]
        : []),
    ]),
    ...events.map(({ atS, text }) => ({ atS, text })),
  ]
    .filter((one, i, all) => all.findIndex((it) => sameChip(it, one)) === i)
    .sort((a, b) => a.atS - b.atS);
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
