import type { Lead } from '../recording/lead';
import { leadKey } from '../recording/lead';
import type { Roles } from '../recording/roles';
import type { Span, SpanCause, SpanTarget } from '../recording/span';
import { readTypedTime, type TimeFrame, timeText, typedTimeFault } from '../units/typed-time';

/** A spoiled span as it is being typed. */
export interface SpanDraft {
  readonly from: string;
  readonly to: string;
  readonly target: SpanTarget;
  readonly cause: SpanCause;
  /** Key of its lead; '' for all leads. */
  readonly lead: string;
  readonly note: string;
}

export type SpanParts = Pick<Span, 'fromS' | 'toS' | 'target' | 'cause' | 'lead' | 'note'>;
export type SpanFaults = Partial<Readonly<Record<'from' | 'to', string>>>;
export type ReadSpan =
  | { readonly ok: true; readonly parts: SpanParts }
  | { readonly ok: false; readonly faults: SpanFaults };

export const BLANK_SPAN: SpanDraft = {
  from: '',
  to: '',
  target: 'both',
  cause: 'other',
  lead: '',
  note: '',
};

export const spanDraft = (span: Span): SpanDraft => ({
  from: timeText(span.fromS),
  to: timeText(span.toS),
  target: span.target,
  cause: span.cause,
  lead: span.lead ?? '',
  note: span.note,
});

/**
 * Reads what is typed: a span, or what is wrong with its times. A time of the span `before` that was left alone stays as exact
 * as it was.
 */
export function readSpan(draft: SpanDraft, frame: TimeFrame, before: Span | null): ReadSpan {
  const typed = (text: string, was: number | undefined) =>
    was !== undefined && text === timeText(was) ? { atS: was } : readTypedTime(text, frame);
  const from = typed(draft.from, before?.fromS);
  const to = typed(draft.to, before?.toS);
  const wrong = {
    from: typedTimeFault(draft.from, frame),
    to: typedTimeFault(draft.to, frame),
  };
  if (!('atS' in from) || !('atS' in to))
    return {
      ok: false,
      faults: {
        ...(wrong.from === null ? {} : { from: wrong.from }),
        ...(wrong.to === null ? {} : { to: wrong.to }),
      },
    };
  if (from.atS >= to.atS)
    return { ok: false, faults: { to: 'The end must come after the start.' } };
  const { target, cause, lead, note } = draft;
  return {
    ok: true,
    parts: {
      fromS: from.atS,
      toS: to.atS,
      target,
      cause,
      lead: lead === '' ? null : lead,
      note: note.trim(),
    },
  };
}

/** A lead by the labels of the study's channels. */
function leadWords(lead: Lead, labels: readonly string[]): string {
  const label = (index: number) => labels[index] ?? `channel ${index + 1}`;
  return lead.kind === 'channel'
    ? label(lead.channel)
    : `${label(lead.plus)} − ${label(lead.minus)}`;
}

/** The leads a span may be on: all, those in use, and one that it is on already. */
export function leadOptions(
  { slow, heart }: Roles,
  labels: readonly string[],
  spans: readonly Pick<Span, 'lead'>[],
): readonly (readonly [key: string, words: string])[] {
  const inUse = [...slow, ...(heart ? [heart] : [])].map(
    (lead) => [leadKey(lead), leadWords(lead, labels)] as const,
  );
  const others = spans.flatMap(({ lead }) => (lead === null ? [] : [[lead, lead] as const]));
  return [...new Map([['', 'all leads'] as const, ...others, ...inUse])];
}
