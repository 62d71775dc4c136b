import type { Span } from '../recording/span';
import type { Draft, Moved } from './view-store';

/** Which end of a spoiled span is moved. */
export type SpanEnd = 'left' | 'right';

const LEAST_SPAN_S = 0.1;

/** A span with one end moved to a time, never shorter than 0.1 s; what it was snapped to is told only where it got there. */
export function moveSpanEnd(
  span: Pick<Span, 'id' | 'fromS' | 'toS'>,
  end: SpanEnd,
  { atS, snap }: Moved,
): Draft {
  const place =
    end === 'left'
      ? Math.min(atS, span.toS - LEAST_SPAN_S)
      : Math.max(atS, span.fromS + LEAST_SPAN_S);
  return {
    fromS: end === 'left' ? place : span.fromS,
    toS: end === 'left' ? span.toS : place,
    spanId: span.id,
    moved: { atS: place, snap: place === atS ? snap : null },
  };
}
