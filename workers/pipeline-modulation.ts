import { mean, median } from '../src/numeric/statistics';
import type { PhaseModulation } from '../src/recording/evidence/together';
import { isMeal, type Phase } from '../src/recording/phase';
import { hasRhythm } from '../src/stomach/rhythm-class';
import { beatCourse } from '../src/trust/beat-course';
import { LEAST_SHIFT_S } from '../src/trust/phase-modulation';
import { cyclesOf, slowPhase } from '../src/trust/slow-phase';
import { inTurns, type Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';
import { rivalsOf } from './pipeline-rivals';
import {
  BOTH_RHYTHMS,
  countBoth,
  intervalsOf,
  LEAST_SHARED_S,
  modulationIn,
  pieceOf,
  steadySamples,
  within,
} from './pipeline-shared-phase';

const DEGREES = 180 / Math.PI;

/** Modulation of RR by the phase of the slow wave in one phase of the study, with its rivals. */
export async function modulationOf(
  from: EvidenceInputs,
  phase: Phase,
  job: Job,
): Promise<PhaseModulation> {
  const not = (reason: string): PhaseModulation => ({ kind: 'withheld', reason });
  if (isMeal(phase)) return not('the meal is shown and not analysed');
  if (!from.computed.heart) return not('no heart lead is read');
  const epochs = from.computed.stomach[from.inputs.roles.reported].rhythm.epochs.filter(
    (epoch) => epoch.phase === phase.name,
  );
  const df = epochs.filter(hasRhythm).flatMap(({ dfCpm }) => (dfCpm === null ? [] : [dfCpm]));
  if (df.length === 0) return not('no epoch has a rhythm');
  const dfCpm = median(df);
  const piece = pieceOf(from, phase);
  const { rateHz } = piece.grid;
  const slow = await inTurns(
    slowPhase(piece.samples, piece.kept, rateHz, dfCpm),
    job,
    BOTH_RHYTHMS,
  );
  const steady = steadySamples(piece, phase, epochs, dfCpm);
  const { timesS, rrMs } = intervalsOf(from);
  const course = await inTurns(beatCourse(timesS, rrMs, piece.grid), job, BOTH_RHYTHMS);
  const ready = { from, piece, dfCpm, steady, slow: within(slow, steady), course };
  const counted = countBoth(ready);
  if (counted < LEAST_SHARED_S * rateHz)
    return not(
      `${(counted / rateHz / 60).toFixed(1)} min with a steady rhythm and NN intervals are too few (10 wanted)`,
    );
  const found = await modulationIn(ready, ready.slow, course, job);
  if (!found) return not('some part of the slow wave’s cycle is never seen');
  const inPhase = (_: number, i: number) => timesS[i] >= phase.fromS && timesS[i] < phase.toS;
  const rrMeanMs = mean(rrMs.filter(inPhase));
  const percent = (depthMs: number) => (100 * depthMs) / rrMeanMs;
  return {
    kind: 'found',
    dfCpm,
    cycles: cyclesOf(ready.slow, piece.from, piece.to),
    minutes: counted / rateHz / 60,
    rrMeanMs,
    depthPct: percent(found.depth),
    chancePct: percent(found.chanceDepth),
    longestDeg: (found.peakRad * DEGREES + 360) % 360,
    p: found.p,
    pOfSurrogates: found.pOfSurrogates,
    surrogates: found.surrogates,
    leastShiftS: LEAST_SHIFT_S,
    steadiness: found.steadiness,
    binsMs: found.bins,
    rivals: await rivalsOf(ready, { found, percent }, phase, job),
  };
}
