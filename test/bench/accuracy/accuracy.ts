import { simulateSources, simulateStudy } from '../../../src/simulate/simulate-study';
import type { Bench, Measured, Part } from '../measured';
import { analysed } from './analysed';
import { epochLines } from './epochs-alone';
import { drawStudies } from './families';
import { heartScore } from './heart-score';
import { powerRatioError } from './power-ratio';
import { rhythmScore } from './rhythm-score';
import { slowWaveScore } from './slow-wave-score';
import { linesOf, type Scored } from './summary';

const SEED = 1;

/** Forty invented studies of known truth through the whole pipeline: how far each figure is from what went in. */
export const accuracy: Part = async ({ say }: Bench): Promise<readonly Measured[]> => {
  const scored: Scored[] = [];
  for (const { family, spec } of drawStudies(SEED)) {
    const study = simulateStudy(spec);
    const found = await analysed(study, spec);
    const { leads } = simulateSources(spec);
    const one: Scored = {
      family,
      heart: heartScore(found, study.truth, spec.rateHz),
      slow: study.truth.slowCpm
        ? slowWaveScore(found.slowWave, study.signals[0], leads[0], study.truth, spec.rateHz)
        : null,
      rhythm: rhythmScore(found.epochs, study.truth, spec.leads[0].breathingUv),
      ratioPct: study.truth.slowCpm
        ? powerRatioError(found.findings, leads[0]['slow wave'], spec.rateHz)
        : null,
    };
    scored.push(one);
    if (process.env.ACCURACY_VERBOSE)
      say(
        JSON.stringify({
          seed: spec.seed,
          ...one,
          heart: { ...one.heart, segments: one.heart.segments.length },
          rhythm: { ...one.rhythm, dfErrors: one.rhythm.dfErrors.length },
        }),
      );
  }
  return [...linesOf(scored), ...epochLines()];
};
