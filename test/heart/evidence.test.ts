import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { placeEvidence, sizeEvidence } from '../../src/heart/evidence';
import type { Candidate } from '../../src/heart/shape-pass';

/** Made by test/reference/heart-evidence.py with numpy, from places in invented surface ECGs. */
const reference: {
  readonly weights: Readonly<Record<string, number>>;
  readonly standardErrors: Readonly<Record<string, number>>;
} = JSON.parse(readFileSync(new URL('../reference/heart-evidence.json', import.meta.url), 'utf8'));

const PLACE: Candidate = {
  sample: 0,
  shape: 0,
  size: 1,
  likeness: 0.8,
  overNoise: 5,
  bestLikeness: 1,
  energyUv: 20,
  share: 0.5,
  likeP: 0,
  likeT: 0,
  rmsUv: 5,
};
const BEAT_UV = 40;
const evidence = (change: Partial<Candidate>) => placeEvidence({ ...PLACE, ...change }, BEAT_UV, 2);
const sizeOf = (size: number) => sizeEvidence({ ...PLACE, size }, () => 1);
const unlike = (likeness: number) => 0.5 * Math.log(1 - likeness ** 2);

/** What each quantity changes in the evidence, by the unit it has in the regression. */
const SLOPES: readonly (readonly [name: string, slope: number])[] = [
  [
    'unlike',
    (evidence({ likeness: 0.9 }) - evidence({ likeness: 0.7 })) / (unlike(0.9) - unlike(0.7)),
  ],
  ['small', (sizeOf(0.8) - sizeOf(0.4)) / Math.log(2)],
  ['large', (sizeOf(2) - sizeOf(1)) / Math.log(2)],
  ['share', (evidence({ share: 0.8 }) - evidence({ share: 0.4 })) / Math.log(2)],
  ['likeWave', (evidence({ likeP: 0.95 }) - evidence({ likeP: 0.85 })) / 0.1],
  ['quick', (evidence({ rmsUv: 10 }) - evidence({ rmsUv: 20 })) / Math.log(2)],
  ['overNoise', (evidence({ overNoise: 8 }) - evidence({ overNoise: 4 })) / Math.log(2)],
  [
    'energy',
    (evidence({ energyUv: 30, rmsUv: 7.5 }) - evidence({ energyUv: 20, rmsUv: 5 })) / Math.log(1.5),
  ],
];

describe('the weight of what is known of a place', () => {
  it.each(SLOPES)(
    'of %s is that of a logistic regression, within three standard errors',
    (name, slope) => {
      const off = Math.abs(slope - reference.weights[name]);
      expect(off).toBeLessThan(3 * reference.standardErrors[name]);
    },
  );

  it('is known well enough to tell a right sign from a wrong one, but for the size of large places', () => {
    for (const [name] of SLOPES)
      if (name !== 'large')
        expect(Math.abs(reference.weights[name]), name).toBeGreaterThan(
          2 * reference.standardErrors[name],
        );
  });
});
