import { type Figures, numberOf } from '../../../src/recording/figure';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import { stomachFigures } from '../../../src/stomach/figures';
import type { EpochAnalysis } from '../../../src/stomach/slow-wave-rhythm';
import { rhythmOfLead } from '../../stomach/leads';
import { intervals, type Person, type State, stomachLead } from './person';
import { heartStudied } from './studied';

/** What a figure would be in the end, by key. */
export type Truth = ReadonlyMap<string, number>;

const PIECE_MIN = 360;
const HALF_HOUR_MIN = 30;
const HALF_HOURS = 200;

/** The stomach's figures of a person who rests for so many pieces of six hours. */
export function stomachTruth(person: Person, state: State, pieces: number, seed: number): Truth {
  const epochs: EpochAnalysis['rhythm']['epochs'][number][] = [];
  const epochSpectra: (Float64Array | null)[] = [];
  let binCpm = 0;
  for (let piece = 0; piece < pieces; piece += 1) {
    const found = rhythmOfLead(stomachLead(person, state, PIECE_MIN, seed + piece));
    const shiftS = piece * PIECE_MIN * 60;
    for (const epoch of found.rhythm.epochs)
      epochs.push({ ...epoch, fromS: epoch.fromS + shiftS, toS: epoch.toS + shiftS });
    epochSpectra.push(...found.epochSpectra);
    binCpm = found.binCpm;
  }
  const { figures } = stomachFigures({
    analysis: { rhythm: { epochs }, epochSpectra, binCpm, missing: [], breathing: null },
    phase: { name: 'fasting', fromS: 0, toS: pieces * PIECE_MIN * 60 },
    spoiled: [],
    settings: DEFAULT_SETTINGS,
  });
  return new Map(Object.entries(figures).map(([key, figure]) => [key, numberOf(figure)]));
}

/** Means that stand for the tendency; spreads are averaged as squares where the figure is the root of one. */
const SQUARED: readonly string[] = ['rmssd_ms', 'sdsd_ms', 'sd1_ms', 'sd2_ms', 'sdnn_whole_ms'];

/** The heart's figures of a person over a hundred hours, half an hour at a time. */
export function heartTruth(person: Person, state: State, seed: number): Truth {
  const sums = new Map<string, number>();
  for (let k = 0; k < HALF_HOURS; k += 1) {
    const rrMs = intervals(person, state, HALF_HOUR_MIN, seed + k);
    const { figures } = heartStudied(rrMs, HALF_HOUR_MIN);
    for (const [key, value] of valuesOf(figures)) sums.set(key, (sums.get(key) ?? 0) + value);
  }
  const truth = new Map(
    [...sums].map(([key, sum]) => {
      const mean = sum / HALF_HOURS;
      return [key, SQUARED.includes(key) ? Math.sqrt(mean) : mean];
    }),
  );
  const [lf, hf] = [truth.get('lf_ms2') ?? Number.NaN, truth.get('hf_ms2') ?? Number.NaN];
  truth.set('lf_hf_ratio', lf / hf);
  truth.set('lf_nu_pct', (100 * lf) / (lf + hf));
  truth.set('hf_nu_pct', (100 * hf) / (lf + hf));
  return truth;
}

const valuesOf = (figures: Figures): readonly (readonly [string, number])[] =>
  Object.entries(figures).flatMap(([key, figure]) => {
    const value = numberOf(figure);
    if (Number.isNaN(value)) return [];
    return [[key, SQUARED.includes(key) ? value ** 2 : value]];
  });
