import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Doubt, DoubtEffect, DoubtEnding } from '../recording/doubt';
import type { Failure } from '../recording/failure';

/** Where the search for doubts stands. A list found before stands meanwhile, grey where it is older than the last edit. */
export type DoubtSearch =
  | { readonly kind: 'waiting' }
  | { readonly kind: 'looking' }
  | { readonly kind: 'there' }
  | { readonly kind: 'failed'; readonly failure: Failure };

/** What was settled last, until something else is done. */
export interface DoubtOutcome {
  readonly ending: DoubtEnding;
  /** What was done and where: "insert beat, 0:12:31.2". */
  readonly words: string;
  /** What the mend does to the figure it moves most; null where it moves none, or where nothing was mended. */
  readonly effect: DoubtEffect | null;
}

/** What can be done about doubts. */
export interface DoubtActs {
  /** Goes to the doubt in front, or where it is in sight already to the one after it. */
  next(): void;
  previous(): void;
  goTo(id: string): void;
  /** Settle the doubt in front once it is in sight; else go there first. */
  keep(): void;
  mend(): void;
  /** Opens the dialog of the beats most like the one of the doubt in front. */
  lookAlikes(): void;
  /** Settles several at once, as one undo step. */
  settle(doubts: readonly Doubt[], ending: DoubtEnding): void;
  /** Looks for doubts again after a failure. */
  lookAgain(): void;
}

export interface DoubtState {
  /** The last list the worker gave, in its order; what was settled since is among them. Null before the first. */
  readonly listed: readonly Doubt[] | null;
  /** Edit the list belongs to. */
  readonly edit: number;
  readonly search: DoubtSearch;
  /** The doubt in front; null: the first open one. */
  readonly frontId: string | null;
  readonly outcome: DoubtOutcome | null;
  /** The doubt in front as it is read out once the panes have come to it. */
  readonly spoken: string;
  /** Null until the part of the page that deals with doubts is loaded. */
  readonly acts: DoubtActs | null;
}

export type DoubtStore = StoreApi<DoubtState>;

export const NO_DOUBTS = {
  listed: null,
  edit: 0,
  search: { kind: 'waiting' },
  frontId: null,
  outcome: null,
  spoken: '',
} as const satisfies Partial<DoubtState>;

/** The page's list of doubts. */
export const createDoubtStore = (): DoubtStore =>
  createStore<DoubtState>()(() => ({ ...NO_DOUBTS, acts: null }));
