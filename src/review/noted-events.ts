import type { PaneStores } from './row-view';
import { clockText } from './time-ticks';

/** Annotations that name a phase: their borders are drawn already. */
const PHASE_TEXT = /^(fasting|fasted|baseline|(test )?meal|end of meal|fed|post-?prandial)\b/i;

/** Something noted at a time: an event has no score, a symptom one from 0 to 10. */
export interface NotedEvent {
  readonly atS: number;
  readonly text: string;
  readonly score: number | null;
}

/**
 * What was noted at a time: annotations of the file, events and symptoms that reviewers wrote, ascending. Free words, which may
 * name a person, are left out while identity is hidden.
 */
export function notedEvents({ session, analysis, view }: PaneStores): readonly NotedEvent[] {
  const annotations = analysis.getState().recording?.annotations ?? [];
  const state = session.getState().session?.state;
  const hidden = view.getState().identityHidden;
  const free = (text: string) => (hidden ? '' : text);
  const event = (atS: number, text: string) => ({ atS, text: free(text), score: null });
  return [
    ...annotations
      .filter(({ text }) => !PHASE_TEXT.test(text.trim()))
      .map(({ onsetS, text }) => event(onsetS, text)),
    ...(state?.events ?? []).map(({ atS, text }) => event(atS, text)),
    ...(state?.symptoms ?? []).map(({ atS, text, score }) => ({
      atS,
      text: `${free(text)} ${score}/10`.trim(),
      score,
    })),
  ].sort((a, b) => a.atS - b.atS);
}

/** What was noted within a window, in words; '' where nothing was. */
export function notedWords(stores: PaneStores, fromS: number, toS: number): string {
  const seen = notedEvents(stores).filter(({ atS }) => atS >= fromS && atS <= toS);
  const words = seen.map(({ atS, text }) => `${clockText(atS, 1, 'h:mm:ss')} ${text}`.trim());
  return words.length > 0 ? ` Noted: ${words.join('; ')}.` : '';
}
