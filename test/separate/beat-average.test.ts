import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { createRandom } from '../../src/numeric/random';
import { beatsOf } from '../../src/recording/beat';
import { averageBeats } from '../../src/separate/average-beats';
import { placeBeats } from '../../src/separate/beat-extents';
import { createSlowSampler } from '../../src/separate/slow-rate';
import { SOURCES, simulateSources } from '../../src/simulate/simulate-study';
import { PLAIN_LEAD, PLAIN_STUDY, type SimulationSpec } from '../../src/simulate/spec';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';
import { beatsAt, drawnWithout, driven, opened, partOf, RATE_HZ, SETTINGS } from './averaged';

const at4Hz = (x: Float64Array): Float64Array => {
  const sampler = createSlowSampler(RATE_HZ);
  sampler.push(x);
  return sampler.finish();
};

/** Mean and standard deviation, a minute at both ends left out. */
function spread(x: Float64Array) {
  const inner = x.subarray(240, x.length - 240);
  const mean = inner.reduce((sum, v) => sum + v, 0) / inner.length;
  return { mean, sd: Math.sqrt(inner.reduce((sum, v) => sum + (v - mean) ** 2, 0) / inner.length) };
}

/** Signal over error in dB after the best scale, and that scale, a minute at both ends left out. */
function against(truth: Float64Array, drawn: Float64Array) {
  const [s, d] = [truth, drawn].map((x) => x.subarray(240, x.length - 240));
  const [ms, md] = [spread(truth).mean, spread(drawn).mean];
  let [sd, dd, ss] = [0, 0, 0];
  for (let i = 0; i < s.length; i += 1) {
    sd += (s[i] - ms) * (d[i] - md);
    dd += (d[i] - md) ** 2;
    ss += (s[i] - ms) ** 2;
  }
  return { db: 10 * Math.log10(ss / (ss - (sd * sd) / dd)), gain: sd / ss };
}

/** Half an hour of a 30 uV slow wave under T waves of 800 uV, its sources and its true beats. */
function weakWave(heart: Partial<NonNullable<SimulationSpec['heart']>>, seed: number, cpm = 3) {
  const { slowWave, heart: plain } = PLAIN_STUDY;
  if (!slowWave || !plain) throw new Error('the plain study has both');
  const { leads, truth } = simulateSources({
    ...PLAIN_STUDY,
    seed,
    durationS: 1800,
    leads: [{ ...PLAIN_LEAD, heartUv: 300 }],
    slowWave: { ...slowWave, frequencyCpm: cpm, amplitudeUv: 30 },
    heart: { ...plain, tWave: 800 / 300, ...heart },
    noise: { ...PLAIN_STUDY.noise, backgroundUv: 5 },
  });
  const [sources] = leads;
  const lead = new Float64Array(sources.heartbeat.length);
  for (const source of SOURCES)
    for (let i = 0; i < lead.length; i += 1) lead[i] += sources[source][i];
  const beats = beatsAt(
    truth.beats.map(({ timeS }) => timeS),
    (i) => ({ beatClass: truth.beats[i].beatClass }),
  );
  return { lead, beats, wave: at4Hz(sources['slow wave']), heartbeat: at4Hz(sources.heartbeat) };
}

describe('a slow wave of 30 uV under T waves of 800 uV', () => {
  test.each([1, 2, 3])(
    'stands out by at least a decibel more than by `band` (study %d)',
    (seed) => {
      const { lead, beats, wave, heartbeat } = weakWave({}, seed);
      const slow = opened(lead);
      const band = against(wave, drawnWithout(slow, null).slowWave);
      const averaged = against(wave, drawnWithout(slow, partOf(slow, beats)).slowWave);
      const ideal = against(wave, drawnWithout(slow, { uv: heartbeat, beats: 1 }).slowWave);
      expect(averaged.db).toBeGreaterThan(band.db + 1);
      expect(averaged.db).toBeGreaterThan(ideal.db - 0.5);
      expect(Math.abs(averaged.gain - 1)).toBeLessThan(0.01);
    },
  );

  test('and early beats, which have averages of their own, by at least eight decibels', () => {
    const { lead, beats, wave, heartbeat } = weakWave(
      { ventricularPerHour: 60, supraventricularPerHour: 60 },
      1,
    );
    const slow = opened(lead);
    const band = against(wave, drawnWithout(slow, null).slowWave);
    const part = partOf(slow, beats);
    expect(against(wave, drawnWithout(slow, part).slowWave).db).toBeGreaterThan(band.db + 8);
    expect(part.beats).toBe(beats.ticks.length);
    expect(spread(part.uv.map((uv, i) => heartbeat[i] - uv)).sd).toBeLessThan(
      0.06 * spread(heartbeat).sd,
    );
    const allN = { ...beats, classes: new Uint8Array(beats.classes.length) };
    const oneAverage = against(wave, drawnWithout(slow, partOf(slow, allN)).slowWave);
    expect(oneAverage.db).toBeLessThan(band.db + 4);
  });

  test.each([1.5, 3, 5.5])('is not eaten: what is taken out holds none of it (%d cpm)', (cpm) => {
    const { lead, beats, wave } = weakWave({}, 4, cpm);
    const bare = opened(lead.map((uv, i) => uv - waveAt(wave, i)));
    const part = partOf(opened(lead), beats);
    const without = partOf(bare, beats);
    const taken = part.uv.map((uv, i) => uv - without.uv[i]);
    expect(Math.abs(against(wave, taken).gain)).toBeLessThan(0.01);
  });

  test('keeps its dominant frequency within 0.01 cpm, and epochs that they had, by what is left', () => {
    const { lead, beats, heartbeat } = weakWave({ ventricularPerHour: 20 }, 5);
    const slow = opened(lead);
    const dfOf = (part: { uv: Float64Array; beats: number }) =>
      slowWaveRhythm({
        slow: drawnWithout(slow, part),
        spoiled: [],
        phases: [{ name: 'whole', fromS: 0, toS: 1800 }],
        settings: SETTINGS,
        breathing: null,
      }).rhythm.epochs.map(({ dfCpm, rhythm }) => ({ dfCpm, rhythm }));
    const ours = dfOf(partOf(slow, beats));
    const truth = dfOf({ uv: heartbeat, beats: 1 });
    expect(ours.map(({ rhythm }) => rhythm)).toEqual(truth.map(({ rhythm }) => rhythm));
    ours.forEach(({ dfCpm }, i) => {
      expect(Math.abs((dfCpm ?? 0) - (truth[i].dfCpm ?? 0))).toBeLessThan(0.01);
    });
  });
});

/** A wave at 4 Hz at a sample of the lead, by the straight line between its points. */
function waveAt(wave: Float64Array, i: number): number {
  const place = Math.min(wave.length - 1.001, (4 * i) / RATE_HZ);
  const low = Math.floor(place);
  return wave[low] + (wave[low + 1] - wave[low]) * (place - low);
}

/** Times of beats some 0.85 s apart, between two times. */
function timesBetween(fromS: number, toS: number, seed = 1): number[] {
  const random = createRandom(seed);
  const times: number[] = [];
  for (let t = fromS; t < toS; t += 0.82 + 0.06 * random.uniform()) times.push(t);
  return times;
}

/** A lead of T waves alone, 800 uV and 45 ms wide, 0.28 s after each of some times, on what else is given. */
function tWaves(
  seconds: number,
  timesS: readonly number[],
  elseUv: (t: number) => number = () => 0,
) {
  const lead = Float64Array.from({ length: seconds * RATE_HZ }, (_, i) => elseUv(i / RATE_HZ));
  for (const timeS of timesS) {
    const from = Math.max(0, Math.floor((timeS + 0.05) * RATE_HZ));
    const to = Math.min(lead.length, Math.ceil((timeS + 0.5) * RATE_HZ));
    for (let i = from; i < to; i += 1)
      lead[i] += 800 * Math.exp(-0.5 * ((i / RATE_HZ - timeS - 0.28) / 0.045) ** 2);
  }
  return lead;
}

const wave3 = (t: number) => 30 * Math.sin((2 * Math.PI * 3 * t) / 60);

describe('what the heartbeats leave in a lead at 4 Hz', () => {
  const times = timesBetween(0.4, 299);
  const lead = tWaves(300, times, wave3);
  const slow = opened(lead);
  const beats = beatsAt(times);
  const part = partOf(slow, beats);

  test('is what was put in, within 1 % of its size and to its mean', () => {
    const truth = at4Hz(tWaves(300, times));
    const left = spread(part.uv.map((uv, i) => uv - truth[i]));
    expect(spread(truth).mean).toBeGreaterThan(80);
    expect(Math.abs(left.mean)).toBeLessThan(0.01 * spread(truth).mean);
    expect(left.sd).toBeLessThan(0.01 * spread(truth).mean);
  });

  test('is nothing without beats: the wave is the one of route `band`, to the last digit', () => {
    const nothing = partOf(slow, beatsAt([]));
    expect(nothing.uv.every((uv) => uv === 0)).toBe(true);
    expect(drawnWithout(slow, nothing).slowWave).toEqual(drawnWithout(slow, null).slowWave);
    expect(drawnWithout(slow, nothing).notes.join()).toContain('there are no beats');
  });

  test('turns about with the lead', () => {
    const turned = partOf(opened(lead.map((uv) => -uv)), beats);
    turned.uv.forEach((uv, i) => {
      expect(Math.abs(uv + part.uv[i])).toBeLessThan(1e-9);
    });
  });

  test('moves with lead and beats, and takes no level of the lead', () => {
    const late = new Float64Array(lead.length + 2 * RATE_HZ).fill(5000);
    for (let i = 0; i < lead.length; i += 1) late[i + 2 * RATE_HZ] = 5000 + lead[i];
    const moved = partOf(opened(late), beatsAt(times.map((timeS) => timeS + 2)));
    for (let i = 40; i < part.uv.length - 40; i += 1)
      expect(Math.abs(moved.uv[i + 8] - part.uv[i])).toBeLessThan(0.05);
  });

  test('is the same to the last digit a minute and a half from a beat that is taken out', () => {
    const less = partOf(slow, beatsAt(times.filter((_, i) => i !== 170)));
    const from = Math.round(4 * (times[170] - 90));
    const to = Math.round(4 * (times[170] + 90));
    expect(less.uv.subarray(0, from)).toEqual(part.uv.subarray(0, from));
    expect(less.uv.subarray(to)).toEqual(part.uv.subarray(to));
    expect(less.uv.subarray(from, to)).not.toEqual(part.uv.subarray(from, to));
  });

  test('forgets a glitch of any size to the last digit once no average holds it', () => {
    const hit = lead.map((uv, i) => (i === Math.round(100.3 * RATE_HZ) ? 4e12 : uv));
    const after = partOf(opened(hit), beats);
    expect(Math.max(...after.uv.subarray(400, 420))).toBeGreaterThan(1e8);
    expect(after.uv.subarray(800)).toEqual(part.uv.subarray(800));
  });

  test('is told by beats with room: those with an early beat on their T wave enter no average', () => {
    const early = times.filter((_, i) => i % 4 === 1).map((t) => t + 0.42);
    const spoilt = times.filter((_, i) => i % 4 !== 2);
    const all = [...spoilt, ...early].sort((a, b) => a - b);
    const wide = (t: number) => {
      const near = early.reduce((best, e) => (Math.abs(t - e) < Math.abs(t - best) ? e : best));
      return 1500 * Math.exp(-0.5 * ((t - near) / 0.03) ** 2);
    };
    const truth = at4Hz(tWaves(300, all, wide));
    const isEarly = (i: number) => (early.includes(all[i]) ? ({ beatClass: 'V' } as const) : {});
    const found = partOf(
      opened(tWaves(300, all, (t) => wide(t) + wave3(t))),
      beatsAt(all, isEarly),
    );
    const left = spread(found.uv.map((uv, i) => uv - truth[i]));
    expect(left.sd).toBeLessThan(7);
    expect(spread(truth).sd).toBeGreaterThan(40);
  });

  test('goes on over stretches in which no beats were found, without a step', () => {
    const found = times.filter((t) => t > 40 && (t < 120 || t > 180) && t < 260);
    const holed = partOf(slow, beatsAt(found));
    const { mean } = spread(part.uv);
    holed.uv.subarray(4, -4).forEach((uv) => {
      expect(Math.abs(uv - mean)).toBeLessThan(0.25 * mean);
    });
  });

  test('keeps the pause of a heart that waits three seconds', () => {
    const waits = times.filter((t) => t < 150 || t > 152.5);
    const paused = partOf(opened(tWaves(300, waits, wave3)), beatsAt(waits));
    const truth = at4Hz(tWaves(300, waits));
    expect(Math.min(...truth.subarray(590, 620))).toBeLessThan(30);
    for (let i = 560; i < 650; i += 1) expect(Math.abs(paused.uv[i] - truth[i])).toBeLessThan(3);
  });

  test('is not led astray by what is spoiled: a burst over twenty beats leaves the others as they are', () => {
    const loud = lead.map((uv, i) =>
      i > 100 * RATE_HZ && i < 117 * RATE_HZ ? uv + 900 * Math.sin(i / 20) : uv,
    );
    const kept = new Uint8Array(slow.recorded.length).fill(1).fill(0, 396, 472);
    const spared = partOf(opened(loud), beats, SETTINGS.beatAverage, kept);
    const misled = partOf(opened(loud), beats);
    const miss = (one: { uv: Float64Array }) =>
      Math.max(...one.uv.subarray(490, 560).map((uv, i) => Math.abs(uv - part.uv[490 + i])));
    expect(miss(spared)).toBeLessThan(0.5);
    expect(miss(misled)).toBeGreaterThan(2);
  });

  test('leaves gaps as they are, and beats beside them count no missing sample', () => {
    const holed = lead.map((uv, i) => (i > 100 * RATE_HZ && i < 103 * RATE_HZ ? Number.NaN : uv));
    const there = partOf(opened(holed), beats);
    expect(there.uv.every(Number.isFinite)).toBe(true);
    const drawn = drawnWithout(opened(holed), there);
    const missing = (x: Float64Array) => Array.from(x, Number.isNaN);
    expect(missing(drawn.forSpectra)).toEqual(missing(drawn.recorded));
    for (let i = 430; i < 1000; i += 1)
      expect(Math.abs(there.uv[i] - part.uv[i])).toBeLessThan(0.5);
  });

  test('leaves out what is called unusable, unless it is like a normal beat', () => {
    const asQ = (i: number) => (i % 10 === 4 ? ({ beatClass: 'Q' } as const) : {});
    const known = partOf(slow, beatsAt(times, asQ));
    expect(known.beats).toBe(times.length);
    const more = [...times, 100.2].sort((a, b) => a - b);
    const isMore = (i: number) => (more[i] === 100.2 ? ({ beatClass: 'Q' } as const) : {});
    const nearly = partOf(slow, beatsAt(more, isMore));
    expect(nearly.beats).toBe(times.length);
  });
});

test('a lead of 10 samples a second has no heartbeat taken out, and says so', () => {
  const slow = opened(
    Float64Array.from({ length: 3000 }, (_, i) => wave3(i / 10)),
    10,
  );
  expect(slow.wide).toBeNull();
  const drawn = drawnWithout(slow, { uv: new Float64Array(1200).fill(1), beats: 3 });
  expect(drawn.slowWave).toEqual(slow.slowWave);
  expect(drawn.notes.join()).toContain('too few samples a second');
});

describe('beat by beat in numpy and scipy', () => {
  const reference: {
    readonly rate_hz: number;
    readonly count: number;
    readonly ticks: readonly number[];
    readonly lead_uv: readonly number[];
    readonly sum_uv: readonly number[];
  } = JSON.parse(
    readFileSync(new URL('../reference/separate-average.json', import.meta.url), 'utf8'),
  );
  const settings = { beforeMs: 300, afterMs: 500, beats: reference.count };

  test('the sum of average beats is the same, to single precision', () => {
    const beats = beatsOf(
      reference.ticks.map((tick) => ({ tick, beatClass: 'N', origin: 'detected' })),
    );
    const { rate_hz: rateHz } = reference;
    const placed = driven(placeBeats(beats, rateHz, rateHz, settings));
    const usable = new Uint8Array(beats.ticks.length).fill(1);
    const lead = Float64Array.from(reference.lead_uv);
    const { uv } = driven(averageBeats(lead, placed, usable, reference.count));
    const size = Math.max(...reference.sum_uv);
    expect(size).toBeGreaterThan(300);
    reference.sum_uv.forEach((theirs, i) => {
      expect(Math.abs(uv[i] - theirs)).toBeLessThan(1e-6 * size);
    });
  });
});
