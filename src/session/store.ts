import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Edit, Session } from './document';
import { appendEdit, appendRedo, appendUndo, redoableEdit, undoableEdit } from './log';

/** Where the work stands, for the bar: never where it was once. */
export type KeptWhere =
  | { readonly kind: 'nowhere'; readonly why: string }
  | { readonly kind: 'browser'; readonly edit: number }
  | { readonly kind: 'file'; readonly edit: number; readonly fileName: string }
  | { readonly kind: 'saving'; readonly edit: number };

export interface SessionStoreState {
  readonly session: Session | null;
  /** Name typed by who edits now; '' until asked. */
  readonly reviewer: string;
  readonly kept: KeptWhere;
  begin(session: Session): void;
  close(): void;
  setReviewer(name: string): void;
  setKept(kept: KeptWhere): void;
  /** Adds one edit as one undo step; throws when no session is open or no reviewer is set. */
  apply(edit: Edit): void;
  /** Takes back the last edit that stands; returns its name, null where there is none. */
  undo(): string | null;
  redo(): string | null;
}

export type SessionStore = StoreApi<SessionStoreState>;

/** Number of the last log line: the edit number that figures carry. */
export const editNumber = (session: Session): number => session.log.length;

/** The one store of what reviewers made. `nowUtc` gives the time written in the log. */
export function createSessionStore(nowUtc: () => string): SessionStore {
  return createStore<SessionStoreState>()((set, get) => {
    const grow = (next: Session) => set({ session: next });
    const opened = (): Session => {
      const { session } = get();
      if (!session) throw new Error('no session is open');
      return session;
    };
    return {
      session: null,
      reviewer: '',
      kept: { kind: 'nowhere', why: 'nothing is open' },
      begin: (session) => set({ session }),
      close: () => set({ session: null, kept: { kind: 'nowhere', why: 'nothing is open' } }),
      setReviewer: (reviewer) => set({ reviewer }),
      setKept: (kept) => set({ kept }),
      apply: (edit) => {
        const { reviewer } = get();
        if (reviewer === '') throw new Error('an edit wants a reviewer');
        grow(appendEdit(opened(), edit, reviewer, nowUtc()));
      },
      undo: () => {
        const session = opened();
        const last = undoableEdit(session);
        if (!last) return null;
        grow(appendUndo(session, get().reviewer, nowUtc()));
        return last.name;
      },
      redo: () => {
        const session = opened();
        const next = redoableEdit(session);
        if (!next) return null;
        grow(appendRedo(session, get().reviewer, nowUtc()));
        return next.name;
      },
    };
  });
}
