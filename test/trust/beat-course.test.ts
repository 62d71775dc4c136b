import { describe, expect, it } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { beatCourse, beatPulses } from '../../src/trust/beat-course';
import { sine } from '../numeric/signals';

const GRID = { firstS: 100, rateHz: 4, length: 40 * 240 };
const AMPLITUDE = 30;

/** Beats every 0.9 s over the grid, and what a wave of a rate is at each. */
const times = Float64Array.from({ length: 2700 }, (_, k) => 95 + 0.9 * k);
const courseOf = (cpm: number, level = 0) =>
  atOnce(
    beatCourse(
      times,
      times.map((time) => level + AMPLITUDE * Math.sin((2 * Math.PI * cpm * time) / 60)),
      GRID,
    ),
  );
const heightOf = (x: Float64Array) => {
  const inside = x.subarray(1000, 8600);
  return Math.sqrt((2 * inside.reduce((sum, value) => sum + value * value, 0)) / inside.length);
};

describe('the course of something told beat by beat', () => {
  it('keeps a wave of the stomach’s rate at its time, across the pieces it is worked on in', () => {
    const course = courseOf(3, 900);
    const wave = Float64Array.from(
      { length: GRID.length },
      (_, i) => AMPLITUDE * Math.sin((2 * Math.PI * 3 * (100 + i / 4)) / 60),
    );
    for (let i = 1000; i < 8600; i += 1)
      expect(Math.abs(course[i] - wave[i])).toBeLessThan(0.02 * AMPLITUDE);
  });

  it('loses what is slower, as a Gaussian mean of 30 s takes it', () => {
    for (const cpm of [0.1, 0.3, 0.6]) {
      const left = 1 - Math.exp(-2 * (Math.PI * 30 * (cpm / 60)) ** 2);
      expect(heightOf(courseOf(cpm, 900)) / AMPLITUDE).toBeCloseTo(left, 2);
    }
  });

  it('has holes where beats are missing for over 3 s', () => {
    const there = times.filter((time) => time < 500 || time > 504);
    const course = atOnce(
      beatCourse(
        there,
        there.map(() => 900),
        GRID,
      ),
    );
    expect(Number.isNaN(course[(502 - 100) * 4])).toBe(true);
    expect(course[(508 - 100) * 4]).toBeCloseTo(0, 9);
  });
});

describe('what beats put into a lead', () => {
  it('is their area times their rate on average, whatever their size shares', () => {
    const sizes = times.map((_, k) => (k % 2 === 0 ? 0.8 : 1.2));
    const pulses = beatPulses(times, sizes, 9, GRID);
    const mean = pulses.subarray(0, 9000).reduce((sum, value) => sum + value, 0) / 9000;
    expect(mean).toBeCloseTo(10, 1);
  });

  it('folds nothing to the stomach’s rates from multiples of the sampling rate', () => {
    /** The fourth harmonic of 60.6 a minute lies 2.4 cpm above 4 Hz. */
    const regular = Float64Array.from({ length: 2424 }, (_, k) => 100 + (60 / 60.6) * k);
    const pulses = beatPulses(
      regular,
      regular.map(() => 1),
      9,
      GRID,
    );
    const [cosine, sines] = [sine(9600, 4, 0.04, 1, Math.PI / 2), sine(9600, 4, 0.04)];
    const along = pulses.reduce((sum, value, i) => sum + value * cosine[i], 0);
    const across = pulses.reduce((sum, value, i) => sum + value * sines[i], 0);
    expect((2 * Math.hypot(along, across)) / 9600).toBeLessThan(0.01);
  });
});
