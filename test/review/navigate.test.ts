import { describe, expect, it } from 'vitest';
import { wheelOver } from '../../src/review/gestures';
import { dragEnd, goTo, panBy, zoomAt } from '../../src/review/navigate';
import {
  createViewStore,
  lookAtMinutes,
  lookAtStudy,
  type ViewStore,
} from '../../src/review/view-store';

const opened = (durationS = 5400): ViewStore => {
  const store = createViewStore();
  lookAtStudy(store, durationS);
  return store;
};

const inside = (store: ViewStore) => {
  const { minutes, seconds, durationS } = store.getState();
  expect(minutes.fromS).toBeGreaterThanOrEqual(0);
  expect(minutes.toS).toBeLessThanOrEqual(durationS + 1e-9);
  expect(seconds.fromS).toBeGreaterThanOrEqual(minutes.fromS - 1e-9);
  expect(seconds.toS).toBeLessThanOrEqual(minutes.toS + 1e-9);
};

describe('moving the windows', () => {
  it('keeps Seconds inside Minutes and both inside the study, whatever is done', () => {
    const store = opened();
    const acts = [
      () => panBy(store, 'minutes', 9e9),
      () => panBy(store, 'seconds', -9e9),
      () => zoomAt(store, 'minutes', 10, 0.001),
      () => zoomAt(store, 'seconds', 60, 1000),
      () => zoomAt(store, 'minutes', 5000, 1000),
      () => dragEnd(store, 'seconds', 'left', -50),
      () => dragEnd(store, 'minutes', 'right', 9999),
      () => goTo(store, 5399),
    ];
    for (const act of acts) {
      act();
      inside(store);
    }
  });

  it('zooms about the place under the pointer', () => {
    const store = opened();
    lookAtMinutes(store, 2700, 1200);
    zoomAt(store, 'minutes', 2400, 0.5);
    const { fromS, toS } = store.getState().minutes;
    expect(toS - fromS).toBeCloseTo(600, 9);
    expect((2400 - fromS) / 600).toBeCloseTo(0.25, 9);
  });

  it('zooms about the nearer end where the pointer lies outside', () => {
    const store = opened();
    lookAtMinutes(store, 2700, 1200);
    zoomAt(store, 'minutes', 100, 0.5);
    expect(store.getState().minutes.fromS).toBeCloseTo(2100, 9);
  });

  it('widens a window from one end and leaves the other where it was', () => {
    const store = opened();
    lookAtMinutes(store, 2700, 1200);
    dragEnd(store, 'minutes', 'left', 1500);
    expect(store.getState().minutes).toEqual({ fromS: 1500, toS: 3300 });
    dragEnd(store, 'minutes', 'right', 1400);
    expect(store.getState().minutes).toEqual({ fromS: 1500, toS: 1560 });
  });

  it('leaves the Seconds window the same object where it need not move', () => {
    const store = opened();
    const { seconds } = store.getState();
    panBy(store, 'minutes', 30);
    expect(store.getState().seconds).toBe(seconds);
  });

  it('shows a study shorter than the usual windows whole', () => {
    const store = opened(300);
    expect(store.getState().minutes).toEqual({ fromS: 0, toS: 300 });
    inside(store);
  });
});

describe('the wheel', () => {
  const place = { xOf: (s: number) => s / 2, sAt: (x: number) => x * 2 };
  const roll = (deltaX: number, deltaY: number, shiftKey = false) => {
    const store = opened();
    lookAtMinutes(store, 2700, 1200);
    wheelOver(store, 'minutes', place, 1200, { deltaX, deltaY, deltaMode: 0, shiftKey });
    return store.getState().minutes;
  };

  it('zooms out when rolled down and in when rolled up, by the same factor', () => {
    const out = roll(0, 100);
    const back = roll(0, -100);
    expect(out.toS - out.fromS).toBeGreaterThan(1200);
    expect((out.toS - out.fromS) * (back.toS - back.fromS)).toBeCloseTo(1200 ** 2, 3);
  });

  it('pans sideways, and with shift', () => {
    expect(roll(30, 0)).toEqual({ fromS: 2160, toS: 3360 });
    expect(roll(0, 30, true)).toEqual({ fromS: 2160, toS: 3360 });
  });
});
