import type { Phase } from '../recording/phase';
import type { SessionState } from '../session/document';
import { HIGHEST_SCORE, notesOf } from '../session/note-edits';
import { timeText } from '../units/typed-time';
import type { Hide } from './report-hiding';

/** An event or symptom as the report prints it. */
export interface EventRow {
  readonly time: string;
  /** The phase it lies in; a dash between phases. */
  readonly phase: string;
  readonly what: string;
  /** "6 of 10" of a symptom; '' of an event. */
  readonly score: string;
}

function phaseAt(phases: readonly Phase[], atS: number): string {
  const last = phases.at(-1);
  const found = phases.find(({ fromS, toS }) => atS >= fromS && atS < toS);
  return (found ?? (last?.toS === atS ? last : undefined))?.name ?? '–';
}

/** Events and symptoms in the order of time, each with its phase. */
export function eventRows(
  state: Pick<SessionState, 'events' | 'symptoms' | 'phases'>,
  hide: Hide,
): readonly EventRow[] {
  return notesOf(state).map((note) => ({
    time: timeText(note.atS),
    phase: phaseAt(state.phases, note.atS),
    what: hide(note.text),
    score: note.kind === 'symptom' ? `${note.score} of ${HIGHEST_SCORE}` : '',
  }));
}
