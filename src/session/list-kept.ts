import type { CopyStore, SessionCopy } from './keep-local-storage';
import type { KeptHead, KeptStore } from './kept-store';
import { textToSession } from './read-document';

/** A kept session as the empty start lists it: by code, never by name. */
export interface KeptSummary {
  readonly quickKey: string;
  readonly code: string;
  readonly start: string | null;
  readonly durationS: number;
  readonly invented: boolean;
  readonly edits: number;
  readonly savedAtUtc: string;
}

/** The sessions kept in either place, the latest first; a copy that cannot be read is listed by its key alone. */
export async function listKept(
  store: KeptStore | null,
  copies: CopyStore | null,
): Promise<readonly KeptSummary[]> {
  const heads = (await headsOf(store)).map(
    ({ quickKey, code, start, durationS, invented, edits, savedAtUtc }) => ({
      quickKey,
      code,
      start,
      durationS,
      invented,
      edits,
      savedAtUtc,
    }),
  );
  const known = new Set(heads.map((head) => head.quickKey));
  const onlyCopies = copiesOf(copies)
    .filter((copy) => !known.has(copy.quickKey))
    .map(summaryOf);
  return [...heads, ...onlyCopies].sort(
    (a, b) => Number(a.savedAtUtc < b.savedAtUtc) - Number(a.savedAtUtc > b.savedAtUtc),
  );
}

async function headsOf(store: KeptStore | null): Promise<readonly KeptHead[]> {
  try {
    return (await store?.heads()) ?? [];
  } catch {
    return [];
  }
}

function copiesOf(copies: CopyStore | null): readonly SessionCopy[] {
  try {
    return copies?.all() ?? [];
  } catch {
    return [];
  }
}

function summaryOf({ quickKey, edits, savedAtUtc, text }: SessionCopy): KeptSummary {
  const row = { quickKey, edits, savedAtUtc };
  try {
    const { code, start, durationS, invented } = textToSession(text).state.study;
    return { ...row, code, start, durationS, invented };
  } catch {
    return { ...row, code: 'damaged or newer', start: null, durationS: 0, invented: false };
  }
}
