import type {
  Change,
  Edit,
  ReplacedField,
  SessionState,
  Signature,
  StudyIdentity,
} from './document';
import { holdsFiniteNumbers } from './finite-values';
import { sameValue } from './same-value';

export {
  addBeat,
  classBeats,
  deleteBeats,
  moveBeat,
  replaceAllBeats,
  replaceBeatsWithin,
} from './beat-edits';
export { keepDoubts, mendDoubts } from './doubt-edits';
export { addSpan, addSpans, changeSpan, removeSpans } from './span-edits';

/** One field replaced as a whole, as one undo step of the given name; no change where the value is the same. */
export function setField<F extends ReplacedField>(
  state: SessionState,
  field: F,
  value: SessionState[F],
  name: string,
): Edit {
  const before = state[field];
  if (sameValue(before, value)) return { name, changes: [] };
  return { name, changes: [{ kind: 'field', field, before, after: value } as Change] };
}

/** What the study is known by, changed by a person (its code). */
export function setStudy(state: SessionState, after: StudyIdentity, name: string): Edit {
  if (sameValue(state.study, after)) return { name, changes: [] };
  return { name, changes: [{ kind: 'study', before: state.study, after }] };
}

const SIGNING = { prepared: 'sign as prepared', read: 'sign as read', amended: 'amend' } as const;

/**
 * A signature, which no undo takes back. Throws Error where its figures are no finite numbers (they could not be kept as
 * they were), where it has no name, or where an amendment has no reason or nothing to amend.
 */
export function sign(state: SessionState, signature: Signature): Edit {
  if (signature.name.trim() === '') throw new Error('a signature wants a name');
  if (signature.meaning === 'amended') {
    if (state.signed.length === 0) throw new Error('there is nothing signed to amend');
    if (signature.reason.trim() === '') throw new Error('an amendment wants a reason');
  }
  if (!holdsFiniteNumbers(signature)) throw new Error('a signed figure is no finite number');
  return { name: SIGNING[signature.meaning], changes: [{ kind: 'sign', signature }] };
}
