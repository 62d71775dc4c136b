import { describe, expect, it } from 'vitest';
import { detectBeats } from '../../src/heart/detect';
import { type EcgRecordSpec, ecgRecord } from '../../src/simulate/ecg-record';
import type { EcgRhythmSpec } from '../../src/simulate/ecg-rhythm';
import { PLAIN_SINUS, QUIET } from '../simulate/plain-ecg';
import { heartbeatOf } from './record208';
import { matchBeats } from './score';
import { addBeats, addNoise, NARROW, planBeats, testRandom } from './simulated-heart';

const RATE = 360;
const SECONDS = 300;

const SINUS: EcgRhythmSpec = { ...PLAIN_SINUS, rateBpm: 72, breathing: 0.04, wander: 0.03 };

const CLEAN: EcgRecordSpec = {
  seed: 5,
  durationS: SECONDS,
  rateHz: RATE,
  rhythm: SINUS,
  family: 'narrow',
  sign: 1,
  heightUv: 1000,
  breathHeight: 0.1,
  shapeSpread: 0.04,
  turnsPerHour: 0,
  atrialUv: 60,
  noise: { ...QUIET, wanderUv: 60, muscleUv: 8, humUv: 5, humHz: 60 },
  digitiser: { stepUv: 5, railUv: 5120 },
};

const ticksOf = (raw: Float64Array, rateHz = RATE) =>
  detectBeats({ heartbeat: heartbeatOf(raw, rateHz), rateHz, ticksPerSample: 64 }).beats.ticks;
const timesOf = (raw: Float64Array, rateHz = RATE) =>
  Array.from(ticksOf(raw, rateHz), (tick) => tick / (64 * rateHz));

/** Beats missed and too many in an invented record (its shapes and rhythm are those of src/simulate). */
function errorsOf(change: Partial<EcgRecordSpec>) {
  const { signal, beats, rateHz } = ecgRecord({ ...CLEAN, ...change });
  const times = beats.map(({ timeS }) => timeS);
  const { falseNegative, falsePositive } = matchBeats(times, timesOf(signal, rateHz));
  return { missed: falseNegative, extra: falsePositive, of: beats.length };
}

describe('in a surface ECG the beat detector', () => {
  it('takes no P wave that no beat follows, in Wenckebach periods and with two P waves to a beat', () => {
    const rhythm: EcgRhythmSpec = {
      ...SINUS,
      episodes: [
        { rhythm: 'wenckebach', everyS: 40, lengthS: 30 },
        { rhythm: 'block', everyS: 60, lengthS: 30 },
      ],
    };
    expect(errorsOf({ rhythm })).toMatchObject({ missed: 0, extra: 0 });
  });

  it('makes no shape of beats from lone P waves, whichever the heart', () => {
    const rhythm: EcgRhythmSpec = {
      ...SINUS,
      episodes: [
        { rhythm: 'wenckebach', everyS: 40, lengthS: 30 },
        { rhythm: 'block', everyS: 60, lengthS: 30 },
      ],
    };
    for (const seed of [6, 9, 12, 14, 16])
      for (const family of ['narrow', 'leftBundle'] as const) {
        const { missed, extra } = errorsOf({ rhythm, family, seed, durationS: 150 });
        expect({ missed, extra }, `${family} ${seed}`).toEqual({ missed: 0, extra: 0 });
      }
  });

  it('finds the last beat, however near the end', () => {
    const { signal, beats } = ecgRecord(CLEAN);
    const lastS = beats[beats.length - 1].timeS;
    const cut = signal.slice(0, Math.ceil((lastS + 0.06) * RATE));
    const found = timesOf(cut);
    expect(Math.abs(found[found.length - 1] - lastS)).toBeLessThan(0.05);
  });

  it('does not halve a tachycardia that begins between two beats', () => {
    const rhythm: EcgRhythmSpec = {
      ...SINUS,
      episodes: [{ rhythm: 'tachycardia', everyS: 40, lengthS: 15 }],
    };
    for (const family of ['narrow', 'leftBundle'] as const) {
      const { missed, extra } = errorsOf({ rhythm, family });
      expect(missed, family).toBeLessThanOrEqual(1);
      expect(extra, family).toBe(0);
    }
  });

  it('makes no beat in pauses of up to six seconds, and finds the escape beats that end them', () => {
    const rhythm = { ...SINUS, rateBpm: 60, chances: { ventricular: 0, atrial: 0, pause: 0.05 } };
    const { missed, extra } = errorsOf({ rhythm });
    expect({ missed, extra }).toEqual({ missed: 0, extra: 0 });
  });

  it('finds wide beats of many shapes among T waves as tall as R', () => {
    const rhythm = { ...SINUS, foci: 3, chances: { ventricular: 0.08, atrial: 0, pause: 0 } };
    const { missed, extra, of } = errorsOf({ rhythm, family: 'tallT' });
    expect(missed).toBeLessThanOrEqual(0.03 * of);
    expect(extra).toBeLessThanOrEqual(1);
  });

  it('takes no T wave that follows each beat at one delay, as tall as it is', () => {
    const early = { ...SINUS, foci: 2, chances: { ventricular: 0.05, atrial: 0.02, pause: 0 } };
    for (const seed of [1, 11, 15])
      for (const rhythm of [SINUS, early]) {
        const record = { rhythm, seed, durationS: 200, rateHz: 250 };
        const { missed, extra, of } = errorsOf({ ...record, family: 'tallT' });
        expect(missed, `${seed}`).toBeLessThanOrEqual(0.03 * of);
        expect(extra, `${seed}`).toBeLessThanOrEqual(1);
      }
  });

  it('keeps wide ventricular beats that follow every other beat, however early, for the pauses after them', () => {
    const rhythm: EcgRhythmSpec = {
      ...SINUS,
      rateBpm: 92,
      foci: 1,
      episodes: [{ rhythm: 'bigeminy', everyS: 10, lengthS: SECONDS }],
    };
    for (const seed of [7, 15]) {
      const { missed, extra, of } = errorsOf({ rhythm, family: 'tallT', seed });
      expect(missed, `${seed}`).toBeLessThanOrEqual(0.02 * of);
      expect(extra, `${seed}`).toBeLessThanOrEqual(1);
    }
  });

  it('finds paced beats of fixed rate once each, for all their spikes', () => {
    const rhythm: EcgRhythmSpec = { ...SINUS, base: 'paced', rateBpm: 70 };
    expect(errorsOf({ rhythm })).toMatchObject({ missed: 0, extra: 0 });
  });

  it('takes no flutter wave and no fibrillation wave', () => {
    const rhythm: EcgRhythmSpec = {
      ...SINUS,
      base: 'fibrillation',
      episodes: [{ rhythm: 'flutter', everyS: 60, lengthS: 40 }],
    };
    const { missed, extra } = errorsOf({ rhythm });
    expect(missed).toBeLessThanOrEqual(1);
    expect(extra).toBe(0);
  });

  it('is not led astray by steps of many mV and pops', () => {
    const noise = { ...CLEAN.noise, stepsPerHour: 60, stepUv: 3000, popsPerHour: 60, popUv: 1000 };
    const { missed, extra, of } = errorsOf({ noise });
    expect(missed).toBeLessThanOrEqual(1);
    expect(extra).toBeLessThanOrEqual(0.01 * of);
  });
});

describe('in an abdominal lead the beat detector', () => {
  const plan = { seed: 11, seconds: SECONDS, meanRrS: 0.85 };
  const beatsOn = (signal: Float64Array, heightUv: number, early = {}) => {
    const beats = planBeats({ ...plan, ...early });
    addBeats(signal, RATE, beats, heightUv, NARROW);
    return beats.map(({ timeS }) => timeS);
  };
  const empty = () => new Float64Array(SECONDS * RATE);

  it('finds early beats a third as high as the usual one', () => {
    const raw = empty();
    const times = beatsOn(raw, 100, { supraventricular: 0.06, earlySize: 0.33 });
    addNoise(raw, RATE, { seed: 4, whiteUv: 2, slowUv: 200, breathUv: 50 });
    expect(matchBeats(times, timesOf(raw))).toMatchObject({ falseNegative: 0, falsePositive: 0 });
  });

  it('takes stays at a rail too short for a span for no beat, and loses none beside them', () => {
    const raw = empty();
    const times = beatsOn(raw, 100);
    addNoise(raw, RATE, { seed: 4, whiteUv: 2, slowUv: 200 });
    for (let k = 20; k < times.length - 1; k += 40) {
      const from = Math.round(((times[k] + times[k + 1]) / 2) * RATE);
      raw.fill(2000, from, from + 5);
    }
    const { falseNegative, falsePositive } = matchBeats(times, timesOf(raw));
    expect({ falseNegative, falsePositive }).toEqual({ falseNegative: 0, falsePositive: 0 });
  });

  it('needs no more than steps of 1 uV, and bears offsets of 300 mV and a baseline that swings ten times the QRS', () => {
    const random = testRandom(3);
    const raw = empty();
    const times = beatsOn(raw, 60);
    addNoise(raw, RATE, { seed: 4, whiteUv: 1.5 });
    for (let i = 0; i < raw.length; i += 1) {
      const t = i / RATE;
      const swing = 600 * Math.sin(2 * Math.PI * 0.11 * t) + 300 * Math.sin(2 * Math.PI * 0.23 * t);
      raw[i] = Math.round(raw[i] + 300_000 + swing + 0.2 * random.normal());
    }
    expect(matchBeats(times, timesOf(raw))).toMatchObject({ falseNegative: 0, falsePositive: 0 });
  });

  it('finds the same beats, to the tick, in a lead turned over, noise and early beats and all', () => {
    const { signal } = ecgRecord({
      ...CLEAN,
      rhythm: { ...SINUS, foci: 2, chances: { ventricular: 0.1, atrial: 0.1, pause: 0 } },
      noise: { ...CLEAN.noise, motionPerMin: 2, motionUv: 500, burstsPerMin: 2, burstUv: 100 },
    });
    expect(ticksOf(signal.map((uv) => -uv))).toEqual(ticksOf(signal));
  });
});
