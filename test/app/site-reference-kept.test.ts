import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { createShellStore } from '../../src/app/shell-store';
import { dropReference, keepReference, recallReference } from '../../src/app/site-reference-kept';
import { siteReferenceOf } from '../../src/session/read-site-reference';

const TEXT = readFileSync('public/site-reference-example.csv', 'utf8');
const KEPT = { fileName: 'ours.csv', reference: siteReferenceOf(TEXT, 'ours.csv') };

/** A storage as browsers have it, in memory; `full` refuses what is new. */
function memoryStorage(full = false): Storage {
  const items = new Map<string, string>();
  const storage: Storage = {
    get length() {
      return items.size;
    },
    clear: () => items.clear(),
    getItem: (key) => items.get(key) ?? null,
    key: (index) => [...items.keys()][index] ?? null,
    removeItem: (key) => void items.delete(key),
    setItem(key, value) {
      if (full) throw new DOMException('full', 'QuotaExceededError');
      items.set(key, value);
    },
  };
  return storage;
}

describe('the reference values of the site', () => {
  it('are there again on the next visit of this browser', async () => {
    const storage = memoryStorage();
    expect(keepReference(createShellStore(null), storage, KEPT, TEXT)).toBe(true);
    const next = createShellStore(null);
    await recallReference(next, storage);
    expect(next.getState().siteReference).toEqual(KEPT);
  });

  it('are gone from it once they are removed', async () => {
    const storage = memoryStorage();
    const shell = createShellStore(null);
    keepReference(shell, storage, KEPT, TEXT);
    dropReference(shell, storage);
    expect(shell.getState().siteReference).toBeNull();
    expect(storage.length).toBe(0);
    await recallReference(shell, storage);
    expect(shell.getState().siteReference).toBeNull();
  });

  it('are in use, and it is said that they are not kept, where the browser keeps nothing', () => {
    for (const storage of [memoryStorage(true), null]) {
      const shell = createShellStore(null);
      expect(keepReference(shell, storage, KEPT, TEXT)).toBe(false);
      expect(shell.getState().siteReference).toEqual(KEPT);
    }
  });

  it.each(['nonsense', '{"fileName":1,"text":2}', '{"fileName":"a.csv","text":"figure"}'])(
    'are none where what is kept is %s',
    async (kept) => {
      const storage = memoryStorage();
      storage.setItem('bicadence.site-reference', kept);
      const shell = createShellStore(null);
      await recallReference(shell, storage);
      expect(shell.getState().siteReference).toBeNull();
    },
  );

  it('do not come along into the room view, whose shell is a new one', () => {
    expect(createShellStore(null).getState().siteReference).toBeNull();
  });
});
