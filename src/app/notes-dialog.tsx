import { useState } from 'react';
import { goTo } from '../review/navigate';
import type { Edit, SessionState } from '../session/document';
import {
  changeNote,
  type KeptNote,
  type NotedKind,
  notesOf,
  removeNote,
  writeNote,
} from '../session/note-edits';
import { timeText } from '../units/typed-time';
import { useApp, useSession, useView, withReviewer } from './app-context';
import { editNameShown } from './edit-name';
import { EntryDialog } from './entry-dialog';
import { Choice, Field } from './fields';
import { blankNote, draftOf, type NoteDraft, type NoteFaults, readNote } from './note-draft';
import { TimeField, timeRule, useTimeFrame } from './time-field';
import { useFirstField } from './use-first-field';

/** Where an event or symptom is to be written at once; the dialog closes when it is. */
interface NoteHere {
  readonly kind: NotedKind;
  readonly atS: number;
}

/** Events and symptoms: written at a time, changed, taken out. */
export function NotesDialog({ here }: { readonly here: NoteHere | null }) {
  const state = useSession((now) => now.session?.state);
  return state ? <NotesForm state={state} here={here} /> : null;
}

function NotesForm({
  state,
  here,
}: {
  readonly state: SessionState;
  readonly here: NoteHere | null;
}) {
  const parts = useApp();
  const frame = useTimeFrame();
  const [draft, setDraft] = useState(() => blankNote(here?.kind ?? 'event', here?.atS ?? null));
  const [changing, setChanging] = useState<KeptNote | null>(null);
  const [tried, setTried] = useState(false);
  const [done, setDone] = useState('');
  const { form, again } = useFirstField(here === null ? 0 : 1);
  const read = readNote(draft, frame);
  const close = () => parts.shell.getState().closeDialog();
  const begin = (note: KeptNote | null) => {
    setChanging(note);
    setDraft(note ? draftOf(note) : blankNote(draft.kind, null));
    setTried(false);
    again();
  };
  const put = (edit: Edit, then: () => void) =>
    withReviewer(parts, () => {
      parts.controller.edit(edit);
      const { identityHidden } = parts.view.getState();
      setDone(`Done: ${editNameShown(edit.name, identityHidden)}`);
      then();
    });
  const save = () => {
    setTried(true);
    if (!read.ok) return;
    const { note } = read;
    const edit = changing ? changeNote(state, changing.id, note) : writeNote(state, note);
    put(edit, () => (here && !changing ? close() : begin(null)));
  };
  return (
    <EntryDialog
      title="Events and symptoms"
      subtitle={timeRule(frame)}
      size="medium"
      legend={changing ? `Change the ${changing.kind}` : 'Write an event or a symptom'}
      fields={
        <NoteFields
          draft={draft}
          fixed={changing !== null}
          faults={tried && !read.ok ? read.faults : {}}
          onChange={setDraft}
        />
      }
      form={form}
      go="Write it"
      changing={changing !== null}
      done={done}
      onSave={save}
      onLeave={() => begin(null)}
      onClose={close}
    >
      <NoteTable
        notes={notesOf(state)}
        onChange={begin}
        onRemove={(note) => {
          put(removeNote(state, note.kind, note.id), () => (changing ? begin(null) : again()));
        }}
        onGo={(note) => {
          close();
          goTo(parts.view, note.atS);
        }}
      />
    </EntryDialog>
  );
}

interface NoteFieldsProps {
  readonly draft: NoteDraft;
  /** True where the kind cannot be chosen: a note stays of its kind. */
  readonly fixed: boolean;
  readonly faults: NoteFaults;
  readonly onChange: (draft: NoteDraft) => void;
}

const KINDS = [
  ['event', 'event'],
  ['symptom', 'symptom'],
] as const;
const SYMPTOMS = ['nausea', 'fullness', 'bloating', 'pain', 'belching', 'hunger'];
const EVENTS = ['drank 200 ml', 'turned over', 'sat up', 'talked', 'coughed', 'asleep', 'awake'];

function NoteFields({ draft, fixed, faults, onChange }: NoteFieldsProps) {
  const frame = useTimeFrame();
  const type = (parts: Partial<NoteDraft>) => onChange({ ...draft, ...parts });
  const symptom = draft.kind === 'symptom';
  return (
    <div className={fixed ? 'note-fields fixed' : 'note-fields'}>
      {fixed ? null : (
        <Choice
          label="what it is"
          value={draft.kind}
          options={KINDS}
          onChange={(kind) => type({ kind })}
        />
      )}
      <TimeField
        label="at"
        value={draft.at}
        frame={frame}
        onChange={(at) => type({ at })}
        error={faults.at}
      />
      <Field
        label={symptom ? 'what is felt' : 'what happened'}
        value={draft.text}
        suggestions={symptom ? SYMPTOMS : EVENTS}
        onChange={(text) => type({ text })}
        error={faults.text}
      />
      {symptom ? (
        <Field
          label="score, 0 to 10"
          size="short"
          inputMode="decimal"
          value={draft.score}
          onChange={(score) => type({ score })}
          error={faults.score}
        />
      ) : null}
    </div>
  );
}

interface NoteTableProps {
  readonly notes: readonly KeptNote[];
  readonly onChange: (note: KeptNote) => void;
  readonly onRemove: (note: KeptNote) => void;
  readonly onGo: (note: KeptNote) => void;
}

function NoteTable({ notes, onChange, onRemove, onGo }: NoteTableProps) {
  const hidden = useView((view) => view.identityHidden);
  if (notes.length === 0)
    return (
      <p className="quiet">Nothing is written yet. The file’s annotations stay as they are.</p>
    );
  return (
    <table className="acts-table">
      <caption>Events and symptoms written</caption>
      <thead>
        <tr>
          <th scope="col">time</th>
          <th scope="col">what</th>
          <th scope="col">score</th>
          <th scope="col">acts</th>
        </tr>
      </thead>
      <tbody>
        {notes.map((note) => {
          const time = timeText(note.atS);
          const words = hidden ? `${note.kind}, words hidden` : note.text;
          return (
            <tr key={`${note.kind} ${note.id}`}>
              <td>
                <button type="button" className="go" onClick={() => onGo(note)}>
                  {time}
                  <span className="unseen">: go there</span>
                </button>
              </td>
              <td>{words}</td>
              <td>{note.kind === 'symptom' ? `${note.score}/10` : ''}</td>
              <td>
                <button
                  type="button"
                  className="button slight"
                  aria-label={`Change ${note.kind} at ${time}`}
                  onClick={() => onChange(note)}
                >
                  Change
                </button>
                <button
                  type="button"
                  className="button slight"
                  aria-label={`Remove ${note.kind} at ${time}`}
                  onClick={() => onRemove(note)}
                >
                  Remove
                </button>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
