import { describe, expect, it } from 'vitest';
import type { Shape } from '../../src/heart/beat-shapes';
import { classifyBeats } from '../../src/heart/classify';
import { detectInSteps } from '../../src/heart/detect';
import { withMisfitsUnusable } from '../../src/heart/out-of-place';
import { decidedPlaces } from '../../src/heart/place-odds';
import { rhythmOf } from '../../src/heart/rhythm-path';
import { rhythmFromBeats } from '../../src/heart/rhythm-track';
import type { Candidate } from '../../src/heart/shape-pass';
import { atOnce, mapInSteps } from '../../src/numeric/in-steps';
import type { BeatList } from '../../src/recording/beat';
import { addBeats, addNoise, NARROW, planBeats } from './simulated-heart';

/** The most that was counted between two rests of a pass. */
function mostInAStep(pass: Generator<unknown, unknown>, counted: () => number): number {
  let most = 0;
  let before = counted();
  for (let done = false; !done; ) {
    done = pass.next().done === true;
    most = Math.max(most, counted() - before);
    before = counted();
  }
  return most;
}

/** A signal that counts how often its samples are read. */
function countedSignal(signal: Float64Array) {
  let reads = 0;
  const samples = new Proxy(signal, {
    get(target, key) {
      if (key === 'length') return target.length;
      reads += 1;
      return Reflect.get(target, key);
    },
  });
  return { samples, reads: () => reads };
}

const RATE = 60;

function invented(minutes: number): Float64Array {
  const signal = new Float64Array(60 * minutes * RATE);
  const plan = { seed: 3, seconds: 60 * minutes, meanRrS: 0.8, ventricular: 0.03 };
  addBeats(signal, RATE, planBeats(plan), 100, NARROW);
  return addNoise(signal, RATE, { seed: 5, whiteUv: 3 });
}

/** As many places as a day may hold in an hour, at 0.4 s. */
const MANY = 9000;
const rhythm = rhythmOf(0.8, 0.06, 0.05);
const beatsEach = (rrS: number): BeatList => ({
  ticks: Float64Array.from({ length: MANY }, (_, i) => 64 * 100 * (1 + rrS * i)),
  classes: new Uint8Array(MANY),
  origins: new Uint8Array(MANY),
});

describe('between two rests the detector', () => {
  it('reads no more of the signal in a study four times as long', () => {
    const mostReads = (minutes: number) => {
      const { samples, reads } = countedSignal(invented(minutes));
      return mostInAStep(
        detectInSteps({ heartbeat: samples, rateHz: RATE, ticksPerSample: 64 }),
        reads,
      );
    };
    const short = mostReads(30);
    expect(short).toBeGreaterThan(1000);
    expect(mostReads(120)).toBeLessThan(3 * short);
  });

  it('decides no more than a thousand places', () => {
    let asked = 0;
    const places = Array.from({ length: MANY }, (_, i) => ({
      sample: 40 * i,
      energyUv: 1,
      likeP: 0,
      likeT: 0,
      get score() {
        asked += 1;
        return 1;
      },
    }));
    const beats = places.filter((_, i) => i % 2 === 0);
    const pass = decidedPlaces(beats, places, 100, () => rhythm);
    expect(mostInAStep(pass, () => asked)).toBeLessThanOrEqual(1000);
  });

  it('judges no more than a thousand beats by the rhythm about them', () => {
    let asked = 0;
    const isDoubtful = () => {
      asked += 1;
      return true;
    };
    const signal = { usable: [{ from: 0, to: 1e9 }], rateHz: 100 };
    const pass = withMisfitsUnusable(beatsEach(0.8), signal, 64, isDoubtful);
    expect(mostInAStep(pass, () => asked)).toBeLessThanOrEqual(1000);
    expect(asked).toBe(MANY);
  });

  it('looks at the own frequency of no more than a hundred beats of no known shape', () => {
    let asked = 0;
    const odd: Omit<Candidate, 'sample'> = {
      shape: -1,
      size: 1,
      likeness: 0.2,
      overNoise: 5,
      bestLikeness: 1,
      energyUv: 5,
      share: 1,
      likeP: 0,
      likeT: 0,
      rmsUv: 5,
    };
    const beats = Array.from({ length: MANY }, (_, i) => ({ ...odd, sample: 80 * i }));
    const shape: Shape = {
      average: Float64Array.from([0, 1, 0]),
      half: 1,
      norm: 1,
      count: MANY,
      coherence: 1,
      course: new Float64Array(3),
      before: 1,
      waves: [],
    };
    const meanHz = () => {
      asked += 1;
      return 1;
    };
    const pass = classifyBeats(beats, [shape], () => ({ ...rhythm, rrS: 80 }), meanHz);
    expect(mostInAStep(pass, () => asked)).toBeLessThanOrEqual(100);
    expect(asked).toBe(MANY);
  });

  it('learns the rhythm from no more than two thousand beats', () => {
    let reads = 0;
    const times = new Proxy(
      Float64Array.from({ length: MANY }, (_, i) => 0.8 * i),
      {
        get(target, key) {
          if (key !== 'length') reads += 1;
          return Reflect.get(target, key);
        },
      },
    );
    const aBeat = 4 * 16;
    const pass = rhythmFromBeats(times, () => rhythm);
    expect(mostInAStep(pass, () => reads)).toBeLessThan(2100 * aBeat);
    expect(reads).toBeGreaterThan(3 * 2100 * aBeat);
  });
});

it('an array made in steps is the one its map makes', () => {
  const numbers = Array.from({ length: 5000 }, (_, i) => i);
  const twice = (one: number, i: number) => 2 * one + i;
  let made = 0;
  const counted = (one: number, i: number) => {
    made += 1;
    return twice(one, i);
  };
  expect(atOnce(mapInSteps(numbers, twice))).toEqual(numbers.map(twice));
  expect(mostInAStep(mapInSteps(numbers, counted), () => made)).toBeLessThanOrEqual(1500);
});
