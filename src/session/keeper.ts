import type { Session } from './document';
import { type FoundSession, findKept } from './find-kept';
import { indexedDbStore } from './keep-indexeddb';
import { copyStore } from './keep-local-storage';
import { type KeptReport, keepAll, keepLines, type OpenSession } from './keep-writes';
import type { KeptStore } from './kept-store';
import { type KeptSummary, listKept } from './list-kept';
import type { KeptWhere } from './store';

/** Quiet after the last edit before a snapshot is made. */
const IDLE_MS = 5000;

/** Keeps sessions in this browser. Calls are done one after the other; none loses what was kept before. */
export interface Keeper {
  /**
   * Starts to keep a session. Where another session of the study is kept that this one does not continue, nothing is written
   * (`occupied`) unless `replace` says so. Never rejects.
   */
  begin(session: Session, options?: { readonly replace?: boolean }): Promise<KeptReport>;
  /** Keeps the lines of the log that are not kept yet: one small record each. Never rejects; throws where none is begun. */
  append(session: Session): Promise<KeptReport>;
  /** Makes the snapshot and the copy now, as when the page is hidden. */
  snapshot(): Promise<KeptReport | null>;
  /** The session kept of a study, null where there is none. Rejects with Refusal where it is damaged or newer; it stays. */
  find(quickKey: string): Promise<FoundSession | null>;
  /** Kept sessions, the latest first. */
  list(): Promise<readonly KeptSummary[]>;
  forget(quickKey: string): Promise<void>;
  /** Forgets what was last saved more than so many days ago, but not the session that is open; returns how many. */
  forgetOlderThan(days: number): Promise<number>;
  /** Stops keeping; what is kept stays. */
  close(): void;
}

export interface KeeperOptions {
  readonly indexedDB: IDBFactory | KeptStore | null;
  readonly localStorage: Storage | null;
  readonly program: string;
  readonly nowUtc: () => string;
  /** Runs `act` after a time unless the returned function is called before; setTimeout unless given. */
  readonly later?: (act: () => void, ms: number) => () => void;
}

/** The keeper of one page. */
export function createKeeper(options: KeeperOptions): Keeper {
  const store = storeOf(options.indexedDB);
  const copies = options.localStorage && copyStore(options.localStorage);
  const later = options.later ?? afterTimeout;
  let open: OpenSession | null = null;
  let cancelIdle = () => {};
  let chain: Promise<unknown> = Promise.resolve();
  const inTurn = <T>(act: () => Promise<T>): Promise<T> => {
    const done = chain.then(act, act);
    chain = done.catch(() => undefined);
    return done;
  };
  const places = { store, copies, program: options.program, nowUtc: options.nowUtc };
  const stopIdle = () => {
    cancelIdle();
    cancelIdle = () => {};
  };
  const snapshotSoon = (now: OpenSession) => {
    stopIdle();
    cancelIdle = later(() => {
      void inTurn(async () => (open === now ? keepAll(places, now, 'own') : null));
    }, IDLE_MS);
  };

  const forget = async (quickKey: string): Promise<void> => {
    if (open?.session.state.study.quickKey === quickKey) stopIdle();
    copies?.forget(quickKey);
    await store?.forget(quickKey);
  };

  return {
    begin: (session, { replace = false } = {}) => {
      stopIdle();
      const now: OpenSession = {
        session,
        writer: token(),
        kept: -1,
        snapshotAt: 0,
        barred: null,
        ownsCopy: replace,
      };
      open = now;
      return inTurn(() => keepAll(places, now, replace ? 'any' : 'continued'));
    },
    append: (session) => {
      const now = open;
      if (now?.session.state.study.quickKey !== session.state.study.quickKey)
        throw new Error('a session is begun before its edits are kept');
      now.session = session;
      snapshotSoon(now);
      return inTurn(() => keepLines(places, now));
    },
    snapshot: () => {
      const now = open;
      stopIdle();
      return inTurn(async () => (now ? keepAll(places, now, 'own') : null));
    },
    find: (quickKey) => inTurn(() => findKept(store, copies, quickKey)),
    list: () => inTurn(() => listKept(store, copies)),
    forget: (quickKey) => inTurn(() => forget(quickKey)),
    forgetOlderThan: (days) =>
      inTurn(async () => {
        const limit = Date.parse(options.nowUtc()) - days * 86_400_000;
        const old = (await listKept(store, copies)).filter(
          (one) =>
            Date.parse(one.savedAtUtc) < limit &&
            one.quickKey !== open?.session.state.study.quickKey,
        );
        for (const one of old) await forget(one.quickKey);
        return old.length;
      }),
    close: () => {
      stopIdle();
      open = null;
    },
  };
}

/** Where the bar says the work is, after a report. */
export function whereKept(report: KeptReport): KeptWhere {
  if (report.journal === null || report.copy === null)
    return { kind: 'browser', edit: report.edit };
  return { kind: 'nowhere', why: report.journal.message };
}

function storeOf(given: IDBFactory | KeptStore | null): KeptStore | null {
  return given && 'open' in given ? indexedDbStore(given) : given;
}

function token(): string {
  return [...crypto.getRandomValues(new Uint32Array(4))].map((one) => one.toString(36)).join('-');
}

function afterTimeout(act: () => void, ms: number): () => void {
  const timer = setTimeout(act, ms);
  return () => clearTimeout(timer);
}
