import { SHAPE_LAG_S, type Shape } from './beat-shapes';
import {
  bestFit,
  type Fitted,
  noiseByHalfSecond,
  type Projected,
  withoutBeats,
} from './between-beats';
import { rmsAbout } from './qrs-bands';
import type { Candidate } from './shape-pass';
import { likeSideWave, type SideWave } from './side-waves';

/** Side waves of shapes with at least this share of the beats are looked for everywhere. */
const LEAST_CARRIER = 0.1;
const BEAT_LIKENESS = 0.9;
/** A shape seen less often than this part of the carrier's beats cannot be what follows each of them. */
const RIVAL_PART = 0.5;
/** Likeness from which a place counts as a beat when the noise between beats is measured. */
const PLAIN_LIKENESS = 0.85;
/** Independent values in a window of the shape band: twice its width in Hz times its length in s, less the slope of its edges. */
const WINDOW_FREEDOM = 8;

/** The part of a chunk that is looked at, in its own samples. */
interface View {
  readonly rateHz: number;
  readonly half: number;
  readonly from: number;
  readonly to: number;
}

/** The best fit near each place; of two that meet in one place the better. */
export function fittedPlaces(
  projected: Projected,
  places: readonly number[],
  reach: number,
): Fitted[] {
  const byKey = new Map<number, Fitted>();
  for (const place of places) {
    const fit = bestFit(projected, place, reach);
    byKey.set(fit.sample, fit);
  }
  const fitted = [...byKey.values()].sort((a, b) => a.sample - b.sample);
  return fitted.filter(
    (one, i) =>
      !fitted
        .slice(Math.max(0, i - 3), i + 4)
        .some(
          (other) =>
            other !== one &&
            Math.abs(other.sample - one.sample) <= reach / 2 &&
            (other.likeness > one.likeness ||
              (other.likeness === one.likeness && other.sample < one.sample)),
        ),
  );
}

/** Whether a place is a beat of a frequent shape as far as its shape says. */
function isPlain({ shapes }: Projected, { shape, likeness, size }: Fitted, learned: number) {
  return (
    likeness > PLAIN_LIKENESS &&
    size > 0.5 &&
    size < 2 &&
    shapes[shape].count > LEAST_CARRIER * learned
  );
}

/** Weighs a fit against the noise between the beats near it. */
export function weigher(
  projected: Projected,
  beats: readonly number[],
  fitted: readonly Fitted[],
  { rateHz, half, from, to }: View,
): (fit: Fitted) => Omit<Candidate, 'energyUv'> {
  const { shapes, fits } = projected;
  const reach = Math.round(SHAPE_LAG_S * rateHz);
  const learned = shapes.reduce((sum, { count }) => sum + count, 0);
  const plain = fitted.filter((fit) => isPlain(projected, fit, learned)).map((fit) => fit.sample);
  const rest = rmsAbout(
    withoutBeats(projected, apartFrom(beats, plain, 2 * reach), reach),
    2 * half + 1,
  );
  const noise = noiseByHalfSecond(rest, projected.band.length, rateHz, from, to, 0.5);
  const waves = usualWaves(shapes, learned, reach);
  const pWaves = waves.filter(({ kind }) => kind === 'P');
  const tWaves = waves.filter(({ kind }) => kind === 'T');
  return ({ sample, shape, likeness, size }) => {
    const moment = Math.min(
      noise.length - 1,
      Math.max(0, Math.floor((2 * (sample - from)) / rateHz)),
    );
    const noisePower = noise[moment] ** 2 * (2 * half + 1);
    const { norm, count } = shapes[shape];
    return {
      sample,
      shape,
      likeness,
      size,
      overNoise: fits[shape][sample] / (Math.sqrt(noisePower / WINDOW_FREEDOM) + 1e-12),
      bestLikeness: norm / Math.sqrt(norm ** 2 + noisePower),
      share: count / learned,
      likeP: likeSideWave(projected.band, sample, reach, pWaves),
      likeT: likeSideWave(projected.band, sample, reach, tWaves),
      rmsUv: projected.normAt(sample) / Math.sqrt(2 * half + 1),
    };
  };
}

/** Side waves of the frequent shapes; what is like a shape as frequent is a beat that always follows, as in a run. */
function usualWaves(shapes: readonly Shape[], learned: number, lag: number): SideWave[] {
  const isBeat = (wave: SideWave, carrier: Shape) =>
    shapes.some(
      ({ average, half, count }) =>
        count > RIVAL_PART * carrier.count &&
        likeSideWave(average, half, 2 * lag, [wave]) > BEAT_LIKENESS,
    );
  return shapes
    .filter(({ count }) => count > LEAST_CARRIER * learned)
    .flatMap((shape) => shape.waves.filter((wave) => !isBeat(wave, shape)));
}

/** Both lists together, of the second only what is farther than `apart` from all of the first; both ascending. */
function apartFrom(first: readonly number[], second: readonly number[], apart: number): number[] {
  let next = 0;
  const more = second.filter((at) => {
    while (next < first.length && first[next] < at - apart) next += 1;
    return next >= first.length || first[next] > at + apart;
  });
  return [...first, ...more];
}
