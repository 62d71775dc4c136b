import { lookAtMinutes, lookAtSeconds, SECONDS_WIDTH_S, type ViewStore } from './view-store';

const SHORT_S = 30;

/** Moves both panes to a stretch: a short one fills Seconds, a long one lies whole in Minutes with Seconds at its start. */
export function goToStretch(view: ViewStore, fromS: number, toS: number): void {
  const centre = (fromS + toS) / 2;
  const length = toS - fromS;
  if (length <= SHORT_S) {
    lookAtSeconds(view, centre, Math.max(SECONDS_WIDTH_S, 1.5 * length));
    return;
  }
  const { minutes } = view.getState();
  lookAtMinutes(view, centre, Math.max(minutes.toS - minutes.fromS, 1.1 * length));
  lookAtSeconds(view, fromS + SECONDS_WIDTH_S / 2, SECONDS_WIDTH_S);
}
