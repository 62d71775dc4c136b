import { HIGHEST_SCORE, type KeptNote, type Noted, type NotedKind } from '../session/note-edits';
import { readTypedTime, type TimeFrame, timeText, typedTimeFault } from '../units/typed-time';
import { readNumber } from './number-field';

/** An event or symptom as it is being typed. */
export interface NoteDraft {
  readonly kind: NotedKind;
  readonly at: string;
  readonly text: string;
  /** '' while none is typed; events have none. */
  readonly score: string;
}

export type NoteFaults = Partial<Readonly<Record<'at' | 'text' | 'score', string>>>;
export type ReadNote =
  | { readonly ok: true; readonly note: Noted }
  | { readonly ok: false; readonly faults: NoteFaults };

const SCORE = { least: 0, most: HIGHEST_SCORE, unit: '', whole: true } as const;

export const blankNote = (kind: NotedKind, atS: number | null): NoteDraft => ({
  kind,
  at: atS === null ? '' : timeText(atS),
  text: '',
  score: '',
});

export const draftOf = (note: KeptNote): NoteDraft => ({
  kind: note.kind,
  at: timeText(note.atS),
  text: note.text,
  score: note.kind === 'symptom' ? String(note.score) : '',
});

/** Reads what is typed: an event or symptom, or what is wrong with each field. */
export function readNote({ kind, at, text, score }: NoteDraft, frame: TimeFrame): ReadNote {
  const read = readTypedTime(at, frame);
  const wrongAt = typedTimeFault(at, frame);
  const words = text.trim();
  const wrongText =
    words !== '' ? null : kind === 'event' ? 'Say what happened.' : 'Say what is felt.';
  const scored = readNumber(kind === 'symptom' ? score : '0', SCORE);
  if ((read.kind !== 'study' && read.kind !== 'clock') || wrongText !== null || !scored.ok)
    return {
      ok: false,
      faults: {
        ...(wrongAt === null ? {} : { at: wrongAt }),
        ...(wrongText === null ? {} : { text: wrongText }),
        ...(scored.ok ? {} : { score: scored.error }),
      },
    };
  const { atS } = read;
  return {
    ok: true,
    note:
      kind === 'event'
        ? { kind, atS, text: words }
        : { kind, atS, text: words, score: scored.value },
  };
}
