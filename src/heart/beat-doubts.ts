import type { Doubt } from '../recording/doubt';
import { type BeatDoubtsInput, type DoubtView, doubtView, type Reason } from './doubt-view';
import { gapReasons } from './gap-doubts';
import { oddsReasons } from './odds-doubts';
import { rhythmReasons } from './rhythm-doubts';
import { shapeReasons } from './shape-doubts';

/** Doubts of beats in ascending time, one a beat, without their effects. */
export function beatDoubts(input: BeatDoubtsInput): readonly Doubt[] {
  const view = doubtView(input);
  const byBeat = new Map<number, Reason>();
  for (const find of [gapReasons, rhythmReasons, shapeReasons, oddsReasons])
    for (const reason of find(view)) {
      const before = byBeat.get(reason.beat);
      if (!before || reason.strength > before.strength) byBeat.set(reason.beat, reason);
    }
  return [...byBeat.values()]
    .sort((a, b) => a.beat - b.beat)
    .map((reason) => doubtOf(view, reason));
}

const BEFORE_GAP: readonly Doubt['kind'][] = ['missed-beat'];

function doubtOf({ beats, timesS }: DoubtView, { beat, kind, why, mend }: Reason): Doubt {
  const tick = beats.ticks[beat];
  const before = BEFORE_GAP.includes(kind) && beat > 0 ? beat - 1 : beat;
  return {
    id: `${kind}-${tick}`,
    kind,
    fromS: timesS[before],
    toS: timesS[beat],
    tick,
    lead: null,
    why,
    mend,
    effect: null,
  };
}
