import type { SessionState, Signature } from '../session/document';
import type { SignRequest } from './controller';

/** A signature as it is being filled in; `sure` once the person has confirmed which study it is. */
export interface SignDraft extends SignRequest {
  readonly sure: boolean;
}

export type SignErrors = Readonly<Record<'sure' | 'reason' | 'name', string | null>>;

/** The meanings a signature can have now: after a study was read, only an amendment. */
export function meaningsNow(signed: readonly Signature[]): readonly Signature['meaning'][] {
  const readBefore = signed.some((one) => one.meaning !== 'prepared');
  return readBefore ? ['amended'] : ['prepared', 'read'];
}

export const signDraft = (state: SessionState, reviewer: string): SignDraft => ({
  meaning: meaningsNow(state.signed)[0],
  name: reviewer,
  reason: '',
  notes: state.notes,
  conclusion: state.conclusion,
  sure: false,
});

/** Reads what was filled in: what to sign with (null while something is missing) and what is missing. */
export function readSign({ sure, ...draft }: SignDraft): {
  readonly request: SignRequest | null;
  readonly errors: SignErrors;
} {
  const amends = draft.meaning === 'amended';
  const request = {
    ...draft,
    name: draft.name.trim(),
    reason: amends ? draft.reason.trim() : '',
  };
  const errors: SignErrors = {
    sure: sure ? null : 'Confirm which study it is.',
    reason: amends && request.reason === '' ? 'Say why it is amended.' : null,
    name: request.name === '' ? 'Type your name.' : null,
  };
  const good = Object.values(errors).every((error) => error === null);
  return { request: good ? request : null, errors };
}
