import { Refusal } from '../recording/failure';
import { timeText } from '../units/typed-time';
import type { Edit, SessionState, Symptom, TimedNote } from './document';
import { setField } from './edits';

/** What is written at a time: something that happened, or a symptom with its score from 0 to 10. */
export type Noted =
  | ({ readonly kind: 'event' } & Omit<TimedNote, 'id'>)
  | ({ readonly kind: 'symptom' } & Omit<Symptom, 'id'>);
export type NotedKind = Noted['kind'];

/** An event or symptom of the session, with its id. */
export type KeptNote = Noted & { readonly id: number };

export const HIGHEST_SCORE = 10;

/** Events and symptoms together, in the order of time. */
export function notesOf({ events, symptoms }: Pick<SessionState, 'events' | 'symptoms'>) {
  const notes: KeptNote[] = [
    ...events.map((one) => ({ kind: 'event' as const, ...one })),
    ...symptoms.map((one) => ({ kind: 'symptom' as const, ...one })),
  ];
  return notes.sort((a, b) => a.atS - b.atS);
}

/** "drank 200 ml", "nausea 6/10". */
export const notedWords = (note: Noted): string =>
  note.kind === 'event' ? note.text : `${note.text} ${note.score}/${HIGHEST_SCORE}`;

/** An event or symptom written at its time. Throws Refusal where it has no words, no time in the study or no such score. */
export function writeNote(state: SessionState, note: Noted): Edit {
  wantWhole(state, note);
  const id = 1 + Math.max(0, ...listOf(state, note.kind).map((one) => one.id));
  return replaced(state, note.kind, 'write', note, [
    ...notesOf(state),
    { ...note, text: note.text.trim(), id },
  ]);
}

/**
 * An event or symptom with other words, time or score; it keeps its id. Throws RangeError where there is none of that id,
 * Refusal as writeNote does.
 */
export function changeNote(state: SessionState, id: number, note: Noted): Edit {
  wantWhole(state, note);
  const before = noteAt(state, note.kind, id);
  const after = notesOf(state).map((one) =>
    one.kind === before.kind && one.id === id ? { ...note, text: note.text.trim(), id } : one,
  );
  return replaced(state, note.kind, 'change', note, after);
}

/** An event or symptom taken out. Throws RangeError where there is none of that id. */
export function removeNote(state: SessionState, kind: NotedKind, id: number): Edit {
  const gone = noteAt(state, kind, id);
  const left = notesOf(state).filter((one) => !(one.kind === kind && one.id === id));
  return replaced(state, kind, 'remove', gone, left);
}

const listOf = (state: SessionState, kind: NotedKind): readonly TimedNote[] =>
  kind === 'event' ? state.events : state.symptoms;

function noteAt(state: SessionState, kind: NotedKind, id: number): KeptNote {
  const found = notesOf(state).find((one) => one.kind === kind && one.id === id);
  if (!found) throw new RangeError(`no ${kind} of id ${id}`);
  return found;
}

/** The field of one kind made of what is listed, in the order of time. */
function replaced(
  state: SessionState,
  kind: NotedKind,
  verb: string,
  note: Noted,
  all: readonly KeptNote[],
): Edit {
  const name = `${verb} ${kind} ${timeText(note.atS)} ${notedWords({ ...note, text: note.text.trim() })}`;
  const sorted = [...all].sort((a, b) => a.atS - b.atS || a.id - b.id);
  if (kind === 'event') {
    const events = sorted.flatMap((one) =>
      one.kind === 'event' ? [{ id: one.id, atS: one.atS, text: one.text }] : [],
    );
    return setField(state, 'events', events, name);
  }
  const symptoms = sorted.flatMap((one) =>
    one.kind === 'symptom' ? [{ id: one.id, atS: one.atS, text: one.text, score: one.score }] : [],
  );
  return setField(state, 'symptoms', symptoms, name);
}

function wantWhole({ study }: SessionState, note: Noted): void {
  const inside = note.atS >= 0 && note.atS <= study.durationS;
  const scored =
    note.kind === 'event' ||
    (Number.isInteger(note.score) && note.score >= 0 && note.score <= HIGHEST_SCORE);
  if (inside && scored && note.text.trim() !== '') return;
  throw new Refusal({
    kind: 'wrong-input',
    message: `${note.kind === 'event' ? 'An event' : 'A symptom'} wants words, a time in the recording${
      note.kind === 'event' ? '' : ` and a whole score from 0 to ${HIGHEST_SCORE}`
    }.`,
    place: null,
    remedy: 'Type what is missing.',
  });
}
