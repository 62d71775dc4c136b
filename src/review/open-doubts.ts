import { BEAT_CLASSES, type Beat, type BeatList, firstBeatAt } from '../recording/beat';
import type { Doubt, Mend } from '../recording/doubt';
import type { SessionState } from '../session/document';

function standsAt(beats: BeatList, { tick, beatClass }: Beat): boolean {
  const index = firstBeatAt(beats, tick);
  return beats.ticks[index] === tick && BEAT_CLASSES[beats.classes[index]] === beatClass;
}

/** True where a mend can be done to the study as it stands: what it takes away is there, where it puts something is free. */
export function mendFits(state: SessionState, mend: Mend): boolean {
  switch (mend.kind) {
    case 'beats': {
      const { removed, added } = mend;
      const gone = new Set(removed.map(({ tick }) => tick));
      const occupied = ({ tick }: Beat) =>
        !gone.has(tick) && state.beats.ticks[firstBeatAt(state.beats, tick)] === tick;
      return removed.every((one) => standsAt(state.beats, one)) && !added.some(occupied);
    }
    case 'exclude':
      return true;
    case 'include':
      return state.spans.some(({ id }) => id === mend.spanId);
  }
}

/**
 * The doubts of a list that are open in the study as it stands, in the order of the list. The list may be older than the
 * study: what was settled since, and what can no longer be mended as proposed, is left out.
 */
export function openDoubts(listed: readonly Doubt[], state: SessionState): readonly Doubt[] {
  const settled = new Set(state.doubts.map(({ id }) => id));
  return listed.filter(
    ({ id, mend }) => !settled.has(id) && (mend === null || mendFits(state, mend)),
  );
}

/** How many doubts are open; null while they have not been looked for. */
export const countOpen = (
  listed: readonly Doubt[] | null,
  state: SessionState | undefined,
): number | null => (listed && state ? openDoubts(listed, state).length : null);

/** Where a doubt of a beat stands, by its id: that does not change when the same beat is doubted for another reason. */
const beatOf = (id: string): string | undefined => /-\d+$/.exec(id)?.[0];

/**
 * The doubt in front: the one of the id where it is open, else another of the same beat, else the first; null where none is
 * open.
 */
export function doubtInFront(open: readonly Doubt[], frontId: string | null): Doubt | null {
  const same = open.find(({ id }) => id === frontId);
  if (same) return same;
  const beat = frontId === null ? undefined : beatOf(frontId);
  const there = beat === undefined ? undefined : open.find(({ id }) => beatOf(id) === beat);
  return there ?? open[0] ?? null;
}

/** Those of some doubts whose mends can be done as one step: where two touch the same beat or span, the first counts. */
export function mendableTogether(doubts: readonly Doubt[]): readonly Doubt[] {
  const touched = new Set<string>();
  return doubts.filter(({ mend }) => {
    if (mend === null) return false;
    const parts = touchedBy(mend);
    if (parts.some((part) => touched.has(part))) return false;
    for (const part of parts) touched.add(part);
    return true;
  });
}

function touchedBy(mend: Mend): readonly string[] {
  if (mend.kind === 'exclude') return [];
  if (mend.kind === 'include') return [`span ${mend.spanId}`];
  return [...new Set([...mend.removed, ...mend.added].map(({ tick }) => `beat ${tick}`))];
}
