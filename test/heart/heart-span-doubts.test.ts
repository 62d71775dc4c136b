import { describe, expect, it } from 'vitest';
import { createBeatLooks } from '../../src/heart/beat-looks';
import { cleanSpans, doubtedStretches } from '../../src/heart/heart-span-doubts';
import type { Doubt } from '../../src/recording/doubt';
import type { Span } from '../../src/recording/span';
import { type InventedHeart, inventedHeart, RATE_HZ } from './invented-doubts';

const doubtAt = (timeS: number): Doubt => ({
  id: `odd-shape-${timeS}`,
  kind: 'odd-shape',
  fromS: timeS,
  toS: timeS,
  tick: Math.round(timeS * 64 * RATE_HZ),
  lead: null,
  why: 'Invented.',
  mend: null,
  effect: null,
});

describe('a stretch in which beat after beat is doubted', () => {
  it('is a place of its own, to be excluded for the heart', () => {
    const doubts = [10, 100, 100.8, 101.6, 102.4, 103.2, 200].map(doubtAt);
    const [stretch, ...others] = doubtedStretches(doubts, '#2');
    expect(others).toEqual([]);
    expect(stretch).toMatchObject({ kind: 'span', lead: '#2', mend: { kind: 'exclude' } });
    expect(stretch.fromS).toBeLessThan(100);
    expect(stretch.toS).toBeGreaterThan(103.2);
    expect(doubtedStretches(doubts.slice(0, 4), '#2')).toEqual([]);
  });
});

describe('a span the program proposed for the heart', () => {
  const span = (heart: InventedHeart, from: number, to: number): Span => ({
    id: 3,
    fromS: heart.truth[from].timeS - 0.2,
    toS: heart.truth[to].timeS + 0.2,
    lead: '#1',
    target: 'heart',
    cause: 'burst',
    origin: 'proposed',
    note: '',
  });
  const doubtsOf = (heart: InventedHeart, one: Span) => {
    const { heartbeat, detection } = heart;
    const left = Array.from(detection.beats.ticks.keys()).filter((i) => {
      const timeS = detection.beats.ticks[i] / 64 / RATE_HZ;
      return timeS < one.fromS || timeS >= one.toS;
    });
    const beats = {
      ticks: Float64Array.from(left, (i) => detection.beats.ticks[i]),
      classes: Uint8Array.from(left, (i) => detection.beats.classes[i]),
      origins: Uint8Array.from(left, (i) => detection.beats.origins[i]),
    };
    const signal = { heartbeat, heartbeatHz: RATE_HZ, ticksPerSample: 64 };
    const look = createBeatLooks({ ...signal, averages: detection.averages });
    const input = { ...signal, beats, rateHz: RATE_HZ, blocked: [one], detection };
    return cleanSpans(input, look, [one]);
  };

  it('is doubted where each beat that is due in it can be read', () => {
    const heart = inventedHeart({ ventricular: 0, supraventricular: 0 });
    const [doubt] = doubtsOf(heart, span(heart, 100, 103));
    expect(doubt).toMatchObject({ kind: 'span', mend: { kind: 'include', spanId: 3 } });
    expect(doubt.why).toContain('each of the 4 beats');
  });

  it('is not where a beat is hidden in noise', () => {
    const heart = inventedHeart({ ventricular: 0, supraventricular: 0 }, (signal, truth) => {
      const from = Math.round((truth[101].timeS - 0.3) * RATE_HZ);
      for (let i = 0; i < 0.6 * RATE_HZ; i += 1)
        signal[from + i] = 150 * Math.sin(1.9 * i) + 120 * Math.sin(0.7 * i * i);
    });
    expect(doubtsOf(heart, span(heart, 100, 103))).toEqual([]);
  });
});
