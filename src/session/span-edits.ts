import { Refusal } from '../recording/failure';
import type { Span } from '../recording/span';
import { formatClock } from '../units/time';
import type { Edit, Session, SessionState } from './document';
import { nextSpanId } from './log';
import { sameValue } from './same-value';

/** A spoiled span put in, with an id no span of the session ever had. Throws Refusal where it has no length. */
export function addSpan(session: Session, span: Omit<Span, 'id'>): Edit {
  return addSpans(session, [span], `exclude ${stretch(span)}`);
}

/** Several spans put in as one step, as the program's proposals are. Throws Refusal where one has no length. */
export function addSpans(session: Session, spans: readonly Omit<Span, 'id'>[], name: string): Edit {
  spans.forEach(wantLength);
  const firstId = nextSpanId(session);
  const added = spans.map((span, i) => ({ ...span, id: firstId + i }));
  return { name, changes: added.length > 0 ? [{ kind: 'spans', removed: [], added }] : [] };
}

/**
 * A span with some of its parts changed; it keeps its id. Throws RangeError where the id is not there, Refusal where no
 * length is left.
 */
export function changeSpan(
  state: SessionState,
  id: number,
  parts: Partial<Omit<Span, 'id'>>,
): Edit {
  const [before] = spansAt(state, [id]);
  const after = { ...before, ...parts };
  wantLength(after);
  const name = `change excluded ${stretch(after)}`;
  if (sameValue(before, after)) return { name, changes: [] };
  return { name, changes: [{ kind: 'spans', removed: [before], added: [after] }] };
}

/** Spans taken away, so that what they covered counts again. Throws RangeError where an id is not there. */
export function removeSpans(state: SessionState, ids: readonly number[]): Edit {
  const removed = spansAt(state, ids);
  const name =
    removed.length === 1
      ? `include ${stretch(removed[0])} again`
      : `include ${removed.length} spans again`;
  return { name, changes: removed.length > 0 ? [{ kind: 'spans', removed, added: [] }] : [] };
}

/** "0:18:00-0:18:40", with tenths where whole seconds would say something else. */
function stretch(span: Pick<Span, 'fromS' | 'toS'>): string {
  const whole = Number.isInteger(span.fromS) && Number.isInteger(span.toS);
  const clock = (seconds: number) => formatClock(seconds, whole ? 0 : 1);
  return `${clock(span.fromS)}-${clock(span.toS)}`;
}

function spansAt(state: SessionState, ids: readonly number[]): readonly Span[] {
  const byId = new Map(state.spans.map((span) => [span.id, span]));
  return [...new Set(ids)].map((id) => {
    const span = byId.get(id);
    if (!span) throw new RangeError(`no span of id ${id}`);
    return span;
  });
}

function wantLength(span: Pick<Span, 'fromS' | 'toS'>): void {
  if (Number.isFinite(span.fromS) && Number.isFinite(span.toS) && span.toS > span.fromS) return;
  throw new Refusal({
    kind: 'wrong-input',
    message: 'A spoiled span wants a start and an end after it.',
    place: null,
    remedy: 'Type or drag an end that lies after the start.',
  });
}
