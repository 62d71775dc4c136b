import { describe, expect, it } from 'vitest';
import { detectBeats } from '../../src/heart/detect';
import { beatsOutOfPlace, withMisfitsUnusable } from '../../src/heart/out-of-place';
import { atOnce } from '../../src/numeric/in-steps';
import { BEAT_CLASSES } from '../../src/recording/beat';
import { heartbeatOf } from './record208';
import { randomIntervals, randomOf, sinusIntervals, withEarlyBeats } from './rhythms';
import { addBeats, addNoise, NARROW, planBeats } from './simulated-heart';

function timesAfter(rrMs: ArrayLike<number>): number[] {
  const times = [1];
  for (let i = 0; i < rrMs.length; i += 1) times.push(times[i] + rrMs[i] / 1000);
  return times;
}

const flagsOf = (times: readonly number[], broken: readonly number[] = []) =>
  atOnce(
    beatsOutOfPlace(
      times,
      times.map(() => 1),
      Array.from(times.slice(1), (_, i) => (broken.includes(i) ? 1 : 0)),
    ),
  );
const flagged = (times: readonly number[], broken: readonly number[] = []) =>
  [...flagsOf(times, broken)].flatMap((flag, i) => (flag === 1 ? [i] : []));

const sinus = (seed: number, breathingSwing = 0.06, noise = 0.01) =>
  timesAfter(
    sinusIntervals(
      { lengthS: 300, rateBpm: 66, breathingSwing, breathsPerMinute: 15, noise },
      randomOf(seed),
    ),
  );

describe('a beat that contradicts the rhythm about it', () => {
  const times = sinus(1);

  it('is the one after a missed beat, or two', () => {
    for (const gone of [1, 2])
      expect(flagged([...times.slice(0, 101), ...times.slice(101 + gone)]), `${gone}`).toEqual([
        101,
      ]);
  });

  it('is one too many, wherever between two beats it stands', () => {
    for (const part of [0.3, 0.4, 0.5, 0.7]) {
      const extra = times[100] + part * (times[101] - times[100]);
      expect(flagged([...times.slice(0, 101), extra, ...times.slice(101)]), `${part}`).toEqual([
        101,
      ]);
    }
  });

  it('is one moved by a third of an interval, to either side', () => {
    for (const by of [0.3, -0.3]) {
      const moved = [...times];
      moved[100] += by;
      expect(flagged(moved)).toEqual([100]);
    }
  });

  it('is an early one from which the rhythm goes on', () => {
    const early = [...times.slice(0, 100), ...times.slice(100).map((one) => one - 0.4)];
    expect(flagged(early)).toEqual([100]);
  });

  it('is none where the interval is broken by something unusable, or the beat is not to be judged', () => {
    const missed = [...times.slice(0, 101), ...times.slice(102)];
    expect(flagged(missed)).toEqual([101]);
    expect(flagged(missed, [100])).toEqual([]);
    const judged = missed.map((_, i) => (i === 101 ? 0 : 1));
    expect([...atOnce(beatsOutOfPlace(missed, judged, missed.slice(1).fill(0)))].includes(1)).toBe(
      false,
    );
  });

  it('is none among too few beats to learn a rhythm from', () => {
    expect(flagged(timesAfter([800, 1600, 860, 800, 805]))).toEqual([]);
    expect(flagged([])).toEqual([]);
  });
});

describe('detected beats', () => {
  const rateHz = 250;
  const beats = planBeats({ seed: 5, seconds: 120, meanRrS: 0.85, spread: 0.01 });
  const detect = (shown: typeof beats, hiddenS: readonly [number, number] | null = null) => {
    const raw = addBeats(new Float64Array(120 * rateHz), rateHz, shown, 200, NARROW);
    const noisy = addNoise(raw, rateHz, { seed: 6, whiteUv: 2 });
    const excluded = hiddenS ? [{ fromS: hiddenS[0], toS: hiddenS[1] }] : [];
    return detectBeats({
      heartbeat: heartbeatOf(noisy, rateHz),
      rateHz,
      ticksPerSample: 64,
      excluded,
    }).beats;
  };
  const lettersOf = ({ classes }: ReturnType<typeof detect>) =>
    [...classes].map((one) => BEAT_CLASSES[one]).join('');

  it('bear class N throughout, also after a pause in which nothing lies', () => {
    expect(lettersOf(detect(beats))).toBe('N'.repeat(beats.length));
    const missed = beats.filter((_, i) => i !== 60);
    expect(lettersOf(detect(missed))).toBe('N'.repeat(missed.length));
  });

  it('bear class Q after a pause in which a beat may have been missed, and nowhere else', () => {
    const list = detect(beats.filter((_, i) => i !== 60));
    const usable = [{ from: 0, to: 120 * rateHz }];
    const missedAtS = beats[60].timeS;
    const judged = atOnce(
      withMisfitsUnusable(
        list,
        { usable, rateHz },
        64,
        (fromS, toS) => fromS < missedAtS && toS > missedAtS,
      ),
    );
    expect(lettersOf(judged)).toBe(`${'N'.repeat(60)}Q${'N'.repeat(beats.length - 62)}`);
  });

  it('are no proof of a rhythm where two of the six about them contradict it: doubtful ones are of class Q too', () => {
    const list = detect(beats.filter((_, i) => i !== 60 && i !== 62));
    const usable = [{ from: 0, to: 120 * rateHz }];
    const judged = (fromS: number, toS: number) =>
      lettersOf(
        atOnce(withMisfitsUnusable(list, { usable, rateHz }, 64, (a, b) => a < toS && b > fromS)),
      );
    const single = judged(beats[60].timeS - 0.1, beats[62].timeS + 0.1);
    expect(single.slice(58, 63)).toMatch(/^NN?Q+N*$/);
    const wide = judged(beats[56].timeS, beats[66].timeS);
    expect(wide.slice(58, 63)).toBe('QQQQQ');
    expect(wide.slice(0, 56) + wide.slice(66)).toMatch(/^N+$/);
  });

  it('bear none where a spoiled span hides the missed beat', () => {
    const atS = beats[60].timeS;
    expect(lettersOf(detect(beats, [atS - 0.2, atS + 0.2]))).toBe('N'.repeat(beats.length - 1));
  });
});

describe('a rhythm that is only lively', () => {
  const share = (make: (seed: number) => readonly number[]) => {
    let [flags, beats] = [0, 0];
    for (let seed = 1; seed <= 40; seed += 1) {
      const times = make(seed);
      flags += flagged(times).length;
      beats += times.length;
    }
    return flags / beats;
  };

  it.each([
    [0.1, 0.01],
    [0.2, 0.02],
    [0.3, 0.02],
    [0.2, 0.04],
    [0.05, 0.05],
  ])('of breathing swing %f and noise %f loses under one beat in two thousand', (swing, noise) => {
    expect(share((seed) => sinus(seed, swing, noise))).toBeLessThan(0.0005);
  });

  it.each([0.1, 0.15, 0.2, 0.25])(
    'that nothing foretells, of spread %f, loses under one beat in a hundred',
    (spread) => {
      const make = (seed: number) =>
        timesAfter(randomIntervals({ lengthS: 300, rateBpm: 100, spread }, randomOf(seed)));
      expect(share(make)).toBeLessThan(0.01);
    },
  );

  it('whose rate climbs from 60 to 110 within a minute loses none', () => {
    const climbing = Array.from(
      { length: 300 },
      (_, i) => 1000 - 4.5 * Math.min(100, Math.max(0, i - 100)),
    );
    expect(flagged(timesAfter(climbing))).toEqual([]);
  });

  it('with an early beat and its pause loses that beat alone, every third beat early none', () => {
    const rr = sinusIntervals(
      { lengthS: 300, rateBpm: 66, breathingSwing: 0.03, breathsPerMinute: 15, noise: 0.01 },
      randomOf(7),
    );
    const { rrMs, early } = withEarlyBeats(rr, 0.03, randomOf(8));
    expect(flagged(timesAfter(rrMs))).toEqual(early.map((i) => i + 1));
    const trigeminy = rr.map((one, i) => [1, 0.65, 1.35][i % 3] * one);
    expect(flagged(timesAfter(trigeminy))).toEqual([]);
  });
});
