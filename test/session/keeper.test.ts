import { describe, expect, it } from 'vitest';
import { SESSION_VERSION, type Session } from '../../src/session/document';
import { setField } from '../../src/session/edits';
import { createKeeper, type Keeper, whereKept } from '../../src/session/keeper';
import { appendEdit, beginSession } from '../../src/session/log';
import { sameValue } from '../../src/session/same-value';
import { AT, inventedState } from './invented-session';
import { MemoryStorage, MemoryStore } from './memory-stores';
import { workedSession } from './worked-session';

const KEY = inventedState().study.quickKey;
const fresh = () => beginSession(inventedState());
const note = (session: Session, text: string) =>
  appendEdit(session, setField(session.state, 'notes', text, `write ${text}`), 'A. Tech', AT);

interface Place {
  readonly store: MemoryStore;
  readonly storage: MemoryStorage;
}
const place = (): Place => ({ store: new MemoryStore(), storage: new MemoryStorage() });

/** A keeper whose idle moments come when `idle` is called. */
function tab({ store, storage }: Place, now = AT): { keeper: Keeper; idle: () => void } {
  let act: (() => void) | null = null;
  const keeper = createKeeper({
    indexedDB: store,
    localStorage: storage,
    program: 'Bicadence 0.1.0',
    nowUtc: () => now,
    later: (next) => {
      act = next;
      return () => {
        act = null;
      };
    },
  });
  return { keeper, idle: () => act?.() };
}

/** Keeps a session with some notes, one append each. */
async function worked(keeper: Keeper, count: number, from = fresh()): Promise<Session> {
  let session = from;
  await keeper.begin(session);
  for (let i = 0; i < count; i += 1) {
    session = note(session, `${session.log.length + 1}`);
    await keeper.append(session);
  }
  return session;
}

describe('keeping', () => {
  it('gives back every edit, also those after the last snapshot', async () => {
    const here = place();
    const { keeper } = tab(here);
    const session = await worked(keeper, 3);
    expect(here.store.written).toEqual(['snapshot', 1, 2, 3]);
    const found = await tab(here).keeper.find(KEY);
    expect(found).toMatchObject({ from: 'journal', note: null });
    expect(sameValue(found?.session, session)).toBe(true);
    expect(await keeper.find('other-key')).toBeNull();
  });

  it('writes one small record an edit, and a snapshot after 200 of them', async () => {
    const here = place();
    await worked(tab(here).keeper, 205);
    const lines = Array.from({ length: 199 }, (_, i) => i + 1);
    expect(here.store.written.slice(0, 200)).toEqual(['snapshot', ...lines]);
    expect(here.store.written.slice(200)).toEqual(['snapshot', 201, 202, 203, 204, 205]);
    expect(here.store.journal.get(KEY)).toHaveLength(5);
  });

  it('makes snapshot and copy in an idle moment', async () => {
    const here = place();
    const { keeper, idle } = tab(here);
    const session = await worked(keeper, 2);
    idle();
    await keeper.list();
    expect(here.store.journal.get(KEY)).toEqual([]);
    here.store.head.clear();
    const found = await tab(here).keeper.find(KEY);
    expect(found?.from).toBe('copy');
    expect(found?.note).toContain('the first was gone');
    expect(sameValue(found?.session, session)).toBe(true);
  });

  it('keeps a session with every kind of change', async () => {
    const here = place();
    const { keeper } = tab(here);
    const session = workedSession();
    await keeper.begin(fresh());
    await keeper.append(session);
    expect(sameValue((await keeper.find(KEY))?.session, session)).toBe(true);
  });
});

describe('when one place fails, the other goes on', () => {
  it('keeps every edit in the copy while the durable store is full, and goes back to it after', async () => {
    const here = place();
    const { keeper } = tab(here);
    let session = await worked(keeper, 1);
    here.store.fails = new DOMException('', 'QuotaExceededError');
    session = note(session, 'two');
    const report = await keeper.append(session);
    expect(report).toMatchObject({ journal: { kind: 'full' }, copy: null });
    expect(report.journal?.message).toContain('full');
    expect(whereKept(report)).toEqual({ kind: 'browser', edit: 2 });
    expect((await keeper.find(KEY))?.from).toBe('copy');
    here.store.fails = null;
    const found = await keeper.find(KEY);
    expect(found).toMatchObject({ from: 'copy' });
    expect(found?.note).toContain('last 1 edit');
    expect(sameValue(found?.session, session)).toBe(true);
    expect(await keeper.append(session)).toMatchObject({ journal: null });
    expect((await keeper.find(KEY))?.from).toBe('journal');
  });

  it('says that nothing can be kept where both are disabled', async () => {
    const none = { indexedDB: null, localStorage: null, program: 'x', nowUtc: () => AT };
    const keeper = createKeeper(none);
    const report = await keeper.begin(fresh());
    expect(report).toMatchObject({ journal: { kind: 'disabled' }, copy: { kind: 'disabled' } });
    expect(whereKept(report)).toMatchObject({ kind: 'nowhere' });
    expect(await keeper.append(note(fresh(), 'one'))).toMatchObject({ edit: 1 });
    expect(await keeper.list()).toEqual([]);
    keeper.close();
  });

  it('keeps the journal while local storage is blocked', async () => {
    const here = place();
    here.storage.broken = true;
    const { keeper } = tab(here);
    expect(await keeper.begin(fresh())).toMatchObject({
      journal: null,
      copy: { kind: 'disabled' },
    });
    const session = await worked(keeper, 2);
    expect((await keeper.find(KEY))?.session.log).toHaveLength(session.log.length);
  });
});

describe('nothing kept is overwritten', () => {
  it('by another session of the study, unless it is asked for', async () => {
    const here = place();
    const session = await worked(tab(here).keeper, 3);
    const { keeper } = tab(here);
    const other = note(fresh(), 'another');
    expect(await keeper.begin(other)).toMatchObject({ journal: { kind: 'occupied' } });
    expect(await keeper.append(note(other, 'more'))).toMatchObject({
      journal: { kind: 'occupied' },
      copy: { kind: 'occupied' },
    });
    expect(sameValue((await keeper.find(KEY))?.session, session)).toBe(true);
    expect(await keeper.begin(other, { replace: true })).toMatchObject({
      journal: null,
      copy: null,
    });
    expect(sameValue((await keeper.find(KEY))?.session, other)).toBe(true);
  });

  it('by a fresh start over the copy while the durable store is disabled', async () => {
    const here = place();
    const first = tab(here);
    await worked(first.keeper, 2);
    await first.keeper.snapshot();
    const blind = createKeeper({
      indexedDB: null,
      localStorage: here.storage,
      program: 'x',
      nowUtc: () => AT,
    });
    expect(await blind.begin(fresh())).toMatchObject({ copy: { kind: 'occupied' } });
    expect((await blind.find(KEY))?.session.log).toHaveLength(2);
  });

  it('by a first tab after a second one took the study over', async () => {
    const here = place();
    const first = tab(here);
    const session = await worked(first.keeper, 2);
    const second = tab(here);
    const found = await second.keeper.find(KEY);
    if (!found) throw new Error('kept');
    const onward = await worked(second.keeper, 1, found.session);
    expect(await first.keeper.append(note(session, 'late'))).toMatchObject({
      journal: { kind: 'other-tab' },
      copy: { kind: 'other-tab' },
    });
    expect(sameValue((await second.keeper.find(KEY))?.session, onward)).toBe(true);
  });

  it('where it was written by a newer program', async () => {
    const here = place();
    const { keeper } = tab(here);
    await worked(keeper, 1);
    await keeper.snapshot();
    const head = here.store.head.get(KEY);
    const text = here.store.snapshot
      .get(KEY)
      ?.text.replace(`"version":${SESSION_VERSION}`, '"version":9');
    if (!head || !text) throw new Error('kept');
    here.store.head.set(KEY, { ...head, version: 9 });
    here.store.snapshot.set(KEY, { n: 1, text });
    here.storage.clear();
    const later = tab(here).keeper;
    await expect(later.find(KEY)).rejects.toMatchObject({ failure: { kind: 'not-supported' } });
    expect(await later.begin(fresh())).toMatchObject({ journal: { kind: 'newer' } });
    expect(here.store.snapshot.get(KEY)?.text).toBe(text);
  });

  it('where it is damaged: the edit is named, and the copy used where it is whole', async () => {
    const here = place();
    const { keeper } = tab(here);
    const session = await worked(keeper, 1);
    await keeper.snapshot();
    await keeper.append(note(note(session, 'two'), 'three'));
    here.store.journal.set(KEY, [{ n: 3, text: here.store.journal.get(KEY)?.[1].text ?? '' }]);
    const found = await keeper.find(KEY);
    expect(found?.from).toBe('copy');
    expect(found?.note).toContain('damaged at edit 3');
    here.storage.clear();
    await expect(keeper.find(KEY)).rejects.toMatchObject({
      failure: { kind: 'broken-format', place: 'edit 3' },
    });
    here.store.journal.set(KEY, []);
    await expect(keeper.find(KEY)).rejects.toThrow('damaged at edit 2');
  });
});

describe('kept studies', () => {
  it('are listed by code, the latest first, without names, also where only a copy is left', async () => {
    const here = place();
    await worked(tab(here, '2026-03-01T10:00:00Z').keeper, 2);
    const other = inventedState();
    const study = { ...other.study, quickKey: 'k2', code: 'INV-9' };
    await tab(here, '2026-03-02T10:00:00Z').keeper.begin(beginSession({ ...other, study }));
    here.store.head.delete('k2');
    const list = await tab(here).keeper.list();
    expect(list.map((one) => [one.code, one.edits])).toEqual([
      ['INV-9', 0],
      ['INV-7', 2],
    ]);
    expect(Object.keys(list[1]).sort()).toEqual(
      ['code', 'durationS', 'edits', 'invented', 'quickKey', 'savedAtUtc', 'start'].sort(),
    );
    expect([...here.storage.map.keys()].join()).not.toContain('INV');
  });

  it('can be forgotten, one or all that are older, but not the one that is open', async () => {
    const here = place();
    const { keeper } = tab(here, '2026-03-01T10:00:00Z');
    await worked(keeper, 1);
    const late = tab(here, '2026-03-31T10:00:00Z').keeper;
    expect(await late.forgetOlderThan(31)).toBe(0);
    expect(await tab(here, '2026-05-01T00:00:00Z').keeper.forgetOlderThan(30)).toBe(1);
    expect(await late.list()).toEqual([]);
    expect(here.storage.map.size).toBe(0);
    const session = await worked(keeper, 2);
    expect(await keeper.forgetOlderThan(-1)).toBe(0);
    await late.forget(KEY);
    expect(await keeper.append(note(session, 'still here'))).toMatchObject({ journal: null });
    expect((await late.find(KEY))?.session.log).toHaveLength(3);
  });
});
