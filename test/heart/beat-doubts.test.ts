import { beforeAll, describe, expect, it } from 'vitest';
import { beatAt, firstBeatAt } from '../../src/recording/beat';
import {
  classed,
  doubtsOf,
  type InventedHeart,
  inventedHeart,
  mended,
  nthOf,
  RATE_HZ,
  withBeat,
  without,
} from './invented-doubts';
import { TALL_T, testRandom } from './simulated-heart';

const TICKS_PER_S = 64 * RATE_HZ;

describe('the doubts of a heart whose beats are known', () => {
  let heart: InventedHeart;
  beforeAll(() => {
    heart = inventedHeart();
  });
  const at = (index: number) => heart.beats.ticks[index];
  const doubtAt = (beats = heart.beats, tick = 0) =>
    doubtsOf(heart, beats).find((one) => one.tick === tick);

  it('are none where every beat is found and classed as it is', () => {
    expect(doubtsOf(heart, heart.beats)).toEqual([]);
    expect(heart.beats.ticks.length).toBe(heart.truth.length);
  });

  it('a missed beat doubles one interval: it is listed at the beat after the gap and put back where it was', () => {
    const gone = nthOf(heart.beats, 'N', 4);
    const beats = without(heart.beats, gone);
    const doubt = doubtAt(beats, at(gone + 1));
    expect(doubt).toMatchObject({ kind: 'missed-beat', fromS: at(gone - 1) / TICKS_PER_S });
    const rr = Math.round((1000 * (at(gone + 1) - at(gone - 1))) / TICKS_PER_S);
    expect(doubt?.why).toContain(`The interval of ${rr} ms is about twice its neighbours'`);
    const back = mended(beats, doubt as NonNullable<typeof doubt>);
    const put = beatAt(back, firstBeatAt(back, at(gone) - 0.02 * TICKS_PER_S));
    expect(Math.abs(put.tick - at(gone)) / TICKS_PER_S).toBeLessThan(0.002);
    expect(put).toMatchObject({ beatClass: 'N', origin: 'added' });
    expect(doubtsOf(heart, back)).toEqual([]);
  });

  it('two missed beats are put back together', () => {
    const gone = nthOf(heart.beats, 'N', 30);
    const beats = without(without(heart.beats, gone), gone);
    const doubt = doubtAt(beats, at(gone + 2));
    expect(doubt?.mend).toMatchObject({ words: 'insert 2 beats' });
    expect(doubt?.why).toMatch(/is about (2\.9|3\.0|3\.1) times/);
  });

  it('a missed ventricular beat leaves no double interval, yet is seen in the pause', () => {
    const gone = nthOf(heart.beats, 'V', 0);
    const doubt = doubtAt(without(heart.beats, gone), at(gone + 1));
    const added = doubt?.mend?.kind === 'beats' ? doubt.mend.added : [];
    expect(added).toHaveLength(1);
    expect(added[0].beatClass).toBe('V');
    expect(Math.abs(added[0].tick - at(gone)) / TICKS_PER_S).toBeLessThan(0.01);
  });

  it('a beat too many halves one interval and is to be removed', () => {
    const before = nthOf(heart.beats, 'N', 8);
    const tick = Math.round(at(before) + 0.58 * (at(before + 1) - at(before)));
    const doubt = doubtAt(withBeat(heart.beats, tick), tick);
    expect(doubt).toMatchObject({ kind: 'extra-beat', mend: { words: 'remove beat' } });
  });

  it('a T wave taken for a beat is called one', () => {
    const before = nthOf(heart.beats, 'N', 12);
    const tick = at(before) + Math.round(0.27 * TICKS_PER_S);
    const doubt = doubtAt(withBeat(heart.beats, tick), tick);
    expect(doubt).toMatchObject({ kind: 'tall-wave', mend: { words: 'remove beat' } });
    expect(doubt?.why).toContain('270 ms');
  });

  it('of two beats nearer than the heart can beat the one that looks less like one goes', () => {
    const before = nthOf(heart.beats, 'N', 16);
    const tick = at(before) + Math.round(0.18 * TICKS_PER_S);
    const doubt = doubtAt(withBeat(heart.beats, tick), tick);
    expect(doubt?.kind).toBe('two-candidates');
    expect(doubt?.mend).toMatchObject({ removed: [{ tick }] });
  });

  it('an early beat of class N is to be classed S, and one of class S on time N', () => {
    const early = nthOf(heart.beats, 'S', 0);
    expect(doubtAt(classed(heart.beats, early, 'N'), at(early))).toMatchObject({
      kind: 'early-beat',
      mend: { words: 'class beat S' },
    });
    const onTime = nthOf(heart.beats, 'N', 20);
    expect(doubtAt(classed(heart.beats, onTime, 'S'), at(onTime))).toMatchObject({
      kind: 'early-beat',
      mend: { words: 'class beat N' },
    });
  });

  it('a beat that looks like another class’s average is to be classed so', () => {
    const wide = nthOf(heart.beats, 'V', 1);
    expect(doubtAt(classed(heart.beats, wide, 'N'), at(wide))?.mend).toMatchObject({
      words: 'class beat V',
    });
    const narrow = nthOf(heart.beats, 'N', 24);
    const doubt = doubtAt(classed(heart.beats, narrow, 'V'), at(narrow));
    expect(doubt).toMatchObject({ kind: 'odd-shape', mend: { words: 'class beat N' } });
  });

  it('a beat put by a person is theirs', () => {
    const before = nthOf(heart.beats, 'N', 8);
    const tick = Math.round(at(before) + 0.58 * (at(before + 1) - at(before)));
    const beats = withBeat(heart.beats, tick, { origin: 'added' });
    expect(doubtAt(beats, tick)).toBeUndefined();
  });

  it('have ids that do not change when something else is mended', () => {
    const [a, b] = [nthOf(heart.beats, 'N', 4), nthOf(heart.beats, 'N', 40)];
    const tick = at(a) + Math.round(0.45 * (at(a + 1) - at(a)));
    const beats = withBeat(without(heart.beats, b), tick);
    const [first, second] = doubtsOf(heart, beats);
    expect(doubtsOf(heart, mended(beats, first)).map(({ id }) => id)).toEqual([second.id]);
  });
});

describe('places where the detector itself was unsure', () => {
  const heart = inventedHeart({ ventricular: 0, supraventricular: 0 });
  const at = (index: number) => heart.beats.ticks[index];
  const unsureAt = (tick: number, wrong: number, taken: 0 | 1, seen = heart) =>
    doubtsOf(
      {
        ...seen,
        detection: {
          ...seen.detection,
          unsure: {
            ticks: Float64Array.of(tick),
            wrong: Float64Array.of(wrong),
            taken: Uint8Array.of(taken),
          },
        },
      },
      seen.beats,
    );

  it('a beat that little speaks for is listed with its odds, to be removed', () => {
    const [doubt] = unsureAt(at(50), 0.6, 1);
    expect(doubt).toMatchObject({ kind: 'low-beat', tick: at(50), mend: { words: 'remove beat' } });
    expect(doubt.why).toContain('60 %');
  });

  it('a beat that looks like the study’s others at their size is not asked about for the rhythm alone', () => {
    expect(unsureAt(at(50), 0.3, 1)).toEqual([]);
    const faint = { ...heart, heartbeat: heart.heartbeat.slice() };
    const middle = Math.round(at(50) / 64);
    const half = Math.round(0.15 * RATE_HZ);
    for (let i = middle - half; i <= middle + half; i += 1) faint.heartbeat[i] *= 0.4;
    const listed = unsureAt(at(50), 0.3, 1, faint).map(({ tick }) => tick);
    expect(listed).toEqual([at(50)]);
  });

  it('something not taken is listed at the beat after it: late as a missed beat, early as a tall wave', () => {
    const late = at(50) + 0.7 * (at(51) - at(50));
    expect(unsureAt(Math.round(late), 0.2, 0)).toMatchObject([
      { kind: 'missed-beat', tick: at(51), mend: { added: [{ tick: Math.round(late) }] } },
    ]);
    const early = at(50) + Math.round(0.3 * TICKS_PER_S);
    expect(unsureAt(early, 0.2, 0)).toMatchObject([{ kind: 'tall-wave', tick: at(51) }]);
  });

  it('is nothing where the odds are small, or where a beat stands by now', () => {
    expect(unsureAt(at(50), 0.02, 1)).toEqual([]);
    expect(unsureAt(at(50) + 64, 0.5, 0)).toEqual([]);
  });
});

describe('a rhythm that is irregular by itself', () => {
  it('does not fill the list: intervals are judged by the spread of the rhythm they are in', () => {
    const heart = inventedHeart({ spread: 0.2, ventricular: 0, supraventricular: 0, breathRr: 0 });
    const doubts = doubtsOf(heart, heart.beats);
    expect((1000 * doubts.length) / heart.beats.ticks.length).toBeLessThan(40);
  });
});

describe('what spoils single beats', () => {
  it('a lead turned over for some beats is one place, from the first of them to the last', () => {
    const turned = [100, 107] as const;
    const heart = inventedHeart({ ventricular: 0, supraventricular: 0 }, (signal, truth) => {
      const from = Math.round((truth[turned[0]].timeS - 0.3) * RATE_HZ);
      const to = Math.round((truth[turned[1]].timeS + 0.4) * RATE_HZ);
      for (let i = from; i < to; i += 1) signal[i] = -signal[i];
    });
    const found = doubtsOf(heart, heart.beats).filter(({ kind }) => kind === 'sign-change');
    expect(found).toHaveLength(1);
    expect(Math.abs(found[0].fromS - heart.truth[turned[0]].timeS)).toBeLessThan(0.1);
    expect(Math.abs(found[0].toS - heart.truth[turned[1]].timeS)).toBeLessThan(0.1);
    expect(found[0].why).toContain('8 beats stand upside down');
  });

  it('a beat of low height in noise is listed', () => {
    const heart = inventedHeart({ ventricular: 0, supraventricular: 0 }, (signal, truth) => {
      const random = testRandom(4);
      const from = Math.round((truth[90].timeS - 0.45) * RATE_HZ);
      for (let i = 0; i < 0.8 * RATE_HZ; i += 1)
        signal[from + i] = 0.3 * signal[from + i] + 25 * random.normal();
    });
    const { timeS } = heart.truth[90];
    const here = doubtsOf(heart, heart.beats).filter(
      ({ fromS, toS }) => fromS < timeS + 0.15 && toS > timeS - 0.15,
    );
    expect(here).toHaveLength(1);
    expect(here[0].kind).toBe('low-beat');
    expect(here[0].why).toMatch(/uV high, where \d+ uV are usual/);
  });

  it('tall T waves are no beats and raise no doubt where the rhythm is plain', () => {
    const heart = inventedHeart({ ventricular: 0, supraventricular: 0 }, (signal, truth) => {
      for (const { timeS } of truth)
        for (const { atS, sdS, size } of TALL_T.slice(-1))
          for (let i = 0; i < 0.3 * RATE_HZ; i += 1) {
            const t = Math.round((timeS + atS) * RATE_HZ) + i - Math.round(0.15 * RATE_HZ);
            const u = (t / RATE_HZ - timeS - atS) / sdS;
            if (t < signal.length) signal[t] += 80 * size * Math.exp(-0.5 * u * u);
          }
    });
    const doubts = doubtsOf(heart, heart.beats);
    expect((1000 * doubts.length) / heart.beats.ticks.length).toBeLessThan(15);
  });
});
