import { BEAT_CLASSES, type BeatList } from '../recording/beat';
import type { Phase } from '../recording/phase';
import type { Annotation } from '../recording/recording';
import type { Span } from '../recording/span';
import { type Noted, notedWords } from '../session/note-edits';
import type { Hertz } from '../units/rate';
import { ticksToSeconds } from '../units/ticks';

/** What of a review is written as annotations. */
export interface AnnotatedReview {
  readonly beats: BeatList;
  /** Rate that the beats' ticks count in. */
  readonly beatRateHz: Hertz;
  readonly phases: readonly Phase[];
  readonly spans: readonly Span[];
  /** Events and symptoms that reviewers wrote. */
  readonly notes: readonly Noted[];
}

/** Phases, spoiled spans, events, symptoms and beats as annotations of an EDF+ file; none before the first sample. */
export function reviewAnnotations(review: AnnotatedReview): readonly Annotation[] {
  const { beats, beatRateHz, phases, spans, notes } = review;
  const all: readonly Annotation[] = [
    ...phases.map(({ name, fromS, toS }) => ({
      onsetS: fromS,
      durationS: toS - fromS,
      text: name,
    })),
    ...spans.map(({ fromS, toS, cause, target, lead }) => ({
      onsetS: fromS,
      durationS: toS - fromS,
      text: `spoiled: ${cause}, ${target}, ${lead ?? 'all leads'}`,
    })),
    ...notes.map((note) => ({
      onsetS: note.atS,
      durationS: null,
      text: `${note.kind}: ${notedWords(note)}`,
    })),
    ...Array.from(beats.ticks, (tick, i) => ({
      onsetS: ticksToSeconds(tick, beatRateHz),
      durationS: null,
      text: `beat ${BEAT_CLASSES[beats.classes[i]]}`,
    })),
  ];
  return all.filter(({ onsetS }) => onsetS >= 0);
}
