import { describe, expect, it } from 'vitest';
import { SOURCES, simulateSources, simulateStudy } from '../../src/simulate/simulate-study';
import {
  type HeartSpec,
  PLAIN_LEAD,
  PLAIN_STUDY,
  type SimulationSpec,
  type SlowWaveSpec,
} from '../../src/simulate/spec';

const SILENCE = { whiteUv: 0, muscleUv: 0, backgroundUv: 0, mainsUv: 0, mainsHz: 50, driftS: 400 };
const SLOW = PLAIN_STUDY.slowWave as SlowWaveSpec;
const HEART = PLAIN_STUDY.heart as HeartSpec;
const ONLY: SimulationSpec = {
  ...PLAIN_STUDY,
  slowWave: null,
  heart: null,
  breathing: null,
  noise: SILENCE,
  digitiser: null,
};

const rms = (values: ArrayLike<number>, from = 0, to = values.length): number => {
  let sum = 0;
  for (let i = from; i < to; i += 1) sum += values[i] ** 2;
  return Math.sqrt(sum / (to - from));
};

/** Amplitude of the sine at a frequency over all samples (direct sum, Goertzel's quantity). */
function amplitudeAt(values: Float64Array, hz: number, rateHz: number): number {
  let re = 0;
  let im = 0;
  for (let n = 0; n < values.length; n += 1) {
    re += values[n] * Math.cos((2 * Math.PI * hz * n) / rateHz);
    im += values[n] * Math.sin((2 * Math.PI * hz * n) / rateHz);
  }
  return (2 * Math.hypot(re, im)) / values.length;
}

describe('an invented study', () => {
  it('is the same for the same seed and another for another', () => {
    const [a] = simulateStudy(PLAIN_STUDY).signals;
    expect(simulateStudy(PLAIN_STUDY).signals[0]).toEqual(a);
    expect(simulateStudy({ ...PLAIN_STUDY, seed: 2 }).signals[0]).not.toEqual(a);
  });

  it('keeps its beats, slow wave and breathing when only the noise changes', () => {
    const { truth } = simulateStudy(PLAIN_STUDY);
    const louder = simulateStudy({
      ...PLAIN_STUDY,
      noise: { ...PLAIN_STUDY.noise, whiteUv: 20, backgroundUv: 90 },
    });
    expect(louder.truth).toEqual(truth);
  });

  it('has as many samples as its duration and rate ask for', () => {
    for (const rateHz of [1, 4, 360, 999.5]) {
      const { signals } = simulateStudy({ ...PLAIN_STUDY, durationS: 20, rateHz });
      expect(signals[0]).toHaveLength(Math.round(20 * rateHz));
      expect(signals[0].every(Number.isFinite)).toBe(true);
    }
    expect(() => simulateStudy({ ...PLAIN_STUDY, rateHz: 0 })).toThrow(RangeError);
    expect(() => simulateStudy({ ...PLAIN_STUDY, leads: [] })).toThrow(RangeError);
  });

  it('is rounded and clipped as its digitiser says', () => {
    const [signal] = simulateStudy({
      ...PLAIN_STUDY,
      digitiser: { stepUv: 0.5, railUv: 100 },
    }).signals;
    expect(signal.every((uv) => Number.isInteger(uv * 2) && Math.abs(uv) <= 100)).toBe(true);
    expect(Math.max(...signal.subarray(0, 50_000))).toBe(100);
  });
});

describe('its slow wave', () => {
  it('is a sine of the frequency and amplitude asked for', () => {
    const slowWave: SlowWaveSpec = {
      ...SLOW,
      frequencyCpm: 3,
      amplitudeUv: 100,
      harmonics: [],
    };
    const { signals, truth } = simulateStudy({ ...ONLY, slowWave });
    for (let n = 0; n < signals[0].length; n += 97)
      expect(signals[0][n]).toBeCloseTo(100 * Math.sin(2 * Math.PI * 0.05 * (n / 250)), 2);
    expect(truth.slowCpm?.every((cpm) => cpm === 3)).toBe(true);
    expect(truth.slowAmplitudeUv[0].every((uv) => uv === 100)).toBe(true);
  });

  it('arrives later, smaller or turned round on another lead', () => {
    const slowWave: SlowWaveSpec = { ...SLOW, harmonics: [0.2] };
    const leads = [PLAIN_LEAD, { ...PLAIN_LEAD, slowGain: -0.5, slowDelayS: 4 }];
    const { signals } = simulateStudy({ ...ONLY, leads, slowWave });
    for (let n = 1000; n < 100_000; n += 997)
      expect(signals[1][n]).toBeCloseTo(-0.5 * signals[0][n - 1000], 2);
  });

  it('follows a track of frequency: cycles are the integral of it', () => {
    const track = [
      { atS: 0, value: 2 },
      { atS: 300, value: 4 },
      { atS: 600, value: 4 },
    ];
    const slowWave: SlowWaveSpec = { ...SLOW, frequencyCpm: track, harmonics: [] };
    const [signal] = simulateStudy({ ...ONLY, slowWave }).signals;
    let crossings = 0;
    for (let n = 1; n < signal.length; n += 1)
      if (signal[n - 1] < 0 && signal[n] >= 0) crossings += 1;
    // 300 s at 3 cpm on average and 300 s at 4 cpm: 35 cycles; the first starts at 0.
    expect(Math.abs(crossings - 35)).toBeLessThanOrEqual(1);
  });

  it('wanders by the deviation asked for', () => {
    const slowWave: SlowWaveSpec = { ...SLOW, wanderCpm: 0.2, wanderS: 20 };
    const { slowCpm } = simulateStudy({ ...ONLY, durationS: 7200, rateHz: 25, slowWave }).truth;
    const deviation = rms((slowCpm ?? new Float64Array(1)).map((cpm) => cpm - 3));
    expect(deviation).toBeGreaterThan(0.16);
    expect(deviation).toBeLessThan(0.24);
  });
});

describe('its heartbeat', () => {
  const heart: HeartSpec = { ...HEART, respiratoryHeight: 0 };

  it('has its R waves where the truth says, upright or inverted', () => {
    const leads = [0, 180].map((heartAxisDeg) => ({ ...PLAIN_LEAD, heartAxisDeg, heartUv: 200 }));
    const { signals, truth } = simulateStudy({ ...ONLY, leads, heart });
    for (const { timeS } of truth.beats.slice(1, -1)) {
      const near = Math.round(timeS * 250);
      let top = near - 25;
      for (let n = near - 25; n <= near + 25; n += 1) if (signals[0][n] > signals[0][top]) top = n;
      expect(Math.abs(top - timeS * 250)).toBeLessThan(1);
      expect(signals[0][top]).toBeGreaterThan(170);
    }
    for (let n = 0; n < signals[0].length; n += 1)
      if (Math.abs(signals[0][n] + signals[1][n]) > 1e-9) throw new Error(`sample ${n}`);
  });

  it('beats at the rate asked for, swaying with breath by the milliseconds asked for', () => {
    const breathing = { ratePerMin: 15, wanderPerMin: 0 };
    const spec = { ...ONLY, durationS: 3600, rateHz: 25, breathing };
    const { truth } = simulateStudy({
      ...spec,
      heart: { ...heart, lowFrequencyMs: 0, jitterMs: 0, respiratoryMs: 40 },
    });
    const rr = truth.beats.slice(1).map((beat, i) => beat.timeS - truth.beats[i].timeS);
    const mean = rr.reduce((sum, one) => sum + one, 0) / rr.length;
    expect(60 / mean).toBeCloseTo(66, 0);
    // A sine of peak 40 ms with a second harmonic of 15 %: root mean square 40 sqrt((1 + 0.0225) / 2) = 28.6 ms.
    expect(1000 * rms(rr.map((one) => one - mean))).toBeCloseTo(28.6, 0);
  });

  it('without modulation is as regular as a clock', () => {
    const { truth } = simulateStudy({
      ...ONLY,
      heart: { ...heart, respiratoryMs: 0, lowFrequencyMs: 0, jitterMs: 0, rateBpm: 60 },
    });
    truth.beats.slice(1).forEach((beat, i) => {
      expect(beat.timeS - truth.beats[i].timeS).toBeCloseTo(1, 9);
    });
  });

  it('has early V beats with a compensatory pause and early S beats without', () => {
    const { truth } = simulateStudy({
      ...ONLY,
      durationS: 7200,
      rateHz: 25,
      heart: {
        ...heart,
        rateBpm: 60,
        respiratoryMs: 0,
        lowFrequencyMs: 0,
        jitterMs: 0,
        ventricularPerHour: 60,
        supraventricularPerHour: 60,
      },
    });
    const count = (wanted: string) => truth.beats.filter((one) => one.beatClass === wanted).length;
    // 120 expected, less what the distance between early beats takes; Poisson deviation 11.
    for (const beatClass of ['V', 'S']) {
      expect(count(beatClass)).toBeGreaterThan(75);
      expect(count(beatClass)).toBeLessThan(145);
    }
    truth.beats.forEach(({ beatClass, timeS }, i) => {
      if (beatClass === 'N' || i + 1 >= truth.beats.length) return;
      const before = timeS - truth.beats[i - 1].timeS;
      const around = truth.beats[i + 1].timeS - truth.beats[i - 1].timeS;
      expect(before).toBeLessThan(0.75);
      expect(around).toBeCloseTo(beatClass === 'V' ? 2 : 1.75, 9);
    });
  });
});

describe('its noise', () => {
  const withNoise = (noise: Partial<SimulationSpec['noise']>, rest: Partial<SimulationSpec> = {}) =>
    simulateStudy({ ...ONLY, ...rest, noise: { ...SILENCE, ...noise } }).signals[0];

  it('has the size asked for', () => {
    expect(rms(withNoise({ whiteUv: 5 }))).toBeCloseTo(5, 1);
    expect(rms(withNoise({ muscleUv: 4 }))).toBeCloseTo(4, 1);
    expect(amplitudeAt(withNoise({ mainsUv: 7 }), 50, 250)).toBeCloseTo(7, 6);
    expect(amplitudeAt(withNoise({ mainsUv: 7, mainsHz: 60 }), 60, 250)).toBeCloseTo(7, 2);
  });

  it('falls about as 1/f below the heart', () => {
    const signal = withNoise({ backgroundUv: 30 }, { durationS: 20_000, rateHz: 5 });
    expect(rms(signal)).toBeGreaterThan(24);
    expect(rms(signal)).toBeLessThan(36);
    const power = (hz: number) => {
      let sum = 0;
      for (let i = 0; i < 60; i += 1) sum += amplitudeAt(signal, hz * (1 + i / 200), 5) ** 2;
      return sum / 60;
    };
    // Ten times the frequency: 10 dB less, within 3 dB for ripple and chance.
    const fallDb = 10 * Math.log10(power(0.01) / power(0.1));
    expect(fallDb).toBeGreaterThan(7);
    expect(fallDb).toBeLessThan(13);
  });

  it('settles from the electrode drift of each lead', () => {
    const leads = [{ ...PLAIN_LEAD, driftUv: 500 }];
    const signal = withNoise({ driftS: 100 }, { leads });
    expect(signal[0]).toBeCloseTo(500, 6);
    expect(signal[100 * 250]).toBeCloseTo(500 / Math.E, 3);
  });
});

describe('its spoiled stretches', () => {
  const leads = [PLAIN_LEAD, { ...PLAIN_LEAD, label: 'EGG 2' }];
  const plain = simulateStudy({ ...PLAIN_STUDY, leads });
  const spoil = (cause: SimulationSpec['artefacts'][number]['cause'], sizeUv: number) =>
    simulateStudy({
      ...PLAIN_STUDY,
      leads,
      artefacts: [{ cause, fromS: 100, toS: 130, leads: [1], sizeUv }],
    });

  it.each(['talk', 'move', 'cough', 'eat', 'electrode', 'step', 'burst'] as const)(
    '%s changes its stretch on its lead and nothing else',
    (cause) => {
      const spoiled = spoil(cause, 300);
      expect(spoiled.signals[0]).toEqual(plain.signals[0]);
      const change = spoiled.signals[1].map((uv, n) => uv - plain.signals[1][n]);
      // The cubic through the coarse points reaches one point (40 ms) past the stretch.
      expect(rms(change, 0, 100 * 250 - 20)).toBe(0);
      expect(rms(change, 130 * 250 + 20)).toBe(0);
      expect(rms(change, 101 * 250, 110 * 250)).toBeGreaterThan(50);
      expect(spoiled.truth.spoiled).toHaveLength(1);
    },
  );

  it('flat holds a value and rail an end of the digitiser', () => {
    const inside = (signal: Float64Array) => new Set(signal.subarray(100 * 250, 130 * 250));
    expect(inside(spoil('flat', 0).signals[1]).size).toBe(1);
    expect([...inside(spoil('rail', 1).signals[1])]).toEqual([3276.7]);
    expect([...inside(spoil('rail', -1).signals[1])]).toEqual([-3276.7]);
  });
});

describe('its sources', () => {
  it('kept apart add up to the lead that is rounded', () => {
    const spec: SimulationSpec = {
      ...PLAIN_STUDY,
      leads: [PLAIN_LEAD, { ...PLAIN_LEAD, heartAxisDeg: 150, driftUv: -300 }],
      artefacts: [{ cause: 'move', fromS: 100, toS: 130, leads: [1], sizeUv: 300 }],
      digitiser: null,
    };
    const { signals, truth } = simulateStudy(spec);
    const apart = simulateSources(spec);
    expect(apart.truth).toEqual(truth);
    apart.leads.forEach((lead, k) => {
      for (let n = 0; n < signals[k].length; n += 1) {
        const sum = SOURCES.reduce((total, source) => total + lead[source][n], 0);
        if (Math.abs(sum - signals[k][n]) > 1e-9) throw new Error(`lead ${k}, sample ${n}`);
      }
      for (const source of SOURCES)
        expect(rms(lead[source]) > 0, source).toBe(!(k === 0 && /drift|artefacts/.test(source)));
    });
  });

  it('of the slow wave is a sawtooth where its harmonics are those of one: 6 and 9.5 dB down', () => {
    const slowWave: SlowWaveSpec = { ...SLOW, frequencyCpm: 3, harmonics: [1 / 2, 1 / 3] };
    const [lead] = simulateSources({ ...ONLY, rateHz: 25, slowWave }).leads;
    const [one, two, three] = [0.05, 0.1, 0.15].map((hz) => amplitudeAt(lead['slow wave'], hz, 25));
    expect(20 * Math.log10(two / one)).toBeCloseTo(-6.02, 1);
    expect(20 * Math.log10(three / one)).toBeCloseTo(-9.54, 1);
  });

  it('of the background fall about as 1/f from 0.005 to 0.2 Hz and have the size asked for', () => {
    const noise = { ...SILENCE, backgroundUv: 20 };
    const [lead] = simulateSources({ ...ONLY, durationS: 14_400, rateHz: 1, noise }).leads;
    expect(rms(lead.background)).toBeGreaterThan(16);
    expect(rms(lead.background)).toBeLessThan(24);
    const powerAbout = (hz: number) => {
      let sum = 0;
      for (let k = 0; k < 60; k += 1)
        sum += amplitudeAt(lead.background, hz * (0.7 + 0.01 * k), 1) ** 2;
      return sum;
    };
    const slope = Math.log(powerAbout(0.1) / powerAbout(0.01)) / Math.log(10);
    expect(slope).toBeGreaterThan(-1.35);
    expect(slope).toBeLessThan(-0.65);
  });
});
