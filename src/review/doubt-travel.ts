import type { Doubt } from '../recording/doubt';
import { ticksToSeconds } from '../units/ticks';
import { openBeats } from './beat-commands';
import { tabWords } from './doubt-words';
import type { PaneStores } from './row-view';
import {
  type DoubtMark,
  lookAtMinutes,
  lookAtSeconds,
  SECONDS_WIDTH_S,
  type Selection,
  type ViewStore,
} from './view-store';

/** A stretch no longer than this is looked at whole in Seconds. */
const SHORT_S = 30;
const ROOM = 1.5;

/** True where the panes show a doubt: the middle of a short one in Seconds, any of a long one. */
export function inSight(view: ViewStore, { fromS, toS }: Doubt): boolean {
  const { seconds } = view.getState();
  const middle = (fromS + toS) / 2;
  return toS - fromS <= SHORT_S
    ? seconds.fromS <= middle && middle <= seconds.toS
    : seconds.fromS < toS && seconds.toS > fromS;
}

/**
 * A way to take the panes to doubts one after another: Seconds keeps the width a person gave it, widens where a doubt wants
 * more and goes back to it after.
 */
export function doubtTraveller(view: ViewStore): (doubt: Doubt) => void {
  let widened = { usualS: 0, toS: 0 };
  const usualWidth = (): number => {
    const { seconds } = view.getState();
    const nowS = seconds.toS - seconds.fromS;
    return Math.abs(nowS - widened.toS) < 1e-6 ? widened.usualS : nowS;
  };
  return ({ fromS, toS }) => {
    const usualS = usualWidth();
    const lengthS = toS - fromS;
    const middle = (fromS + toS) / 2;
    if (lengthS > SHORT_S) {
      const { minutes } = view.getState();
      lookAtMinutes(view, middle, Math.max(minutes.toS - minutes.fromS, 1.1 * lengthS));
      lookAtSeconds(view, fromS + SECONDS_WIDTH_S / 2, usualS);
      return;
    }
    const widthS = Math.max(usualS, ROOM * lengthS);
    widened = { usualS, toS: widthS };
    lookAtSeconds(view, middle, widthS);
  };
}

/** What a doubt picks out: the beats or the span that its mend would change; nothing where it would add. */
export function doubtSelection({ kind, mend, tick }: Doubt, stores: PaneStores): Selection {
  if (mend?.kind === 'include') return { kind: 'span', id: mend.spanId };
  const ticks = mend?.kind === 'beats' ? mend.removed.map((one) => one.tick) : [];
  if (ticks.length > 0) return { kind: 'beats', ticks };
  const beats = openBeats(stores)?.state.beats;
  const alone = mend === null && kind !== 'missed-beat' && tick !== null;
  return alone && beats?.ticks.includes(tick) ? { kind: 'beats', ticks: [tick] } : { kind: 'none' };
}

/** A doubt as the panes draw it. */
export function doubtMark(doubt: Doubt, stores: PaneStores): DoubtMark {
  const { fromS, toS, mend, tick } = doubt;
  const rateHz = openBeats(stores)?.rateHz;
  const words = tabWords(doubt);
  if (rateHz === undefined || tick === null) return { fromS, toS, words, atS: [], onPins: true };
  const { removed, added } = mend?.kind === 'beats' ? mend : { removed: [], added: [] };
  const ticks = [...new Set([...removed, ...added].map((one) => one.tick))];
  const places = ticks.length > 0 ? ticks : [tick];
  const onPins = added.length === 0 || removed.length > 0;
  return { fromS, toS, words, atS: places.map((one) => ticksToSeconds(one, rateHz)), onPins };
}
