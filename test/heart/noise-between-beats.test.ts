import { describe, expect, it } from 'vitest';
import { learnShapes } from '../../src/heart/beat-shapes';
import { energyPass, type HeartSignal } from '../../src/heart/energy-pass';
import { qrsBands } from '../../src/heart/qrs-bands';
import { type Candidate, shapePass } from '../../src/heart/shape-pass';
import { atOnce } from '../../src/numeric/in-steps';
import { median } from '../../src/numeric/statistics';
import { addBeats, addNoise, NARROW, planBeats } from './simulated-heart';

const RATE = 250;
const SECONDS = 120;

/** The places at the true beats, once shapes are learned from these. */
function atTheBeats(meanRrS: number, whiteUv: number): Candidate[] {
  const beats = planBeats({ seed: 5, seconds: SECONDS, meanRrS, spread: 0.01 });
  const samples = addBeats(new Float64Array(SECONDS * RATE), RATE, beats, 100, NARROW);
  addNoise(samples, RATE, { seed: 8, whiteUv });
  const signal: HeartSignal = {
    samples,
    rateHz: RATE,
    usable: [{ from: 0, to: samples.length }],
    bands: qrsBands(RATE),
  };
  const first = beats.map(({ timeS }) => Math.round(timeS * RATE));
  const energy = atOnce(energyPass(signal));
  const shapes = atOnce(learnShapes(signal, first));
  const places = atOnce(shapePass(signal, shapes, energy, first));
  return first.flatMap((sample) => {
    const near = places.filter((one) => Math.abs(one.sample - sample) < 0.04 * RATE);
    return near.sort((a, b) => b.likeness - a.likeness).slice(0, 1);
  });
}

const usual = (places: readonly Candidate[], of: (place: Candidate) => number) =>
  median(places.map(of));

describe('the noise that a beat is weighed against', () => {
  const rates = [0.4, 0.6, 0.85, 1.2];

  it('is that between the beats, however fast they follow one another', () => {
    const overNoise = rates.map((rr) => usual(atTheBeats(rr, 5), (place) => place.overNoise));
    expect(Math.max(...overNoise)).toBeLessThan(2 * Math.min(...overNoise));
  });

  it('leaves a beat of a clean lead as like its shape as it can be', () => {
    for (const rr of rates)
      expect(
        usual(atTheBeats(rr, 0.5), (place) => place.bestLikeness),
        `${rr} s`,
      ).toBeGreaterThan(0.985);
  });

  it('doubles where the noise does', () => {
    const [single, double] = [6, 12].map((uv) =>
      usual(atTheBeats(1.2, uv), (place) => place.overNoise),
    );
    expect(single / double).toBeGreaterThan(1.7);
    expect(single / double).toBeLessThan(2.3);
  });
});
