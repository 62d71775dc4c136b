import { describe, expect, it } from 'vitest';
import { type Detection, detectBeats, detectInSteps } from '../../src/heart/detect';
import { BEAT_CLASSES } from '../../src/recording/beat';
import { heartbeatOf } from './record208';
import { matchBeats, positivePredictivity, sensitivity } from './score';
import {
  addBeats,
  addNoise,
  BROAD,
  type HeartPlan,
  NARROW,
  planBeats,
  TALL_T,
  type TrueBeat,
  testRandom,
  type Wave,
} from './simulated-heart';

const RATE = 250;
const SECONDS = 300;

function study(plan: Partial<HeartPlan>, shape: readonly Wave[], heightUv: number) {
  const beats = planBeats({ seed: 21, seconds: SECONDS, meanRrS: 0.85, ...plan });
  const raw = addBeats(new Float64Array(SECONDS * RATE), RATE, beats, heightUv, shape);
  return { beats, raw };
}

const detect = (raw: Float64Array, excluded: { fromS: number; toS: number }[] = []) =>
  detectBeats({ heartbeat: heartbeatOf(raw, RATE), rateHz: RATE, ticksPerSample: 64, excluded });

const timesOf = (found: Detection) => Array.from(found.beats.ticks, (tick) => tick / (64 * RATE));

function score(beats: readonly TrueBeat[], found: Detection) {
  const matching = matchBeats(
    beats.map((beat) => beat.timeS),
    timesOf(found),
  );
  return { se: sensitivity(matching), pp: positivePredictivity(matching), matching };
}

describe('the beat detector', () => {
  it('does not take a T wave taller than R for a beat', () => {
    for (const meanRrS of [0.46, 0.85, 1.3]) {
      const { beats, raw } = study({ meanRrS }, TALL_T, 80);
      const { se, pp } = score(beats, detect(addNoise(raw, RATE, { seed: 2, whiteUv: 3 })));
      expect(se, `RR ${meanRrS} s`).toBeGreaterThanOrEqual(99.5);
      expect(pp, `RR ${meanRrS} s`).toBeGreaterThanOrEqual(99.5);
    }
  });

  it('follows an R height that breathing swings by half', () => {
    const { beats, raw } = study({ breathHeight: 0.5 }, NARROW, 60);
    const found = detect(addNoise(raw, RATE, { seed: 4, whiteUv: 3, slowUv: 200, breathUv: 50 }));
    expect(score(beats, found)).toMatchObject({ se: 100, pp: 100 });
  });

  it('finds small early beats and wide ones, and tells them apart', () => {
    const { beats, raw } = study(
      { ventricular: 0.06, supraventricular: 0.06, earlySize: 0.45 },
      NARROW,
      100,
    );
    const found = detect(addNoise(raw, RATE, { seed: 6, whiteUv: 2 }));
    const { se, pp, matching } = score(beats, found);
    expect(se).toBeGreaterThanOrEqual(99.5);
    expect(pp).toBeGreaterThanOrEqual(99.5);
    const right = matching.pairs.filter(
      ([r, d]) => beats[r].beatClass === BEAT_CLASSES[found.beats.classes[d]],
    );
    expect(right.length).toBeGreaterThanOrEqual(0.97 * matching.pairs.length);
  });

  it('keeps an irregular rhythm, and calls no beat of it early', () => {
    const { beats, raw } = study({ meanRrS: 0.75, spread: 0.2 }, NARROW, 80);
    const found = detect(addNoise(raw, RATE, { seed: 8, whiteUv: 3 }));
    const { se, pp } = score(beats, found);
    expect(se).toBeGreaterThanOrEqual(99.5);
    expect(pp).toBeGreaterThanOrEqual(99.5);
    const early = found.beats.classes.filter((value) => BEAT_CLASSES[value] === 'S');
    expect(early.length).toBeLessThanOrEqual(0.02 * beats.length);
  });

  it.each([45, 150])('finds broad beats at %d a minute', (rate) => {
    const { beats, raw } = study({ meanRrS: 60 / rate }, BROAD, 80);
    const { se, pp } = score(beats, detect(addNoise(raw, RATE, { seed: 3, whiteUv: 3 })));
    expect(se).toBeGreaterThanOrEqual(99.5);
    expect(pp).toBeGreaterThanOrEqual(99.5);
  });

  it('fires on no flat line, no slow wave and hardly on noise without a heartbeat', () => {
    const empty = () => new Float64Array(SECONDS * RATE);
    expect(detect(empty()).beats.ticks.length).toBe(0);
    expect(detect(empty()).notes.length).toBe(1);
    const slow = addNoise(empty(), RATE, { seed: 1, slowUv: 300, breathUv: 100, humUv: 30 });
    expect(detect(slow).beats.ticks.length).toBe(0);
    for (const seed of [1, 2, 3, 4]) {
      const white = addNoise(empty(), RATE, { seed, whiteUv: 5 });
      expect(detect(white).beats.ticks.length, `seed ${seed}`).toBeLessThanOrEqual(5);
    }
  });

  it('stays silent in a gap, a flat stretch, at a rail and in bursts stronger than the beats', () => {
    const { beats, raw } = study({}, NARROW, 100);
    const random = testRandom(9);
    const silent = [
      { fromS: 50, toS: 62, make: () => 0 },
      { fromS: 100, toS: 108, make: () => 3000 },
      { fromS: 150, toS: 153, make: () => 250 * random.normal() },
    ];
    for (const { fromS, toS, make } of silent)
      for (let i = fromS * RATE; i < toS * RATE; i += 1) raw[i] = make();
    const heartbeat = heartbeatOf(addNoise(raw, RATE, { seed: 5, whiteUv: 2 }), RATE);
    for (let i = 200 * RATE; i < 215 * RATE; i += 1) heartbeat[i] = Number.NaN;
    const found = detectBeats({ heartbeat, rateHz: RATE, ticksPerSample: 64 });
    const times = timesOf(found);
    const bad = [...silent, { fromS: 200, toS: 215 }];
    for (const { fromS, toS } of bad) {
      const within = times.filter((time) => time > fromS + 0.3 && time < toS - 0.3);
      expect(within.length, `${fromS}-${toS} s`).toBeLessThanOrEqual(1);
    }
    const clear = (time: number) =>
      bad.every(({ fromS, toS }) => time < fromS - 1 || time > toS + 1);
    const matching = matchBeats(beats.map((beat) => beat.timeS).filter(clear), times.filter(clear));
    expect(matching).toMatchObject({ falseNegative: 0, falsePositive: 0 });
  });

  it('gives beats in doubted stretches only where they can be read', () => {
    const { beats, raw } = study({}, NARROW, 100);
    const random = testRandom(9);
    for (let i = 150 * RATE; i < 153 * RATE; i += 1) raw[i] += 250 * random.normal();
    const found = detectBeats({
      heartbeat: heartbeatOf(addNoise(raw, RATE, { seed: 5, whiteUv: 2 }), RATE),
      rateHz: RATE,
      ticksPerSample: 64,
      doubted: [
        { fromS: 60, toS: 70 },
        { fromS: 150, toS: 153 },
      ],
    });
    expect(found.legible).toEqual([true, false]);
    const within = (list: readonly number[], fromS: number, toS: number) =>
      list.filter((time) => time >= fromS && time < toS).length;
    expect(within(timesOf(found), 150, 153)).toBe(0);
    expect(within(timesOf(found), 60, 70)).toBe(
      within(
        beats.map(({ timeS }) => timeS),
        60,
        70,
      ),
    );
  });

  it('looks for no beat in an excluded stretch and keeps those around it', () => {
    const { beats, raw } = study({}, NARROW, 100);
    const excluded = [{ fromS: 60, toS: 70 }];
    const found = detect(addNoise(raw, RATE, { seed: 5, whiteUv: 2 }), excluded);
    const times = timesOf(found);
    expect(times.some((time) => time >= 60 && time < 70)).toBe(false);
    const outside = beats.map((beat) => beat.timeS).filter((time) => time < 59.9 || time > 70.1);
    expect(matchBeats(outside, times).falseNegative).toBe(0);
  });

  it('gives ticks of the recording however the heartbeat signal was thinned', () => {
    const { beats, raw } = study({}, NARROW, 100);
    const found = detectBeats({
      heartbeat: heartbeatOf(raw, RATE),
      rateHz: RATE,
      ticksPerSample: 64 * 4,
    });
    const times = Array.from(found.beats.ticks, (tick) => tick / (64 * 1000));
    expect(
      matchBeats(
        beats.map((beat) => beat.timeS),
        times,
        0.005,
      ).falseNegative,
    ).toBe(0);
  });

  it('says so where the rate is too low to read a heartbeat', () => {
    const found = detectBeats({ heartbeat: new Float64Array(4000), rateHz: 4, ticksPerSample: 64 });
    expect(found.beats.ticks.length).toBe(0);
    expect(found.notes[0]).toContain('4 samples a second');
  });

  it('says of which beats it is unsure: those that noise hides, none of a clean lead', () => {
    const { raw } = study({}, NARROW, 100);
    expect(detect(addNoise(raw.slice(), RATE, { seed: 5, whiteUv: 2 })).doubtful.length).toBe(0);
    const random = testRandom(9);
    for (let i = 100 * RATE; i < 104 * RATE; i += 1) raw[i] += 70 * random.normal();
    const found = detect(addNoise(raw, RATE, { seed: 5, whiteUv: 2 }));
    const times = Array.from(found.doubtful, (tick) => tick / (64 * RATE));
    expect(times.length).toBeGreaterThan(0);
    expect(times.every((time) => time > 99.5 && time < 104.5)).toBe(true);
    expect(Array.from(found.doubtful).every((tick) => found.beats.ticks.includes(tick))).toBe(true);
  });

  it('works in steps that report rising progress', () => {
    const { raw } = study({}, NARROW, 100);
    const steps = detectInSteps({
      heartbeat: heartbeatOf(raw, RATE),
      rateHz: RATE,
      ticksPerSample: 64,
    });
    const done: number[] = [];
    for (let step = steps.next(); !step.done; step = steps.next()) done.push(step.value);
    expect(done.length).toBeGreaterThan(5);
    expect([...done].sort((a, b) => a - b)).toEqual(done);
  });
});
