import { type Failure, Refusal } from '../recording/failure';
import type { Session } from './document';
import { failureOf } from './keep-failure';
import type { CopyStore } from './keep-local-storage';
import type { KeptRows, KeptStore } from './kept-store';
import { appendLine } from './log';
import { readLine, textToSession } from './read-document';

/** A kept session, from which of the two places, and what to tell the person about it. */
export interface FoundSession {
  readonly session: Session;
  readonly from: 'journal' | 'copy';
  readonly note: string | null;
}

type Look =
  | { readonly kind: 'nothing' }
  | { readonly kind: 'session'; readonly session: Session }
  | { readonly kind: 'refused'; readonly failure: Failure }
  | { readonly kind: 'closed'; readonly message: string };

/**
 * The session kept of a study: from the journal, or from the copy where that holds more or the journal cannot be read. Null
 * where there is none. Throws Refusal where what is kept is damaged or newer and no copy helps; nothing is changed.
 */
export async function findKept(
  store: KeptStore | null,
  copies: CopyStore | null,
  quickKey: string,
): Promise<FoundSession | null> {
  const journal = await lookInJournal(store, quickKey);
  const copy = lookInCopies(copies, quickKey);
  if (journal.kind === 'session') {
    const more = copy.kind === 'session' ? missing(journal.session, copy.session) : 0;
    if (copy.kind !== 'session' || more <= 0)
      return { session: journal.session, from: 'journal', note: null };
    const note = `The last ${more} edit(s) were found in the second copy only and taken from there.`;
    return { session: copy.session, from: 'copy', note };
  }
  if (copy.kind === 'session')
    return { session: copy.session, from: 'copy', note: noteOf(journal) };
  if (journal.kind === 'refused') throw new Refusal(journal.failure);
  if (copy.kind === 'refused') throw new Refusal(copy.failure);
  return null;
}

function noteOf(journal: Exclude<Look, { kind: 'session' }>): string {
  const from = 'The session was taken from the second copy kept in this browser';
  switch (journal.kind) {
    case 'nothing':
      return `${from}; the first was gone.`;
    case 'refused':
      return `${from}. ${journal.failure.message}`;
    case 'closed':
      return `${from}. ${journal.message}`;
  }
}

/** How many lines the copy has beyond the journal's session; 0 where it is another branch. */
function missing(journal: Session, copy: Session): number {
  const last = journal.log.at(-1);
  const same = last === undefined || JSON.stringify(copy.log[last.n - 1]) === JSON.stringify(last);
  return same ? copy.log.length - journal.log.length : 0;
}

async function lookInJournal(store: KeptStore | null, quickKey: string): Promise<Look> {
  if (!store) return { kind: 'nothing' };
  let rows: KeptRows | null;
  try {
    rows = await store.read(quickKey);
  } catch (error) {
    return { kind: 'closed', message: failureOf(error).message };
  }
  return rows === null ? { kind: 'nothing' } : read(() => sessionOf(rows));
}

function lookInCopies(copies: CopyStore | null, quickKey: string): Look {
  try {
    const copy = copies?.read(quickKey) ?? null;
    return copy === null ? { kind: 'nothing' } : read(() => textToSession(copy.text));
  } catch (error) {
    return { kind: 'closed', message: failureOf(error).message };
  }
}

function read(act: () => Session): Look {
  try {
    return { kind: 'session', session: act() };
  } catch (error) {
    if (error instanceof Refusal) return { kind: 'refused', failure: error.failure };
    throw error;
  }
}

function sessionOf({ head, snapshot, lines }: KeptRows): Session {
  const session = lines.reduce((so, { n, text }) => {
    try {
      return appendLine(so, readLine(JSON.parse(text)));
    } catch (error) {
      throw damaged(n, error instanceof Error ? error.message : String(error));
    }
  }, textToSession(snapshot.text));
  if (session.log.length !== head.edits)
    throw damaged(session.log.length + 1, `it ends before edit ${head.edits}`);
  return session;
}

const damaged = (line: number, why: string) =>
  new Refusal({
    kind: 'broken-format',
    message: `The session kept in this browser is damaged at edit ${line}: ${why}.`,
    place: `edit ${line}`,
    remedy: 'Open a downloaded session file of the study. What is kept was left as it is.',
  });
