import { describe, expect, it } from 'vitest';
import { createRandom } from '../../src/numeric/random';
import { addEcgNoise, type EcgNoiseSpec } from '../../src/simulate/ecg-noise';
import { type EcgRhythmSpec, ecgRhythm } from '../../src/simulate/ecg-rhythm';
import { PLAIN_SINUS, QUIET } from './plain-ecg';

const rhythm = (change: Partial<EcgRhythmSpec>) =>
  ecgRhythm({ ...PLAIN_SINUS, ...change }, 600, createRandom(7));

const noise = (change: Partial<EcgNoiseSpec>) => {
  const signal = new Float64Array(360 * 300);
  addEcgNoise(signal, 360, { ...QUIET, ...change }, createRandom(3));
  return signal;
};
const rms = (x: Float64Array) => Math.sqrt(x.reduce((sum, v) => sum + v * v, 0) / x.length);

describe('an invented rhythm', () => {
  it('is the same for the same numbers', () => {
    expect(rhythm({})).toEqual(rhythm({}));
  });

  it('has intervals of the rate and spread it asks for', () => {
    const rr = rhythm({}).beats.map(({ rrS }) => rrS);
    const mean = rr.reduce((sum, s) => sum + s, 0) / rr.length;
    expect(Math.abs(mean - 0.8)).toBeLessThan(0.003);
    const spread = Math.sqrt(rr.reduce((sum, s) => sum + (s - mean) ** 2, 0) / rr.length);
    expect(spread / mean).toBeGreaterThan(0.008);
    expect(spread / mean).toBeLessThan(0.012);
  });

  it('makes up for a ventricular beat: two intervals to the next sinus beat', () => {
    const { beats } = rhythm({ jitter: 0, chances: { ventricular: 0.1, atrial: 0, pause: 0 } });
    const at = beats.findIndex(({ origin }) => origin === 'ventricular');
    expect(beats[at + 1].timeS - beats[at - 1].timeS).toBeCloseTo(1.6, 6);
  });

  it('has as many P waves without a beat as beats where every second is blocked', () => {
    const { beats, lonePS } = rhythm({ base: 'block' });
    expect(Math.abs(lonePS.length - beats.length)).toBeLessThanOrEqual(1);
  });

  it('is paced at a fixed interval, and irregular in fibrillation', () => {
    const paced = rhythm({ base: 'paced' }).beats.filter(({ origin }) => origin === 'paced');
    expect(new Set(paced.map(({ rrS }) => rrS.toFixed(6))).size).toBe(1);
    const { beats, fibrillation } = rhythm({ base: 'fibrillation' });
    const rr = beats.map(({ rrS }) => rrS);
    const mean = rr.reduce((sum, s) => sum + s, 0) / rr.length;
    const spread = Math.sqrt(rr.reduce((sum, s) => sum + (s - mean) ** 2, 0) / rr.length);
    expect(spread / mean).toBeGreaterThan(0.18);
    expect(fibrillation.length).toBeGreaterThan(0);
    expect(beats.every(({ prS }) => prS === null)).toBe(true);
  });
});

describe('the noise of an invented ECG', () => {
  it('has a baseline and hum of the size asked for', () => {
    expect(rms(noise({ wanderUv: 100 }))).toBeGreaterThan(80);
    expect(rms(noise({ wanderUv: 100 }))).toBeLessThan(120);
    const hum = 10 * Math.sqrt((1 + 0.2 ** 2 + 0.3 ** 2) / 2);
    expect(rms(noise({ humUv: 10 }))).toBeCloseTo(hum, 2);
  });

  it('has muscle noise within a third of the size asked for', () => {
    const measured = rms(noise({ muscleUv: 10 }));
    expect(measured).toBeGreaterThan(6.7);
    expect(measured).toBeLessThan(13.3);
  });

  it('is none where none is asked for', () => {
    expect(rms(noise({}))).toBe(0);
  });
});
