import { describe, expect, it } from 'vitest';
import { beatHeights } from '../../src/heart/beat-heights';
import { breathingFromLead, NO_BREATHING } from '../../src/heart/breathing';
import { breathingFromBeats } from '../../src/heart/breathing-from-beats';
import { rrSeries } from '../../src/heart/rr-series';
import { cos, sin } from '../../src/numeric/elementary';
import { quantile } from '../../src/numeric/statistics';
import { BEAT_CLASSES } from '../../src/recording/beat';
import { beatsAfter, RATE_HZ } from './beats';
import { randomOf } from './rhythms';

const random = randomOf(77);

/** A chest belt: breaths whose rate wanders by a tenth, drift and noise; amplitude 100. With the breaths drawn by then. */
function belt(perMinute: number, lengthS: number, rateHz: number, noise = 20) {
  let [phase, wander] = [0, 1];
  const breaths = new Float64Array(Math.round(lengthS * rateHz));
  const samples = breaths.map((_, i) => {
    const t = i / rateHz;
    wander += (-0.05 * (wander - 1) + 0.03 * random.gaussian() * Math.sqrt(rateHz)) / rateHz;
    phase += (2 * Math.PI * perMinute * wander) / 60 / rateHz;
    breaths[i] = phase / (2 * Math.PI);
    return 0.3 * t + 100 * sin(phase) + 25 * sin(2 * phase + 1) + noise * random.gaussian();
  });
  const trueRate = (centreS: number) =>
    breaths[Math.round((centreS + 20) * rateHz)] - breaths[Math.round((centreS - 20) * rateHz)];
  return { samples, perMinute: (centreS: number) => 1.5 * trueRate(centreS) };
}

const errors = (series: { perMinute: Float64Array }, perMinute: number) =>
  series.perMinute.map((one) => Math.abs(one - perMinute));
const told = (series: { perMinute: Float64Array }) =>
  series.perMinute.filter((one) => !Number.isNaN(one));

describe('breathing from a lead', () => {
  it.each([
    [6, 4],
    [12, 25],
    [15, 4],
    [18, 1],
    [24, 10],
    [35, 250],
  ])(
    '%i a minute at %i Hz is told within 1.5 a minute or 6 % in nearly every window',
    (rate, hz) => {
      const { samples, perMinute } = belt(rate, 600, hz);
      const series = breathingFromLead(samples, hz);
      expect(series.from).toBe('lead');
      expect(series.centresS[0]).toBe(30);
      expect(series.centresS.length).toBe(19);
      expect(told(series).length).toBeGreaterThanOrEqual(17);
      const off = series.perMinute.map((one, i) => Math.abs(one - perMinute(series.centresS[i])));
      expect(quantile(told({ perMinute: off }), 0.9)).toBeLessThan(Math.max(1.5, 0.06 * rate));
    },
  );

  it('is exact for a steady wave', () => {
    const wave = Float64Array.from({ length: 2400 }, (_, i) => cos(2 * Math.PI * 0.237 * (i / 4)));
    for (const one of breathingFromLead(wave, 4).perMinute) expect(one).toBeCloseTo(14.22, 1);
  });

  it('is not told from noise or a flat line', () => {
    const noise = Float64Array.from({ length: 4 * 36000 }, () => random.gaussian());
    const series = breathingFromLead(noise, 4);
    expect(told(series).length / series.perMinute.length).toBeLessThan(0.02);
    expect(told(breathingFromLead(new Float64Array(2400), 4))).toHaveLength(0);
  });

  it('is not told where over a quarter of the window is missing, and is where less is', () => {
    const { samples: x, perMinute } = belt(15, 300, 4);
    x.fill(Number.NaN, 0, 80);
    x.fill(Number.NaN, 800, 840);
    const series = breathingFromLead(x, 4);
    expect(series.perMinute[0]).toBeNaN();
    expect(Math.abs(series.perMinute[5] - perMinute(180))).toBeLessThan(2);
  });

  it('has no window in under a minute, and refuses a rate under 1 Hz', () => {
    expect(breathingFromLead(belt(15, 59, 4).samples, 4).centresS).toHaveLength(0);
    expect(() => breathingFromLead(new Float64Array(100), 0.5)).toThrow('1 Hz or more');
  });
});

/** Beats at a mean rate whose intervals and heights swing with breathing, on a slower 0.1 Hz wave of the intervals. */
function breathedBeats(bpm: number, perMinute: number, inRr: number, inHeight: number) {
  const rr: number[] = [];
  const heights: number[] = [];
  let timeS = 0;
  const hz = perMinute / 60;
  while (timeS < 600) {
    const slow = 0.02 * sin(2 * Math.PI * 0.1 * timeS);
    const swing = inRr * sin(2 * Math.PI * hz * timeS);
    const one = (60000 / bpm) * (1 + slow + swing + 0.01 * random.gaussian());
    heights.push(
      200 * (1 + inHeight * cos(2 * Math.PI * hz * timeS + 1) + 0.04 * random.gaussian()),
    );
    rr.push(one);
    timeS += one / 1000;
  }
  heights.push(200);
  return { rr: Float64Array.from(rr), heights: Float64Array.from(heights) };
}

describe('breathing from the beats', () => {
  const derive = (bpm: number, perMinute: number, inRr: number, inHeight: number, letters = '') => {
    const { rr: intervals, heights } = breathedBeats(bpm, perMinute, inRr, inHeight);
    const beats = beatsAfter(intervals, 0, letters);
    const rr = rrSeries(beats, RATE_HZ, []);
    return breathingFromBeats({
      rr,
      beats,
      rateHz: RATE_HZ,
      heightsUv: heights,
      durationS: 600,
    });
  };

  it.each([
    [70, 15, 0.04, 0.15],
    [60, 10, 0.04, 0.15],
    [75, 22, 0.03, 0.15],
    [85, 15, 0, 0.2],
    [65, 14, 0.06, 0],
  ])('at %i beats, %i breaths a minute, swing %f in RR and %f in height', (...args) => {
    const series = derive(...args);
    expect(series.from).toBe('derived');
    expect(told(series).length).toBeGreaterThanOrEqual(14);
    expect(quantile(errors({ perMinute: told(series) }, args[1]), 0.9)).toBeLessThan(1);
  });

  it('never tells a rate above half the heart rate', () => {
    const series = derive(50, 32, 0.05, 0.2);
    for (const one of told(series)) expect(one).toBeLessThan(25);
  });

  it('is not told where a quarter of the time carries no NN', () => {
    const letters = Array.from({ length: 700 }, (_, i) => (i % 6 === 0 ? 'V' : 'N')).join('');
    expect(told(derive(70, 15, 0.04, 0.15, letters))).toHaveLength(0);
  });

  it('is none without beats', () => {
    const beats = beatsAfter([]);
    const rr = rrSeries(beats, RATE_HZ, []);
    const heightsUv = new Float64Array(1);
    expect(breathingFromBeats({ rr, beats, rateHz: RATE_HZ, heightsUv, durationS: 600 })).toBe(
      NO_BREATHING,
    );
  });

  it('is not told from the 0.1 Hz wave of the intervals, but from slow breaths that move R height too', () => {
    expect(told(derive(66, 15, 0.005, 0)).filter((one) => one < 9)).toHaveLength(0);
    const slow = told(derive(66, 6, 0.05, 0.15));
    expect(slow.length).toBeGreaterThanOrEqual(14);
    expect(quantile(errors({ perMinute: slow }, 6), 0.9)).toBeLessThan(1);
  });
});

describe('beat heights', () => {
  it('are the same for either polarity, and NaN at the edge or beside missing samples', () => {
    const heartbeat = new Float32Array(2500);
    const beats = beatsAfter([1000, 1000, 1000, 1000, 1000, 1000, 1000, 1000], 1);
    for (let k = 1; k < 10; k += 1) {
      heartbeat[k * 250] = 10 * k;
      heartbeat[k * 250 + 8] = -5;
    }
    heartbeat[4 * 250 + 3] = Number.NaN;
    const heights = beatHeights(heartbeat, 250, beats, 64);
    expect([...heights]).toEqual([15, 25, 35, Number.NaN, 55, 65, 75, 85, 95]);
    const turned = beatHeights(
      heartbeat.map((value) => -value),
      250,
      beats,
      64,
    );
    expect(turned).toEqual(heights);
    expect(beatHeights(new Float32Array(2500), 250, beatsAfter([9990]), 64)).toEqual(
      Float64Array.of(Number.NaN, Number.NaN),
    );
    expect(BEAT_CLASSES[0]).toBe('N');
  });

  it('count ticks of the recording where the heartbeat runs at a quarter of its rate', () => {
    const heartbeat = new Float32Array(1000);
    heartbeat[500] = 42;
    const ticks = Float64Array.of(500 * 4 * 64 + 70);
    const beats = { ticks, classes: new Uint8Array(1), origins: new Uint8Array(1) };
    expect([...beatHeights(heartbeat, 250, beats, 4 * 64)]).toEqual([42]);
  });
});
