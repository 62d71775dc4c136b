import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { akaikeOrder, secondOpinions } from '../../src/stomach/second-opinions';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { leadOf, noise, RATE_HZ, wave } from './leads';

const BAND = { lowCpm: 1, highCpm: 9 };

/** Second opinions on the first four minutes of a lead. */
function ask(
  signal: Float64Array,
  kept = new Uint8Array(signal.length).fill(1),
  powerResponse: ((hz: number) => number) | null = null,
  first = 0,
) {
  const lengthS = 240;
  const windows = windowSpectra({ signal, kept, rateHz: RATE_HZ, lengthS, powerResponse });
  const opinion = secondOpinions({ rateHz: RATE_HZ, lengthS, band: BAND, powerResponse });
  return opinion(windows.prepare(first));
}

const near = (value: number | null, cpm: number) => Math.abs((value ?? Number.NaN) - cpm);

describe('an hour with a wandering wave, by scipy and numpy', () => {
  const reference: {
    readonly x: readonly number[];
    readonly length: number;
    readonly step: number;
    readonly epochs: readonly {
      readonly order: number;
      readonly burg_cpm: number;
      readonly multitaper_cpm: number;
      readonly true_cpm: number;
    }[];
  } = JSON.parse(
    readFileSync(new URL('../reference/stomach-opinions.json', import.meta.url), 'utf8'),
  );
  const signal = Float64Array.from(reference.x);
  const ours = reference.epochs.map((_, i) => ask(signal, undefined, null, i * reference.step));

  test('has the same order and the same frequencies in every epoch', () => {
    expect(reference.epochs.length).toBe(57);
    reference.epochs.forEach((theirs, i) => {
      expect(ours[i].burgOrder).toBe(theirs.order);
      expect(near(ours[i].burgCpm, theirs.burg_cpm)).toBeLessThan(1e-4);
      expect(near(ours[i].multitaperCpm, theirs.multitaper_cpm)).toBeLessThan(1e-5);
    });
  });

  test('has the wave’s own frequency while it is strong', () => {
    reference.epochs.slice(0, 26).forEach((theirs, i) => {
      expect(near(ours[i].burgCpm, theirs.true_cpm)).toBeLessThan(0.1);
      expect(near(ours[i].multitaperCpm, theirs.true_cpm)).toBeLessThan(0.05);
    });
  });
});

describe('second opinions on one window', () => {
  test.each([1.3, 3, 5.5, 8.2])('find a wave of %d cpm on 1/f noise', (cpm) => {
    const background = noise(960, 1, 15, 3);
    const { burgCpm, multitaperCpm } = ask(
      leadOf(4, (t) => wave(80, cpm, t, 1)).map((uv, i) => uv + background[i]),
    );
    expect(near(burgCpm, cpm)).toBeLessThan(0.05);
    expect(near(multitaperCpm, cpm)).toBeLessThan(0.05);
  });

  test('find nothing where nothing is', () => {
    expect(ask(new Float64Array(960))).toMatchObject({ burgCpm: null, multitaperCpm: null });
  });

  test('find the taller of two waves', () => {
    const background = noise(960, 0, 5, 8);
    const two = leadOf(4, (t) => wave(40, 2.5, t) + wave(90, 6, t, 2)).map(
      (uv, i) => uv + background[i],
    );
    expect(near(ask(two).burgCpm, 6)).toBeLessThan(0.05);
    expect(near(ask(two).multitaperCpm, 6)).toBeLessThan(0.05);
  });

  test('find the stronger of two waves though it wanders and the weaker does not', () => {
    const background = noise(960, 0, 5, 8);
    const wanders = (t: number) =>
      100 * Math.cos((2 * Math.PI * 2.5 * t) / 60 + 3.5 * Math.sin((2 * Math.PI * t) / 110));
    const two = leadOf(4, (t) => wanders(t) + wave(40, 6, t)).map((uv, i) => uv + background[i]);
    expect(near(ask(two).burgCpm, 2.5)).toBeLessThan(2);
  });

  test('see past a hole in a drift, across which a line is laid', () => {
    const kept = new Uint8Array(960).fill(1).fill(0, 250, 330);
    const background = noise(960, 1, 3, 2);
    const drifting = (t: number) => wave(20, 3, t) + 300 * Math.sin((2 * Math.PI * t) / 240);
    const signal = leadOf(4, drifting).map((uv, i) => uv + background[i]);
    expect(near(ask(signal, kept).burgCpm, 3)).toBeLessThan(0.25);
    expect(near(ask(signal, kept).multitaperCpm, 3)).toBeLessThan(0.25);
  });

  test('see past a hole in which something else was recorded', () => {
    const kept = new Uint8Array(960).fill(1).fill(0, 400, 460);
    const holed = leadOf(4, (t) => wave(80, 3, t)).map((uv, i) => (kept[i] === 1 ? uv : 9000));
    expect(near(ask(holed, kept).burgCpm, 3)).toBeLessThan(0.1);
    expect(near(ask(holed, kept).multitaperCpm, 3)).toBeLessThan(0.1);
  });

  test('divide out what a derivative did to the lead', () => {
    const background = noise(960, 0, 5, 9);
    const tilted = leadOf(4, (t) => wave(80, 2, t) + wave(50 * 3, 6, t)).map(
      (uv, i) => uv + background[i],
    );
    const squared = (hz: number) => (hz / (2 / 60)) ** 2;
    expect(near(ask(tilted).burgCpm, 6)).toBeLessThan(0.05);
    const { burgCpm, multitaperCpm } = ask(tilted, undefined, squared);
    expect(near(burgCpm, 2)).toBeLessThan(0.1);
    expect(near(multitaperCpm, 2)).toBeLessThan(0.15);
  });
});

test('Akaike’s criterion takes the order after which nothing is gained', () => {
  const reflections = Float64Array.of(-0.9, 0.6, 0.01, 0.02, 0.01);
  expect(akaikeOrder(reflections, 480)).toBe(2);
  expect(akaikeOrder(Float64Array.of(-0.9, 0.6, 0.01, 0.5), 480)).toBe(4);
});
