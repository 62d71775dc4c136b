import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Evidence, EvidencePart } from '../recording/evidence/evidence';
import type { evidenceLines } from '../recording/evidence/evidence-words';
import type { Failure } from '../recording/failure';

/** Where one part of the evidence stands. What was found before stays beside it, grey where it is of an earlier edit. */
export type EvidenceSearch =
  | { readonly kind: 'waiting' }
  | { readonly kind: 'looking'; readonly done: number }
  | { readonly kind: 'there' }
  | { readonly kind: 'failed'; readonly failure: Failure };

/** A part that has been computed, with the edit it belongs to. */
export type Found<P extends EvidencePart> = {
  readonly edit: number;
  readonly value: Evidence[P];
};

export interface EvidenceActs {
  /** Stops what is being computed, until the next edit. */
  stop(): void;
  /** Begins again after a stop or a failure. */
  again(): void;
}

export interface EvidenceState {
  readonly found: { readonly [P in EvidencePart]?: Found<P> };
  readonly searches: Readonly<Partial<Record<EvidencePart, EvidenceSearch>>>;
  /** Null until the part of the page that computes evidence is loaded; so are its words. */
  readonly acts: EvidenceActs | null;
  readonly linesOf: typeof evidenceLines | null;
}

export type EvidenceStore = StoreApi<EvidenceState>;

export const NO_EVIDENCE = { found: {}, searches: {} } as const satisfies Partial<EvidenceState>;

/** The page's evidence. */
export const createEvidenceStore = (): EvidenceStore =>
  createStore<EvidenceState>()(() => ({ ...NO_EVIDENCE, acts: null, linesOf: null }));

/** The parts that belong to an edit. */
export function evidenceAt(found: EvidenceState['found'], edit: number): Partial<Evidence> {
  return Object.fromEntries(
    Object.entries(found)
      .filter(([, one]) => one.edit === edit)
      .map(([part, one]) => [part, one.value]),
  );
}

/** All parts that were found, of whatever edit. */
export const evidenceFound = ({ found }: EvidenceState): Partial<Evidence> =>
  Object.fromEntries(Object.entries(found).map(([part, one]) => [part, one.value]));
