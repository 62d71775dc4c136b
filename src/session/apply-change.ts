import { changeBeats } from '../recording/beat';
import type { SettledDoubt } from '../recording/doubt';
import type { Span } from '../recording/span';
import type { Change, SessionState, StudyIdentity } from './document';

/**
 * The state after one change. Throws RangeError where the change does not fit the state: a beat or span to take out that
 * is not there, a beat put on an occupied tick, a span or doubt of an id used twice.
 */
export function applyChange(state: SessionState, change: Change): SessionState {
  switch (change.kind) {
    case 'beats':
      return { ...state, beats: changeBeats(state.beats, change.removed, change.added) };
    case 'all-beats':
      return { ...state, beats: change.after };
    case 'spans':
      return { ...state, spans: changeSpans(state.spans, change.removed, change.added) };
    case 'doubts':
      return { ...state, doubts: changeDoubts(state.doubts, change.removed, change.added) };
    case 'field':
      return { ...state, [change.field]: change.after };
    case 'sign':
      return { ...state, signed: [...state.signed, change.signature] };
    case 'study':
      return { ...state, study: changeStudy(state.study, change.before, change.after) };
  }
}

/** The change that takes another back. Throws where it is a signature, which stands once it is given. */
export function invert(change: Change): Change {
  switch (change.kind) {
    case 'beats':
    case 'spans':
    case 'doubts':
      return { ...change, removed: change.added, added: change.removed } as Change;
    case 'all-beats':
    case 'field':
    case 'study':
      return { ...change, before: change.after, after: change.before } as Change;
    case 'sign':
      throw new Error('a signature is never taken back');
  }
}

/** Spans in the one order a state keeps them in: by start, then by id. */
export function inSpanOrder(spans: readonly Span[]): readonly Span[] {
  return [...spans].sort((a, b) => a.fromS - b.fromS || a.id - b.id);
}

function changeSpans(
  spans: readonly Span[],
  removed: readonly Span[],
  added: readonly Span[],
): readonly Span[] {
  const gone = new Set(removed.map((span) => span.id));
  const left = spans.filter((span) => !gone.has(span.id));
  if (spans.length - left.length !== removed.length)
    throw new RangeError(`no spans of ids ${[...gone].join(', ')}`);
  const ids = new Set(left.map((span) => span.id));
  for (const span of added) {
    if (ids.has(span.id)) throw new RangeError(`span ${span.id} is there already`);
    ids.add(span.id);
  }
  return inSpanOrder([...left, ...added]);
}

const byId = (a: SettledDoubt, b: SettledDoubt) => Number(a.id > b.id) - Number(a.id < b.id);

function changeDoubts(
  doubts: readonly SettledDoubt[],
  removed: readonly SettledDoubt[],
  added: readonly SettledDoubt[],
): readonly SettledDoubt[] {
  const gone = new Set(removed.map(({ id }) => id));
  const left = doubts.filter(({ id }) => !gone.has(id));
  if (doubts.length - left.length !== removed.length)
    throw new RangeError(`no settled doubts ${[...gone].join(', ')}`);
  const ids = new Set(left.map(({ id }) => id));
  for (const { id } of added) {
    if (ids.has(id)) throw new RangeError(`doubt ${id} is settled already`);
    ids.add(id);
  }
  return [...left, ...added].sort(byId);
}

/** Only what differs between before and after is set, so that taking back a code leaves a hash learnt since. */
function changeStudy(
  study: StudyIdentity,
  before: StudyIdentity,
  after: StudyIdentity,
): StudyIdentity {
  const keys = Object.keys(after) as (keyof StudyIdentity)[];
  const changed = keys.filter((key) => before[key] !== after[key]);
  return { ...study, ...Object.fromEntries(changed.map((key) => [key, after[key]])) };
}
