import { lostOn } from '../src/recording/lost';
import type { Phase } from '../src/recording/phase';
import type { Epoch } from '../src/recording/rhythm';
import { isWithin, joinIntervals } from '../src/recording/span';
import { keptSamples } from '../src/stomach/kept-samples';
import { hasRhythm } from '../src/stomach/rhythm-class';
import type { CourseGrid } from '../src/trust/beat-course';
import { type Modulation, phaseModulation } from '../src/trust/phase-modulation';
import { HALF_WIDTH_CPM, type SlowPhase } from '../src/trust/slow-phase';
import { inTurns, type Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';

/** What the person is told is being done. */
export const BOTH_RHYTHMS = 'Both rhythms';
/** Read before and after a phase, so that the filter's ends lie outside it. */
const MARGIN_S = 75;
/** Least that both organs must share. */
export const LEAST_SHARED_S = 600;

/** The reported lead about a phase, on the slow grid. */
interface Piece {
  readonly grid: CourseGrid;
  readonly samples: Float64Array;
  readonly kept: Uint8Array;
  /** The phase's samples within the piece. */
  readonly from: number;
  readonly to: number;
}

export function pieceOf({ inputs, slow, recording }: EvidenceInputs, phase: Phase): Piece {
  const { roles, spans } = inputs;
  const { recorded, rateHz } = slow[roles.reported];
  const at = (timeS: number) => Math.round(Math.min(Math.max(0, timeS * rateHz), recorded.length));
  const [first, end] = [at(phase.fromS - MARGIN_S), at(phase.toS + MARGIN_S)];
  const lost = lostOn(roles.slow[roles.reported], 'stomach', spans, recording.gaps);
  return {
    grid: { firstS: first / rateHz, rateHz, length: end - first },
    samples: recorded.subarray(first, end),
    kept: keptSamples(recorded, rateHz, lost).subarray(first, end),
    from: at(phase.fromS) - first,
    to: at(phase.toS) - first,
  };
}

/** 1 for the samples whose nearest epoch has a rhythm near DF. */
export function steadySamples(
  piece: Piece,
  phase: Phase,
  epochs: readonly Epoch[],
  dfCpm: number,
): Uint8Array {
  const steady = new Uint8Array(piece.grid.length);
  const { firstS, rateHz } = piece.grid;
  const centres = epochs.map(({ fromS, toS }) => (fromS + toS) / 2);
  epochs.forEach((epoch, k) => {
    const near = epoch.dfCpm !== null && Math.abs(epoch.dfCpm - dfCpm) <= HALF_WIDTH_CPM;
    if (!near || !hasRhythm(epoch)) return;
    const fromS = k === 0 ? phase.fromS : (centres[k - 1] + centres[k]) / 2;
    const toS = k === epochs.length - 1 ? phase.toS : (centres[k] + centres[k + 1]) / 2;
    const [first, end] = [fromS, toS].map((timeS) => Math.round((timeS - firstS) * rateHz));
    steady.fill(1, Math.max(0, first), Math.max(0, end));
  });
  return steady;
}

/** NN intervals outside irregular segments, each at its middle. */
export function intervalsOf({ computed }: EvidenceInputs) {
  const heart = computed.heart;
  if (!heart) return { timesS: new Float64Array(0), rrMs: new Float64Array(0) };
  const { timesS, rrMs, nn } = heart.rr;
  const irregular = joinIntervals(heart.segments.filter(({ state }) => state === 'irregular'));
  const counts = (_: number, i: number) => nn[i] === 1 && !isWithin(timesS[i], irregular);
  const middles = timesS.map((timeS, i) => timeS - rrMs[i] / 2000);
  return { timesS: middles.filter(counts), rrMs: rrMs.filter(counts) };
}

/** What a phase's modulation is computed from. */
export interface Ready {
  readonly from: EvidenceInputs;
  readonly piece: Piece;
  readonly dfCpm: number;
  readonly steady: Uint8Array;
  readonly slow: SlowPhase;
  /** RR in ms less its slow course. */
  readonly course: Float64Array;
}

/** A phase that is believed only where the rhythm is steady. */
export const within = (slow: SlowPhase, steady: Uint8Array): SlowPhase => ({
  ...slow,
  usable: slow.usable.map((one, i) => one & steady[i]),
});

/** Samples of the phase of the study in which both the slow wave's phase and the course are known. */
export function countBoth({ piece, slow, course }: Ready): number {
  let count = 0;
  for (let i = piece.from; i < piece.to; i += 1)
    if (slow.usable[i] === 1 && !Number.isNaN(course[i])) count += 1;
  return count;
}

/** Modulation of a course by a slow wave's phase within the phase of the study; null where no test can be made. */
export const modulationIn = (
  { piece }: Pick<Ready, 'piece'>,
  slow: SlowPhase,
  course: Float64Array,
  job: Job,
): Promise<Modulation | null> =>
  inTurns(
    phaseModulation({
      phase: slow.phase.subarray(piece.from, piece.to),
      usable: slow.usable.subarray(piece.from, piece.to),
      course: course.subarray(piece.from, piece.to),
      rateHz: piece.grid.rateHz,
    }),
    job,
    BOTH_RHYTHMS,
  );
