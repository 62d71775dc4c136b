import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Failure } from '../recording/failure';
import type { FoundInFile, Recording } from '../recording/recording';
import type { KeptRow } from './controller';
import { readPreferences, type ThemeChoice, writePreferences } from './preferences';

/** The dialog that stands over the page. */
export type DialogState =
  | { readonly kind: 'none' }
  | {
      readonly kind: 'identity';
      readonly recording: Recording;
      readonly quickKey: string;
      readonly found: readonly FoundInFile[];
      /** The session of this study that will be continued, where one is kept. */
      readonly kept?: KeptRow | null;
    }
  /** Asks who edits; `act` runs once the name is set. Stands on top of the dialog that was open. */
  | { readonly kind: 'reviewer'; readonly act: () => void }
  | { readonly kind: 'roles' }
  | { readonly kind: 'phases' }
  | { readonly kind: 'protocol' }
  | { readonly kind: 'settings' }
  | { readonly kind: 'go-to' }
  | { readonly kind: 'keys' }
  | { readonly kind: 'about' }
  | { readonly kind: 'sign' }
  | { readonly kind: 'text-reading'; readonly file: File; readonly failure: Failure }
  | { readonly kind: 'failure'; readonly failure: Failure }
  | { readonly kind: 'figure'; readonly key: string; readonly phase: string }
  | { readonly kind: 'choose-same-file'; readonly code: string; readonly quickKey: string };

/** A short word to the person, said politely; `problem` stays until it is put away. */
export interface Message {
  readonly id: number;
  readonly kind: 'note' | 'problem';
  readonly text: string;
  /** True where the message may offer to undo what it tells of. */
  readonly undo: boolean;
}

export interface ShellState {
  readonly dialog: DialogState;
  /** The dialog below a reviewer's dialog; it comes back when that one closes. */
  readonly under: DialogState;
  readonly messages: readonly Message[];
  /** What the last act did, in the line at the foot; each one takes the place of the one before. */
  readonly status: string;
  readonly theme: ThemeChoice;
  /** Keys that are a single letter, digit or sign act only while this is on. */
  readonly plainKeys: boolean;
  openDialog(dialog: DialogState): void;
  closeDialog(): void;
  say(text: string, undo?: boolean): void;
  sayProblem(text: string): void;
  tell(status: string): void;
  putAway(id: number): void;
  setTheme(theme: ThemeChoice): void;
  setPlainKeys(on: boolean): void;
}

export type ShellStore = StoreApi<ShellState>;

const NONE: DialogState = { kind: 'none' };
const MOST_MESSAGES = 4;
/** How long the status line speaks of an act. */
const STATUS_MS = 12_000;

/** The store of the page's own state: dialog, messages, theme, keys. Preferences are kept in local storage. */
export function createShellStore(storage: Storage | null): ShellStore {
  let nextId = 1;
  return createStore<ShellState>()((set, get) => {
    const add = (kind: Message['kind'], text: string, undo: boolean) => {
      const message = { id: nextId, kind, text, undo };
      nextId += 1;
      set((before) => ({ messages: [...before.messages, message].slice(-MOST_MESSAGES) }));
    };
    const prefer = (change: Partial<Pick<ShellState, 'theme' | 'plainKeys'>>) => {
      set(change);
      const { theme, plainKeys } = get();
      writePreferences(storage, { theme, plainKeys });
    };
    return {
      ...readPreferences(storage),
      dialog: NONE,
      under: NONE,
      messages: [],
      status: '',
      openDialog: (dialog) =>
        set((before) => ({
          dialog,
          under:
            dialog.kind === 'reviewer' && before.dialog.kind !== 'reviewer' ? before.dialog : NONE,
        })),
      closeDialog: () => set((before) => ({ dialog: before.under, under: NONE })),
      say: (text, undo = false) => add('note', text, undo),
      sayProblem: (text) => add('problem', text, false),
      tell: (status) => {
        set({ status });
        setTimeout(() => set((now) => (now.status === status ? { status: '' } : now)), STATUS_MS);
      },
      putAway: (id) =>
        set((before) => ({ messages: before.messages.filter((one) => one.id !== id) })),
      setTheme: (theme) => prefer({ theme }),
      setPlainKeys: (plainKeys) => prefer({ plainKeys }),
    };
  });
}
