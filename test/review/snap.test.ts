import { describe, expect, it } from 'vitest';
import { pointing } from '../../src/review/pointed-time';
import { nextPlace, snapPlaces, snapTo } from '../../src/review/snap';
import { moveSpanEnd } from '../../src/review/span-ends';
import { paneStudy, recordingOf } from './pane-study';

const ANNOTATIONS = [
  { onsetS: 300.25, durationS: 60, text: 'meal' },
  { onsetS: 120, durationS: null, text: 'cough' },
  { onsetS: 120, durationS: null, text: 'cough' },
  { onsetS: 30, durationS: 0, text: 'start' },
];
const EVENTS = [{ atS: 200, text: 'drank 200 ml' }];
const PLACES = snapPlaces(ANNOTATIONS, EVENTS);

describe('places to snap to', () => {
  it('are where annotations begin and end and where events were noted, each once, by time', () => {
    expect(PLACES).toEqual([
      { atS: 30, text: 'start' },
      { atS: 120, text: 'cough' },
      { atS: 200, text: 'drank 200 ml' },
      { atS: 300.25, text: 'meal' },
      { atS: 360.25, text: 'end of meal' },
    ]);
  });

  it('take a time within reach, the nearest first', () => {
    expect(snapTo(PLACES, 124, 5)?.text).toBe('cough');
    expect(snapTo(PLACES, 126, 5)).toBeNull();
    expect(snapTo(PLACES, 331, 40)?.text).toBe('end of meal');
    expect(snapTo(PLACES, 330.25, 40)?.text).toBe('meal');
    expect(snapTo([], 10, 100)).toBeNull();
  });

  it('follow each other by keys', () => {
    expect(nextPlace(PLACES, 120, 1)?.atS).toBe(200);
    expect(nextPlace(PLACES, 120, -1)?.atS).toBe(30);
    expect(nextPlace(PLACES, 360.25, 1)).toBeNull();
    expect(nextPlace(PLACES, 30, -1)).toBeNull();
  });
});

describe('a pointer over a drawing', () => {
  const study = paneStudy();
  study.stores.analysis.setState({
    recording: { ...recordingOf(600), annotations: ANNOTATIONS },
  });
  /** A drawing of 300 px for 600 s: 6 px are 12 s. */
  const place = { xOf: (atS: number) => atS / 2, sAt: (x: number) => 2 * x };
  const pointed = pointing(study.stores, place, Math.round);

  it('means the annotation within 6 px, to its last digit, and a rounded time elsewhere', () => {
    expect(pointed(153.4, false)).toEqual({ atS: 300.25, snap: 'meal' });
    expect(pointed(146.3, false)).toEqual({ atS: 300.25, snap: 'meal' });
    expect(pointed(156.3, false)).toEqual({ atS: 313, snap: null });
  });

  it('means the time under it alone while a key keeps it free', () => {
    expect(pointed(150.2, true)).toEqual({ atS: 300, snap: null });
  });
});

describe('an end of a span', () => {
  const span = { id: 7, fromS: 100, toS: 200 };

  it('is moved, the other one stays', () => {
    const moved = { atS: 120, snap: 'cough' };
    expect(moveSpanEnd(span, 'left', moved)).toEqual({ fromS: 120, toS: 200, spanId: 7, moved });
    expect(moveSpanEnd(span, 'right', moved)).toEqual({ fromS: 100, toS: 120, spanId: 7, moved });
  });

  it('never comes nearer than a tenth of a second, and then is not where it was snapped to', () => {
    const moved = { atS: 300, snap: 'meal' };
    expect(moveSpanEnd(span, 'left', moved)).toEqual({
      fromS: 199.9,
      toS: 200,
      spanId: 7,
      moved: { atS: 199.9, snap: null },
    });
  });
});
