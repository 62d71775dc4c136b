import type { PaneStores } from './row-view';

/** Annotations that name a phase: their borders are drawn already. */
const PHASE_TEXT = /^(fasting|fasted|baseline|(test )?meal|end of meal|fed|post-?prandial)\b/i;

/** What was noted at a time: annotations of the file and events that reviewers wrote, ascending. */
export function notedEvents({
  session,
  analysis,
}: PaneStores): readonly { readonly atS: number; readonly text: string }[] {
  const annotations = analysis.getState().recording?.annotations ?? [];
  const events = session.getState().session?.state.events ?? [];
  return [
    ...annotations
      .filter(({ text }) => !PHASE_TEXT.test(text.trim()))
      .map(({ onsetS, text }) => ({ atS: onsetS, text })),
    ...events,
  ].sort((a, b) => a.atS - b.atS);
}
