import type { FigureValue } from '../../../src/recording/figure';
import type { Findings } from '../../../src/recording/findings';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import { stomachFigures } from '../../../src/stomach/figures';
import { slowWaveRhythm } from '../../../src/stomach/slow-wave-rhythm';
import { PHASES } from './families';
import { at4Hz } from './slow-wave-score';

const KEY = 'dp_mean_spectrum_db';
const RATE_HZ = 4;

const numberOf = (figure: FigureValue | undefined) =>
  figure?.kind === 'number' ? figure.value : Number.NaN;

/** Fed less fasting DP of the mean spectra as the findings have them, dB. */
const foundDb = ({ phases }: Findings) => {
  const dp = (name: string) => numberOf(phases.find((one) => one.name === name)?.figures[KEY]);
  return dp('fed') - dp('fasting');
};

/** The same of the slow wave alone, nothing spoiled. */
function trueDb(slowWave: Float64Array, rateHz: number): number {
  const signal = at4Hz(slowWave, rateHz);
  const analysis = slowWaveRhythm({
    slow: {
      lead: '#1',
      rateHz: RATE_HZ,
      recorded: signal,
      slowWave: signal,
      forSpectra: signal,
      powerResponse: null,
      unclean: [],
      leadSAt: () => 0,
      notes: [],
    },
    spoiled: [],
    phases: PHASES,
    settings: DEFAULT_SETTINGS,
    breathing: null,
  });
  const dp = (name: string) => {
    const phase = PHASES.find((one) => one.name === name);
    if (!phase) throw new Error(`no phase ${name}`);
    const options = { analysis, phase, spoiled: [], settings: DEFAULT_SETTINGS };
    return numberOf(stomachFigures(options).figures[KEY]);
  };
  return dp('fed') - dp('fasting');
}

/** Fed-to-fasting power ratio of the findings against that of the true slow wave alone, in percent of the latter. */
export function powerRatioError(
  findings: Findings,
  slowWave: Float64Array,
  rateHz: number,
): number {
  return 100 * (10 ** ((foundDb(findings) - trueDb(slowWave, rateHz)) / 10) - 1);
}
