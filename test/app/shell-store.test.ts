import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { LIBRARIES } from '../../src/app/libraries';
import { createShellStore, messagesInSight } from '../../src/app/shell-store';
import { meaningsNow, readSign } from '../../src/app/sign-draft';
import { hasUnfiledWork, keptWords, localWords } from '../../src/app/study-words';

/** A Storage over a map, as browsers have it. */
function mapStorage(): Storage {
  const map = new Map<string, string>();
  return {
    get length() {
      return map.size;
    },
    clear: () => map.clear(),
    getItem: (key) => map.get(key) ?? null,
    key: (index) => [...map.keys()][index] ?? null,
    removeItem: (key) => void map.delete(key),
    setItem: (key, value) => void map.set(key, value),
  };
}

describe('dialogs', () => {
  it('come back where the question who reviews stood on top of them', () => {
    const store = createShellStore(null);
    const { openDialog, closeDialog } = store.getState();
    openDialog({ kind: 'phases' });
    openDialog({ kind: 'reviewer', act: () => undefined });
    expect(store.getState()).toMatchObject({
      dialog: { kind: 'reviewer' },
      under: { kind: 'phases' },
    });
    closeDialog();
    expect(store.getState()).toMatchObject({ dialog: { kind: 'phases' }, under: { kind: 'none' } });
  });

  it('take the place of each other otherwise', () => {
    const store = createShellStore(null);
    store.getState().openDialog({ kind: 'phases' });
    store.getState().openDialog({ kind: 'settings' });
    store.getState().closeDialog();
    expect(store.getState().dialog.kind).toBe('none');
  });
});

describe('preferences', () => {
  it('are there again on the next visit', () => {
    const storage = mapStorage();
    createShellStore(storage).getState().setTheme('dark');
    createShellStore(storage).getState().setPlainKeys(false);
    expect(createShellStore(storage).getState()).toMatchObject({ theme: 'dark', plainKeys: false });
  });

  it('hold the keys a person has changed, and nothing of any study', () => {
    const storage = mapStorage();
    createShellStore(storage).getState().setOwnKeys({ 'next-beat': 'J' });
    expect(createShellStore(storage).getState().ownKeys).toEqual({ 'next-beat': 'J' });
    const kept: unknown = JSON.parse(storage.getItem('bicadence.preferences') ?? '');
    expect(Object.keys(kept as object).sort()).toEqual(['ownKeys', 'plainKeys', 'theme']);
  });

  it('are the defaults where what is kept makes no sense or storage fails', () => {
    const storage = mapStorage();
    storage.setItem('bicadence.preferences', '{"theme":"plaid","plainKeys":"no"');
    expect(createShellStore(storage).getState()).toMatchObject({
      theme: 'system',
      plainKeys: true,
    });
    storage.setItem('bicadence.preferences', '{"theme":"plaid","plainKeys":"no"}');
    expect(createShellStore(storage).getState()).toMatchObject({
      theme: 'system',
      plainKeys: true,
    });
    const broken = {
      ...mapStorage(),
      setItem: () => {
        throw new Error('full');
      },
    };
    const store = createShellStore(broken);
    store.getState().setTheme('light');
    expect(store.getState().theme).toBe('light');
  });
});

describe('messages', () => {
  const texts = (store: ReturnType<typeof createShellStore>) =>
    messagesInSight(store.getState().messages).map((one) => one.text);

  it('are two at most: the newest notes', () => {
    const store = createShellStore(null);
    for (const text of ['one', 'two', 'three']) store.getState().say(text);
    expect(texts(store)).toEqual(['two', 'three']);
    expect(store.getState().messages.length).toBe(2);
  });

  it('leave a problem where it is until it is put away, and further problems wait', () => {
    const store = createShellStore(null);
    store.getState().sayProblem('storage is full');
    store.getState().sayProblem('the worker stopped');
    store.getState().sayProblem('the hash differs');
    expect(texts(store)).toEqual(['storage is full', 'the worker stopped']);
    store.getState().say('one');
    store.getState().say('two');
    expect(texts(store)).toEqual(['storage is full', 'two']);
    for (const text of ['storage is full', 'two']) {
      const shown = store.getState().messages.find((one) => one.text === text);
      if (shown) store.getState().putAway(shown.id);
    }
    expect(texts(store)).toEqual(['the worker stopped', 'the hash differs']);
  });

  it('do not say twice what stands there already', () => {
    const store = createShellStore(null);
    store.getState().sayProblem('storage is full');
    store.getState().sayProblem('storage is full');
    expect(store.getState().messages.length).toBe(1);
  });
});

describe('where the work is', () => {
  it('is never where it was once', () => {
    const file = { kind: 'file', edit: 37, fileName: 'EG-0815.bicadence.json' } as const;
    expect(keptWords(file, 37)).toBe('in file, edit 37');
    expect(keptWords(file, 39)).toBe('in file, edit 37; 2 edits since in this browser only');
    expect(keptWords({ kind: 'browser', edit: 37 }, 37)).toBe('in this browser only, edit 37');
  });

  it('asks before leaving only while edits are in no file', () => {
    const file = { kind: 'file', edit: 37, fileName: 'x' } as const;
    expect(hasUnfiledWork(file, 37)).toBe(false);
    expect(hasUnfiledWork(file, 38)).toBe(true);
    expect(hasUnfiledWork({ kind: 'browser', edit: 1 }, 1)).toBe(true);
    expect(hasUnfiledWork({ kind: 'browser', edit: 0 }, 0)).toBe(false);
  });

  it('writes a start without the help of the machine’s language', () => {
    expect(localWords('2024-05-03T09:12:00')).toBe('2024-05-03, 09:12');
    expect(localWords('unknown')).toBe('unknown');
  });
});

describe('signing', () => {
  const signed = (meaning: 'prepared' | 'read' | 'amended') =>
    ({ meaning }) as Parameters<typeof meaningsNow>[0][number];

  it('amends what was read, and can be read after it was prepared', () => {
    expect(meaningsNow([])).toEqual(['prepared', 'read']);
    expect(meaningsNow([signed('prepared')])).toEqual(['prepared', 'read']);
    expect(meaningsNow([signed('prepared'), signed('read')])).toEqual(['amended']);
    expect(meaningsNow([signed('read'), signed('amended')])).toEqual(['amended']);
  });
});

describe('a signature', () => {
  const filled = {
    meaning: 'read',
    name: ' Ada ',
    reason: 'left over',
    notes: '',
    conclusion: 'steady',
    sure: true,
  } as const;

  it('wants the study confirmed and a name', () => {
    expect(readSign(filled).request).toEqual({
      meaning: 'read',
      name: 'Ada',
      reason: '',
      notes: '',
      conclusion: 'steady',
    });
    expect(readSign({ ...filled, sure: false }).request).toBeNull();
    expect(readSign({ ...filled, name: ' ' }).errors.name).not.toBeNull();
  });

  it('wants a reason where it amends', () => {
    const amended = { ...filled, meaning: 'amended' } as const;
    expect(readSign({ ...amended, reason: ' ' }).errors.reason).not.toBeNull();
    expect(readSign(amended).request?.reason).toBe('left over');
  });
});

describe('the libraries named in About', () => {
  it('are those of package.json, with the licence each declares', () => {
    const read = (path: string) => JSON.parse(readFileSync(path, 'utf8'));
    const wanted = Object.keys(read('package.json').dependencies).sort();
    expect(LIBRARIES.map((one) => one.name).sort()).toEqual(wanted);
    for (const { name, licence } of LIBRARIES)
      expect(read(`node_modules/${name}/package.json`).license, name).toBe(licence);
  });
});
