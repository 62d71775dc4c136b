import { leadName, parseLead } from '../recording/lead';
import type { Span, SpanTarget } from '../recording/span';
import { type Difference, listDifferences, quoted, stretchOf } from './difference';

const TARGET_WORDS: Readonly<Record<SpanTarget, string>> = {
  stomach: 'for the stomach',
  heart: 'for the heart',
  both: 'for both',
};

/** The lead a span spoils, as people read it; its key where the study has no such channel. */
function leadWords(key: string | null, labels: readonly string[]): string {
  if (key === null) return 'all leads';
  const channels = labels.map((label) => ({ label }));
  const lead = parseLead(key, channels);
  return lead ? leadName(lead, channels) : key;
}

/** "0:18:00–0:18:40 for the stomach, cause talk, all leads". */
export function spanWords(span: Span, labels: readonly string[]): string {
  const note = span.note === '' ? '' : `, ${quoted(span.note)}`;
  return `${stretchOf(span)} ${TARGET_WORDS[span.target]}, cause ${span.cause}, ${leadWords(span.lead, labels)}${note}`;
}

/** Spoiled spans that came, went or were changed; a span is known by its id. */
export function spanDifferences(
  removed: readonly Span[],
  added: readonly Span[],
  labels: readonly string[],
): readonly Difference[] {
  return listDifferences(removed, added, {
    key: ({ id }) => id,
    what: () => 'span',
    words: (span) => spanWords(span, labels),
    place: ({ fromS, toS }) => ({ fromS, toS }),
  });
}
