import { beatScore } from '../src/heart/planted-beats';
import { rmssdFloorMs } from '../src/heart/timing-floor';
import { timeDomain, triangularIndex } from '../src/heart/variability';
import { lombBandPowers, welchBandPowers } from '../src/heart/variability-spectrum';
import { sin } from '../src/numeric/elementary';
import { matchBeats } from '../src/recording/match-beats';
import { DEFAULT_SETTINGS } from '../src/recording/settings';
import { ARITHMETIC, type CheckValue, EXACT, within, withinShare } from './check-value';

const TASK_FORCE = 'Task Force 1996 (definitions)';
const { lfHz, hfHz } = DEFAULT_SETTINGS.variability;

const time = (rr: readonly number[], nn: readonly number[] = rr.map(() => 1)) =>
  timeDomain(Float64Array.from(rr), Uint8Array.from(nn));

const LIST = [800, 810, 790, 860, 800, 805];
const MISSED = [800, 810, 1600, 800, 790];
const EARLY = [800, 800, 500, 1100, 800, 810];
const BINS = [800, 801, 803, 805, 806, 812, 813, 820, 795, 799, 802, 804];

/** Two swings of intervals over 300 s at 4 Hz: 20 ms at 0.10 Hz, 10 ms at 0.25 Hz. */
const timesS = Float64Array.from({ length: 1200 }, (_, i) => i / 4);
const swings = timesS.map(
  (t) => 250 + 20 * sin(2 * Math.PI * 0.1 * t) + 10 * sin(2 * Math.PI * 0.25 * t),
);

function byLomb(): number[] {
  const [lf, hf] = lombBandPowers(timesS, swings, [lfHz, hfHz]);
  return [lf, hf, lf / hf, (100 * lf) / (lf + hf), (100 * hf) / (lf + hf)];
}

/** Matched beats and those of one list only, of one beat at 1 s and another. */
function countsOf(atS: number): number[] {
  const { pairs, onlyFirst, onlySecond } = matchBeats([1], [atS]);
  return [pairs.length, onlyFirst.length, onlySecond.length];
}

/** Sensitivity and positive predictivity in percent of 98 of 100 beats found, with one too many. */
function scores(): number[] {
  const put = Array.from({ length: 100 }, (_, i) => i + 1);
  const found = [...put.slice(0, 97), 97.5, 98].sort((a, b) => a - b);
  const { sensitivityPct, predictivityPct } = beatScore(put, found, []);
  return [sensitivityPct ?? Number.NaN, predictivityPct ?? Number.NaN];
}

/** From intervals to the heart's figures, and how beats are matched. */
export const HEART_CHECKS: readonly CheckValue[] = [
  {
    id: 'CV-23',
    what: 'NN 800 810 790 860 800 805 ms: mean, heart rate, SDNN, RMSSD, pNN50, SDSD',
    source: TASK_FORCE,
    expected: [810.833, 73.998, 24.983, 42.485, 40, 47.487],
    tolerance: within(0.001),
    got() {
      const { meanMs, heartRateBpm, sdnnMs, rmssdMs, pnn50Pct, sdsdMs } = time(LIST);
      return [meanMs, heartRateBpm, sdnnMs, rmssdMs, pnn50Pct, sdsdMs];
    },
  },
  {
    id: 'CV-23b',
    what: 'The same list: SD1 (ours, n − 1, turned into that of the count)',
    source: 'Brennan 2001',
    expected: [30.0333],
    tolerance: within(0.001),
    got: () => [time(LIST).sd1Ms * Math.sqrt(4 / 5)],
  },
  {
    id: 'CV-24',
    what: 'A missed beat (1600 ms): RMSSD as it stands; RMSSD and SDNN with it not NN',
    source: TASK_FORCE,
    expected: [562.205, 10, 8.165],
    tolerance: within(0.001),
    got() {
      const mended = time(MISSED, [1, 1, 0, 1, 1]);
      return [time(MISSED).rmssdMs, mended.rmssdMs, mended.sdnnMs];
    },
  },
  {
    id: 'CV-25',
    what: 'pNN50 of 1000 1050 1000 1050 ms: 50 ms is not over 50 ms',
    source: TASK_FORCE,
    expected: [0],
    tolerance: EXACT,
    got: () => [time([1000, 1050, 1000, 1050]).pnn50Pct],
  },
  {
    id: 'CV-26',
    what: '500 and 1100 ms not NN among 800 800 . . 800 810: NN, pairs, RMSSD',
    source: ARITHMETIC,
    expected: [4, 2, 7.071],
    tolerance: within(0.001),
    got() {
      const { nnCount, pairCount, rmssdMs } = time(EARLY, [1, 1, 0, 0, 1, 1]);
      return [nnCount, pairCount, rmssdMs];
    },
  },
  {
    id: 'CV-27',
    what: 'Heart rate of 600 and 1000 ms, a minute',
    source: ARITHMETIC,
    expected: [75],
    tolerance: EXACT,
    got: () => [time([600, 1000]).heartRateBpm],
  },
  {
    id: 'CV-28',
    what: '20 ms at 0.10 Hz and 10 ms at 0.25 Hz by Lomb-Scargle: LF, HF, LF/HF, LF and HF normalised',
    source: ARITHMETIC,
    expected: [200, 50, 4, 80, 20],
    tolerance: withinShare(0.005),
    got: byLomb,
  },
  {
    id: 'CV-28',
    what: 'the same by Welch: LF, HF',
    source: ARITHMETIC,
    expected: [200, 50],
    tolerance: withinShare(0.005),
    got: () => welchBandPowers(timesS, swings, [lfHz, hfHz]),
  },
  {
    id: 'CV-29',
    what: 'RMSSD that R times rounded to 8 ms give alone, ms',
    source: ARITHMETIC,
    expected: [5.657],
    tolerance: withinShare(0.02),
    got: () => [rmssdFloorMs(8 / Math.sqrt(12))],
  },
  {
    id: 'CV-30',
    what: 'Triangular index of 12 intervals of which the fullest bin holds 6',
    source: TASK_FORCE,
    expected: [2],
    tolerance: EXACT,
    got: () => [triangularIndex(Float64Array.from(BINS), new Uint8Array(BINS.length).fill(1))],
  },
  {
    id: 'CV-45',
    what: 'A beat at 1.000 s and one at 1.149 s, at 1.151 s: matched, only in the first, only in the second',
    source: 'ANSI/AAMI EC57 (150 ms)',
    expected: [1, 0, 0, 0, 1, 1],
    tolerance: EXACT,
    got: () => [...countsOf(1.149), ...countsOf(1.151)],
  },
  {
    id: 'CV-46',
    what: '98 of 100 beats found and one too many: sensitivity, positive predictivity, %',
    source: 'ANSI/AAMI EC57',
    expected: [98, 98.99],
    tolerance: within(0.01),
    got: scores,
  },
];
