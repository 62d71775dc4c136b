import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Failure } from '../recording/failure';
import type { FoundInFile, Recording } from '../recording/recording';
import type { KeptReference } from '../recording/site-reference';
import type { Session } from '../session/document';
import type { NotedKind } from '../session/note-edits';
import type { KeptRow } from './controller';
import type { EvidencePageId } from './evidence-page-id';
import type { OwnKeys } from './own-keys';
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
  | { readonly kind: 'all-beats-again'; readonly act: () => void }
  | { readonly kind: 'roles' }
  | { readonly kind: 'phases' }
  | { readonly kind: 'spans' }
  /** `here`: what is to be written at which time; null: all that is written. */
  | {
      readonly kind: 'notes';
      readonly here: { readonly kind: NotedKind; readonly atS: number } | null;
    }
  | { readonly kind: 'protocol' }
  | { readonly kind: 'settings' }
  | { readonly kind: 'go-to' }
  | { readonly kind: 'beats-between' }
  | { readonly kind: 'find-within' }
  | { readonly kind: 'add-bookmark' }
  | { readonly kind: 'bookmarks' }
  | { readonly kind: 'site-reference' }
  | { readonly kind: 'keys' }
  | { readonly kind: 'about' }
  | { readonly kind: 'log' }
  | { readonly kind: 'compare' }
  | { readonly kind: 'sign' }
  | { readonly kind: 'text-reading'; readonly file: File; readonly failure: Failure }
  | { readonly kind: 'failure'; readonly failure: Failure }
  | { readonly kind: 'figure'; readonly key: string; readonly phase: string }
  | { readonly kind: 'results' }
  | { readonly kind: 'evidence'; readonly page: EvidencePageId }
  | { readonly kind: 'look-alikes'; readonly doubtId: string }
  | { readonly kind: 'choose-same-file'; readonly code: string; readonly quickKey: string };

/** A short word to the person, said politely; `problem` stays until it is put away. */
export interface Message {
  readonly id: number;
  readonly kind: 'note' | 'problem';
  readonly text: string;
}

/** Another session of the open study, to compare with, and the difference gone to last (-1: none yet). */
export interface Compared {
  readonly session: Session;
  readonly fileName: string;
  readonly at: number;
}

export interface ShellState {
  readonly dialog: DialogState;
  /** The dialog below a reviewer's dialog; it comes back when that one closes. */
  readonly under: DialogState;
  /** Oldest first: all problems that have not been put away, and the notes that are in sight. */
  readonly messages: readonly Message[];
  /** What the last act did, in the line at the foot; each one takes the place of the one before. */
  readonly status: string;
  readonly compared: Compared | null;
  /** What that act did to the figures, once it is known; '' until then. */
  readonly statusMore: string;
  readonly theme: ThemeChoice;
  /** Keys that are a single letter, digit or sign act only while this is on. */
  readonly plainKeys: boolean;
  /** Keys the person has given to commands instead of those of the table. */
  readonly ownKeys: OwnKeys;
  /** Reference values of the site, kept in this browser; null where it has none. */
  readonly siteReference: KeptReference | null;
  openDialog(dialog: DialogState): void;
  closeDialog(): void;
  say(text: string): void;
  sayProblem(text: string): void;
  tell(status: string): void;
  /** Adds to the status line what the act did to the figures. */
  tellMore(statusMore: string): void;
  putAway(id: number): void;
  setTheme(theme: ThemeChoice): void;
  setPlainKeys(on: boolean): void;
  setOwnKeys(ownKeys: OwnKeys): void;
}

export type ShellStore = StoreApi<ShellState>;

const NONE: DialogState = { kind: 'none' };
const MOST_IN_SIGHT = 2;
/** How long the status line speaks of an act. */
const STATUS_MS = 12_000;

/**
 * The messages that are shown, oldest first: two at most. A problem keeps its place beside newer notes; further problems wait
 * until one is put away.
 */
export function messagesInSight(messages: readonly Message[]): readonly Message[] {
  const problems = messages.filter(({ kind }) => kind === 'problem');
  const notes = messages.filter(({ kind }) => kind === 'note');
  const places = Math.max(MOST_IN_SIGHT - notes.length, 1);
  const shownProblems = problems.slice(0, places);
  const shownNotes = notes.slice(-Math.max(MOST_IN_SIGHT - shownProblems.length, 0));
  return messages.filter((one) => shownProblems.includes(one) || shownNotes.includes(one));
}

/** One message more; notes that go out of sight are gone, and what is said already is not said twice. */
function withMessage(messages: readonly Message[], message: Message): readonly Message[] {
  const others = messages.filter(
    ({ kind, text }) => !(kind === message.kind && text === message.text),
  );
  const grown = [...others, message];
  const inSight = messagesInSight(grown);
  return grown.filter((one) => one.kind === 'problem' || inSight.includes(one));
}

/** The store of the page's own state: dialog, messages, theme, keys. Preferences are kept in local storage. */
export function createShellStore(storage: Storage | null): ShellStore {
  let nextId = 1;
  return createStore<ShellState>()((set, get) => {
    const add = (kind: Message['kind'], text: string) => {
      const message = { id: nextId, kind, text };
      nextId += 1;
      set((before) => ({ messages: withMessage(before.messages, message) }));
    };
    const prefer = (change: Partial<Pick<ShellState, 'theme' | 'plainKeys' | 'ownKeys'>>) => {
      set(change);
      const { theme, plainKeys, ownKeys } = get();
      writePreferences(storage, { theme, plainKeys, ownKeys });
    };
    return {
      ...readPreferences(storage),
      dialog: NONE,
      under: NONE,
      messages: [],
      status: '',
      compared: null,
      siteReference: null,
      statusMore: '',
      openDialog: (dialog) =>
        set((before) => ({
          dialog,
          under:
            dialog.kind === 'reviewer' && before.dialog.kind !== 'reviewer' ? before.dialog : NONE,
        })),
      closeDialog: () => set((before) => ({ dialog: before.under, under: NONE })),
      say: (text) => add('note', text),
      sayProblem: (text) => add('problem', text),
      tell: (status) => {
        set({ status, statusMore: '' });
        setTimeout(
          () => set((now) => (now.status === status ? { status: '', statusMore: '' } : now)),
          STATUS_MS,
        );
      },
      tellMore: (statusMore) => set((now) => (now.status === '' ? now : { statusMore })),
      putAway: (id) =>
        set((before) => ({ messages: before.messages.filter((one) => one.id !== id) })),
      setTheme: (theme) => prefer({ theme }),
      setPlainKeys: (plainKeys) => prefer({ plainKeys }),
      setOwnKeys: (ownKeys) => prefer({ ownKeys }),
    };
  });
}
