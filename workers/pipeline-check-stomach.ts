import { exp, log, pow } from '../src/numeric/elementary';
import { numberFigure, numberOf } from '../src/recording/figure';
import type { PhaseFindings } from '../src/recording/findings';
import type { Epoch } from '../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../src/recording/settings';
import { peakThreshold } from '../src/stomach/background';
import { bandPeaks, densityDb, dominantPeak } from '../src/stomach/dominant-peak';
import { epochStarts } from '../src/stomach/epoch-layout';
import { instabilityPercent, stomachFigures } from '../src/stomach/figures';
import { meanSpectrum } from '../src/stomach/mean-spectrum';
import { rhythmOf } from '../src/stomach/rhythm-class';
import { epochsOfPair } from '../src/stomach/slow-wave-coupling';
import { windowSpectra } from '../src/stomach/window-spectrum';
import { ARITHMETIC, type CheckValue, EXACT, within } from './check-value';
import { changesOf } from './findings';
import { tone } from './pipeline-check-spectra';

const BANDS = DEFAULT_SETTINGS.rhythmBands;

/** The first epoch of a signal, by the code of the epochs. */
function epochSpectrum(signal: Float64Array, rateHz: number) {
  const kept = new Uint8Array(signal.length).fill(1);
  const spectra = windowSpectra({ signal, kept, rateHz, lengthS: 240, powerResponse: null });
  return { density: spectra.density(spectra.prepare(0)), binCpm: spectra.binCpm };
}

function epochPeak() {
  const { density, binCpm } = epochSpectrum(tone(3), 4);
  const peak = dominantPeak(density, binCpm, BANDS);
  if (!peak) throw new Error('no peak in the search band');
  return peak;
}

/** Frequencies in cpm of the strong lines of beats at 63 a minute picked once a second without a filter. */
function aliasLines(): number[] {
  const period = 60 / 63;
  const picked = Float64Array.from({ length: 600 }, (_, t) => {
    const fromBeat = ((t + period / 2) % period) - period / 2;
    return 300 * exp(-0.5 * (fromBeat / 0.012) ** 2);
  });
  const { density, binCpm } = epochSpectrum(picked, 1);
  const peaks = bandPeaks(density, binCpm, { lowCpm: 1, highCpm: 10 });
  const most = Math.max(...peaks.map((peak) => peak.density));
  return peaks.filter((peak) => peak.density > 0.1 * most).map(({ cpm }) => cpm);
}

const phaseOf = (name: string, dpDb: number): PhaseFindings => ({
  name,
  phase: name,
  fromS: 0,
  toS: 1800,
  keptStomachS: 1800,
  keptHeartS: 1800,
  adequacyStomach: 'enough',
  adequacyHeart: 'enough',
  figures: { dp_mean_spectrum_db: numberFigure(dpDb) },
});

/** The change of power of a meal that adds some dB, as it is printed. */
function printedRatio(db: number): string {
  const changes = changesOf([phaseOf('fasting', 50), phaseOf('fed', 50 + db)]);
  const value = changes.find(({ key }) => key === 'dp_mean_spectrum_db')?.value;
  return value?.kind === 'number' ? (value.basis ?? '') : 'withheld';
}

/** Epochs one a minute with the DF given. */
const epochsOf = (dfCpm: readonly number[]): readonly Epoch[] =>
  dfCpm.map((cpm, i) => ({
    lead: '#1',
    phase: 'fasting',
    fromS: 60 * i,
    toS: 60 * i + 240,
    kept: true,
    spoiledFraction: 0,
    dfCpm: cpm,
    dpDb: 50,
    peakShare: 0.9,
    rhythm: rhythmOf(cpm, BANDS),
    flags: [],
  }));

/** Percent of epochs in which two leads are coupled. */
function coupledPercent(): number {
  const pairs = epochsOfPair(
    epochsOf([3, 3.1, 2.9, 3.5, 3]),
    epochsOf([3.1, 3.25, 3.15, 3.4, 2.9]),
  );
  return (100 * pairs.filter(({ coupled }) => coupled).length) / pairs.length;
}

/** Percent of time in the normal band of 27 epochs of which 20 are. */
function twentyOf27(): number {
  const epochs = epochsOf(Array.from({ length: 27 }, (_, i) => (i < 20 ? 3 : 5)));
  const { figures } = stomachFigures({
    analysis: {
      rhythm: { epochs },
      epochSpectra: epochs.map(() => new Float64Array(32).fill(1)),
      binCpm: 0.5,
      missing: [],
      breathing: null,
    },
    phase: { name: 'fasting', fromS: 0, toS: 1800 },
    spoiled: [],
    settings: DEFAULT_SETTINGS,
  });
  return Math.round(numberOf(figures.time_normo_pct));
}

/** Level in dB of the mean of spectra of 1 and of 100. */
function meanThenDb(): number {
  const flat = (value: number) => new Float64Array(8).fill(value);
  const mean = meanSpectrum([flat(1), flat(100)], 1, BANDS);
  return densityDb(mean?.density[3] ?? Number.NaN);
}

const epochsIn = (minutes: number): number =>
  epochStarts({ fromS: 0, toS: 60 * minutes }, DEFAULT_SETTINGS.epoch).length;

/** Height over the mean that the highest of m values of noise passes once in twenty. */
function highestOf(m: number): number {
  const one = -log(0.05);
  return one * exp(peakThreshold(0.05, m, 0) - peakThreshold(0.05, 1, 0));
}

/** From epochs to the stomach's figures. */
export const STOMACH_CHECKS: readonly CheckValue[] = [
  {
    id: 'CV-09',
    what: 'Rhythm at 1.999, 2, 3.999, 4 and 9 cpm (9 lies outside: none)',
    source: 'half-open bands 1-2-4-9 cpm, as set',
    expected: ['brady', 'normo', 'normo', 'tachy', 'none'],
    tolerance: EXACT,
    got: () => [1.999, 2, 3.999, 4, 9].map((cpm) => rhythmOf(cpm, BANDS)),
  },
  {
    id: 'CV-10',
    what: '100 µV at 3 cpm in one epoch, as figures see it (line removed, padded): DF, cpm',
    source: ARITHMETIC,
    expected: [3],
    tolerance: within(0.0005),
    got: () => [epochPeak().cpm],
  },
  {
    id: 'CV-10',
    what: 'the same epoch: DP, dB re 1 µV²/Hz',
    source: ARITHMETIC,
    expected: [59.031],
    tolerance: within(0.005),
    got: () => [densityDb(epochPeak().density)],
  },
  {
    id: 'CV-12',
    what: 'Beats at 63 a minute picked once a second without a filter: strong lines, cpm',
    source: ARITHMETIC,
    expected: [3, 6, 9],
    tolerance: within(0.02),
    got: aliasLines,
  },
  {
    id: 'CV-16',
    what: 'Epochs in 30, 60 and 15 min',
    source: ARITHMETIC,
    expected: [27, 57, 12],
    tolerance: EXACT,
    got: () => [30, 60, 15].map(epochsIn),
  },
  {
    id: 'CV-17',
    what: '20 of 27 epochs, in percent as printed',
    source: ARITHMETIC,
    expected: [74],
    tolerance: EXACT,
    got: () => [twentyOf27()],
  },
  {
    id: 'CV-18',
    what: 'A power ratio of 2.4 and of 10^0.6, dB',
    source: ARITHMETIC,
    expected: [3.802, 6],
    tolerance: within(0.001),
    got: () => [densityDb(2.4), densityDb(pow(10, 0.6))],
  },
  {
    id: 'CV-18',
    what: 'A change of 4 dB as printed beside it (the ratio is 2.512)',
    source: ARITHMETIC,
    expected: ['× 2.5'],
    tolerance: EXACT,
    got: () => [printedRatio(4)],
  },
  {
    id: 'CV-19',
    what: 'Mean of powers 1 and 100, then dB (never the mean of dB, 10.0)',
    source: ARITHMETIC,
    expected: [17.033],
    tolerance: within(0.001),
    got: () => [meanThenDb()],
  },
  {
    id: 'CV-20',
    what: 'Instability of 3.0 2.9 3.1 3.0 2.8 3.2, % (n − 1)',
    source: ARITHMETIC,
    expected: [4.714],
    tolerance: within(0.001),
    got: () => [instabilityPercent([3, 2.9, 3.1, 3, 2.8, 3.2])],
  },
  {
    id: 'CV-21',
    what: 'Coupling of 3.0 3.1 2.9 3.5 3.0 with 3.1 3.25 3.15 3.4 2.9 cpm (under 0.2 apart), %',
    source: ARITHMETIC,
    expected: [80],
    tolerance: EXACT,
    got: () => [coupledPercent()],
  },
  {
    id: 'CV-54',
    what: 'Over its mean, what the highest of 34 values of noise passes once in twenty',
    source: ARITHMETIC,
    expected: [6.497],
    tolerance: within(0.001),
    got: () => [highestOf(34)],
  },
];
