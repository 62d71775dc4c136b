import { type KeepFailure, keepFailure } from './keep-failure';

/** Largest copy of one session and of all together, in characters (nearly all of them one byte). */
export const COPY_LIMIT = 1_000_000;
export const ALL_COPIES_LIMIT = 5_000_000;

/** Keys carry the quick key of the study and nothing of who it is. */
const PREFIX = 'bicadence.session.';

/** A copy of a session's document, with what orders copies without reading them. */
export interface SessionCopy {
  readonly quickKey: string;
  readonly savedAtUtc: string;
  readonly edits: number;
  readonly text: string;
}

export interface CopyStore {
  /** Writes a copy; older copies of other studies give way. Null when done, else why not. Throws what the storage throws. */
  write(copy: SessionCopy): KeepFailure | null;
  read(quickKey: string): SessionCopy | null;
  all(): readonly SessionCopy[];
  forget(quickKey: string): void;
}

/** Copies of sessions in local storage, for the day the durable store is disabled or lost. */
export function copyStore(storage: Storage): CopyStore {
  const keys = () =>
    Array.from({ length: storage.length }, (_, i) => storage.key(i) ?? '').filter((key) =>
      key.startsWith(PREFIX),
    );
  const read = (quickKey: string) => parse(quickKey, storage.getItem(PREFIX + quickKey));
  const all = () => keys().flatMap((key) => read(key.slice(PREFIX.length)) ?? []);
  const oldestFirst = (except: string) =>
    all()
      .filter((copy) => copy.quickKey !== except)
      .sort((a, b) => Number(a.savedAtUtc > b.savedAtUtc) - Number(a.savedAtUtc < b.savedAtUtc));

  const write = (copy: SessionCopy): KeepFailure | null => {
    if (copy.text.length > COPY_LIMIT) return keepFailure('too-large');
    const others = oldestFirst(copy.quickKey);
    let size = others.reduce((sum, one) => sum + one.text.length, copy.text.length);
    for (;;) {
      if (size <= ALL_COPIES_LIMIT && tryPut(storage, PREFIX + copy.quickKey, textOf(copy)))
        return null;
      const oldest = others.shift();
      if (!oldest) return keepFailure('full');
      storage.removeItem(PREFIX + oldest.quickKey);
      size -= oldest.text.length;
    }
  };

  return { write, read, all, forget: (quickKey) => storage.removeItem(PREFIX + quickKey) };
}

const textOf = (copy: SessionCopy) => `${copy.savedAtUtc} ${copy.edits}\n${copy.text}`;

function parse(quickKey: string, value: string | null): SessionCopy | null {
  const found = value === null ? null : /^(\S+) (\d+)\n/.exec(value);
  if (value === null || !found) return null;
  const [line, savedAtUtc, edits] = found;
  return { quickKey, savedAtUtc, edits: Number(edits), text: value.slice(line.length) };
}

/** False where the storage is full; what was there under the key stays then. Throws what else the storage throws. */
function tryPut(storage: Storage, key: string, value: string): boolean {
  try {
    storage.setItem(key, value);
    return true;
  } catch (error) {
    if (error instanceof DOMException && /quota/i.test(error.name)) return false;
    throw error;
  }
}
