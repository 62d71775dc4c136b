/** What went wrong, as the program tells kinds apart; the words for people are in the message. */
export type FailureKind =
  | 'unreadable'
  | 'not-supported'
  | 'broken-format'
  | 'wrong-input'
  /** Text that does not say its rate or unit, until a person does. */
  | 'needs-reading'
  | 'cancelled'
  | 'crashed'
  | 'out-of-memory'
  | 'internal';

/** Plain data, so that it can cross from the worker to the page. */
export interface Failure {
  readonly kind: FailureKind;
  /** One or two sentences for the person: what is wrong with what. */
  readonly message: string;
  /** Byte, row, field or channel where it was found; null where the whole file is meant. */
  readonly place: string | null;
  /** What the person can do. */
  readonly remedy: string;
}

/** An error a person can cause and mend: thrown by the steps, turned into a reply at the worker's door. */
export class Refusal extends Error {
  readonly failure: Failure;
  constructor(failure: Failure) {
    super(failure.message);
    this.name = 'Refusal';
    this.failure = failure;
  }
}

export type Reply<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly failure: Failure };
