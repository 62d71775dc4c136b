import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { TICKS_PER_SAMPLE } from '../units/ticks';
import type { BeatLook } from './beat-looks';
import { type DoubtView, insertion, percent, type Reason, removal } from './doubt-view';

/** From this chance of being wrong on a place is listed. */
const LEAST_WRONG = 0.15;
/** A beat so like an average of the study, at about its size, is one whatever the rhythm says, unless it is more likely none. */
const PLAINLY_LIKE = 0.9;
const PLAINLY_LARGE = 0.6;
const LIKELY_NONE = 0.5;
/** A place nearer to a beat than this is that beat. */
const SAME_BEAT_S = 0.15;

const isPlain = ({ likeness, best, size }: BeatLook) =>
  best >= 0 && likeness[best] >= PLAINLY_LIKE && size >= PLAINLY_LARGE;

/** Places where the detector's own odds leave room for the other decision. */
export function oddsReasons(view: DoubtView): readonly Reason[] {
  const { beats, rateHz, detection, timesS, rrMs } = view;
  const { ticks, wrong, taken } = detection.unsure;
  const same = SAME_BEAT_S * rateHz * TICKS_PER_SAMPLE;
  const reasons: Reason[] = [];
  ticks.forEach((tick, k) => {
    if (wrong[k] < LEAST_WRONG) return;
    const near = firstAtOrAfter(beats.ticks, tick - same);
    const isBeat = near < view.count && beats.ticks[near] <= tick + same;
    if (taken[k] === 1) {
      const at = firstAtOrAfter(beats.ticks, tick);
      if (beats.ticks[at] !== tick || !view.isOwn(at)) return;
      if (wrong[k] < LIKELY_NONE && isPlain(view.look(at))) return;
      reasons.push({
        beat: at,
        kind: 'low-beat',
        strength: wrong[k],
        why: `By shape, energy and rhythm the chance that it is no beat is ${percent(wrong[k])}.`,
        mend: removal(view, at),
      });
    } else if (!isBeat && near > 0 && near < view.count && !Number.isNaN(rrMs[near])) {
      const inWave = tick / TICKS_PER_SAMPLE / rateHz - timesS[near - 1] < 0.5;
      reasons.push({
        beat: near,
        kind: inWave ? 'tall-wave' : 'missed-beat',
        strength: wrong[k],
        why: `Something before it was not taken for a beat: by shape, energy and rhythm the chance that it is one is ${percent(wrong[k])}.`,
        mend: insertion(view, [{ tick, beatClass: 'N', origin: 'added' }]),
      });
    }
  });
  return reasons;
}
