import { describe, expect, it } from 'vitest';
import type { ShapeAverage } from '../../src/heart/beat-average';
import { unsurePlaces } from '../../src/heart/unsure-places';

const place = (sample: number, shape = 0) => ({
  sample,
  shape,
  score: 0,
  energyUv: 0,
  likeP: 0,
  likeT: 0,
});

describe('the places a detector was unsure of', () => {
  const average = { shape: 0, fiducial: 57.5, middle: 50 } as ShapeAverage;
  const places = [place(100), place(300), place(500), place(700, 3)];
  const decided = {
    timesS: Float64Array.of(0.4, 1.2, 2, 2.8),
    wrong: Float64Array.of(0.2, 0.001, 0.4, 0.3),
  };

  it('are told in ticks: a beat by its own time, a place not taken as a beat of its shape would be', () => {
    const found = { beats: [places[0], places[1]], times: [109.25, 308] };
    const unsure = unsurePlaces({ places, decided }, found, [average], 64);
    expect([...unsure.ticks]).toEqual([64 * 109.25, 64 * 507.5, 64 * 700]);
    expect([...unsure.wrong]).toEqual([0.2, 0.4, 0.3]);
    expect([...unsure.taken]).toEqual([1, 0, 0]);
  });
});
