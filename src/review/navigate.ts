import {
  lookAtMinutes,
  lookAtSeconds,
  type TimeWindow,
  type ViewState,
  type ViewStore,
} from './view-store';

/** The two panes that have a window of their own. */
export type WindowName = 'minutes' | 'seconds';

const lookAt = { minutes: lookAtMinutes, seconds: lookAtSeconds } as const;

const LEAST_S = { minutes: 60, seconds: 1 } as const;

/** Moves a window by a time; the other one follows as it must. */
export function panBy(store: ViewStore, name: WindowName, byS: number): void {
  const { fromS, toS } = store.getState()[name];
  lookAt[name](store, (fromS + toS) / 2 + byS);
}

/** Multiplies a window's width, keeping the given time (or the end nearest to it) at its place on screen. Clipped to what the panes allow. */
export function zoomAt(store: ViewStore, name: WindowName, atS: number, factor: number): void {
  const state = store.getState();
  const { fromS, toS } = state[name];
  const width = Math.min(widest(state, name), Math.max(LEAST_S[name], (toS - fromS) * factor));
  const fixedS = Math.min(Math.max(atS, fromS), toS);
  const share = (fixedS - fromS) / (toS - fromS);
  lookAt[name](store, fixedS + (0.5 - share) * width, width);
}

const widest = (state: ViewState, name: WindowName): number =>
  name === 'minutes' ? state.durationS : state.minutes.toS - state.minutes.fromS;

/** Drags one end of a window to a time, the other end staying where it is. */
export function dragEnd(
  store: ViewStore,
  name: WindowName,
  end: 'left' | 'right',
  toS: number,
): void {
  const state = store.getState();
  const window = state[name];
  const around: TimeWindow =
    name === 'minutes' ? { fromS: 0, toS: state.durationS } : state.minutes;
  const inside = Math.min(Math.max(toS, around.fromS), around.toS);
  if (end === 'left') {
    const width = Math.max(LEAST_S[name], window.toS - inside);
    lookAt[name](store, window.toS - width / 2, width);
  } else {
    const width = Math.max(LEAST_S[name], inside - window.fromS);
    lookAt[name](store, window.fromS + width / 2, width);
  }
}

/** Takes both panes to a place: Minutes centred on it where it lies outside, Seconds always. */
export function goTo(store: ViewStore, atS: number): void {
  const { minutes } = store.getState();
  if (atS < minutes.fromS || atS > minutes.toS) lookAtMinutes(store, atS);
  lookAtSeconds(store, atS);
}

/** A time kept inside the study. */
export const insideStudy = (state: ViewState, atS: number): number =>
  Math.min(Math.max(0, atS), state.durationS);
