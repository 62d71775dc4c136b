import { describe, expect, it } from 'vitest';
import { detectBeats } from '../../src/heart/detect';
import { heartbeatOf } from './record208';
import { matchBeats, positivePredictivity, sensitivity } from './score';
import {
  addBeats,
  addNoise,
  BROAD,
  NARROW,
  planBeats,
  type TrueBeat,
  testRandom,
  type Wave,
} from './simulated-heart';

const SECONDS = 300;

function scoreOf(
  beats: readonly TrueBeat[],
  { rateHz = 250, heightUv = 80, shape = NARROW as readonly Wave[] } = {},
) {
  const raw = addBeats(new Float64Array(SECONDS * rateHz), rateHz, beats, heightUv, shape);
  addNoise(raw, rateHz, { seed: 3, whiteUv: 3, burstUv: 10, slowUv: 200 });
  const { beats: found } = detectBeats({
    heartbeat: heartbeatOf(raw, rateHz),
    rateHz,
    ticksPerSample: 64,
  });
  const matching = matchBeats(
    beats.map((beat) => beat.timeS),
    Array.from(found.ticks, (tick) => tick / (64 * rateHz)),
  );
  return { se: sensitivity(matching), pp: positivePredictivity(matching) };
}

const plan = (meanRrS: number, ventricular = 0) =>
  planBeats({ seed: 7, seconds: SECONDS, meanRrS, ventricular });

/** N beats, each `every`-th followed by a V beat after `couplingS`; then the next N after `pauseS`. */
function coupled(every: number, couplingS: number, pauseS: number): TrueBeat[] {
  const random = testRandom(3);
  const beats: TrueBeat[] = [];
  let timeS = 0.5;
  for (let k = 1; timeS < SECONDS - 2; k += 1) {
    beats.push({ timeS, beatClass: 'N', size: 1 });
    const varied = 1 + 0.02 * random.normal();
    if (k % every === 0) beats.push({ timeS: timeS + couplingS * varied, beatClass: 'V', size: 1 });
    timeS += k % every === 0 ? pauseS : 0.8 * varied;
  }
  return beats;
}

/** Six V beats at 167 a minute after each 40 N beats. */
function runs(): TrueBeat[] {
  const beats: TrueBeat[] = [];
  let timeS = 0.5;
  for (let k = 1; timeS < SECONDS - 5; k += 1) {
    beats.push({ timeS, beatClass: 'N', size: 1 });
    if (k % 40 === 0)
      for (let v = 0; v < 6; v += 1) {
        timeS += 0.36;
        beats.push({ timeS, beatClass: 'V', size: 1 });
      }
    timeS += k % 40 === 0 ? 1.1 : 0.8;
  }
  return beats;
}

const all = { se: 100, pp: 100 };

describe('the beat detector finds every beat', () => {
  it.each([30, 45, 100, 190])('at %d a minute', (bpm) => {
    expect(scoreOf(plan(60 / bpm))).toEqual(all);
  });

  it.each([100, 128, 200, 500])('at %d samples a second', (rateHz) => {
    expect(scoreOf(plan(0.8, 0.04), { rateHz })).toEqual(all);
  });

  it.each([
    ['where every second beat is early', 1, 0.4, 1.6],
    ['where every third beat is early', 2, 0.44, 1.6],
    ['where early beats fall between two others', 5, 0.42, 0.85],
  ])('%s', (_, every, couplingS, pauseS) => {
    const beats = coupled(every, couplingS, pauseS);
    expect(scoreOf(beats)).toEqual(all);
    expect(scoreOf(beats, { shape: BROAD })).toEqual(all);
  });

  it('of short runs of fast wide beats', () => {
    expect(scoreOf(runs())).toEqual(all);
  });

  it('and adds none where beats drop out', () => {
    const regular = plan(0.8);
    expect(scoreOf(regular.filter((_, i) => i % 9 !== 0))).toEqual(all);
    expect(scoreOf(regular.filter((_, i) => i % 17 > 2))).toEqual(all);
  });

  it('when the lead turns over or falls to a fifth of its height midway', () => {
    const regular = plan(0.8);
    const half = regular.length / 2;
    const turned = regular.map((beat, i) => ({ ...beat, size: i > half ? -0.6 : 1 }));
    expect(scoreOf(turned)).toEqual(all);
    const small = regular.map((beat, i) => ({ ...beat, size: i > half ? 0.2 : 1 }));
    expect(scoreOf(small, { heightUv: 200 })).toEqual(all);
  });
});
