import { describe, expect, it } from 'vitest';
import { simulateStudy } from '../../src/simulate/simulate-study';
import { drawStudies, type Family } from '../bench/accuracy/families';
import { spoiledOf } from '../bench/accuracy/heart-score';
import { findAsProgram } from '../bench/accuracy/heartbeats-run';
import { matchBeats } from './score';

/** Other studies than those of the bench, and the first ten minutes of them. */
const SEED = 2;
const SECONDS = 600;
/** Near a spoiled stretch, and at the ends of the study, a beat may or may not be found. */
const MARGIN_S = 1;

/** Beats missed and too many outside what is truly spoiled, the program's own spans left out of its search. */
function errorsOutsideSpoil(family: Family, number: number) {
  const drawn = drawStudies(SEED).filter((one) => one.family === family)[number].spec;
  const artefacts = drawn.artefacts.filter(({ toS }) => toS < SECONDS - 30);
  const spec = { ...drawn, artefacts, durationS: SECONDS };
  const { signals, truth, rateHz } = simulateStudy(spec);
  const { stepUv, railUv } = spec.digitiser ?? { stepUv: 0, railUv: Number.POSITIVE_INFINITY };
  const { timesS } = findAsProgram({ signal: signals[0], rateHz, stepUv, railUv });
  const trueS = truth.beats.map(({ timeS }) => timeS);
  const spoiled = spoiledOf(truth, MARGIN_S);
  const isScored = (s: number) =>
    s > MARGIN_S &&
    s < SECONDS - MARGIN_S &&
    !spoiled.some(({ fromS, toS }) => s >= fromS && s < toS);
  const { missed, extra } = matchBeats(trueS, timesS);
  return {
    missed: missed.filter((i) => isScored(trueS[i])).length,
    extra: extra.filter((i) => isScored(timesS[i])).length,
    beats: trueS.filter(isScored).length,
    spoiled: spoiled.length,
  };
}

describe('in simulated abdominal leads every beat outside spoiled stretches is found, and nothing else', () => {
  it.each([
    ['ordinary', 0],
    ['heavy artefacts', 2],
    ['weak wave, strong heartbeat', 3],
    ['breathing at 12, strong harmonic', 4],
  ] as const)('%s', (family, number) => {
    const { missed, extra, beats } = errorsOutsideSpoil(family, number);
    expect({ missed, extra }).toEqual({ missed: 0, extra: 0 });
    expect(beats).toBeGreaterThan(300);
  });

  it('with spoiled stretches among them', () => {
    expect(errorsOutsideSpoil('heavy artefacts', 2).spoiled).toBeGreaterThan(2);
  });
});
