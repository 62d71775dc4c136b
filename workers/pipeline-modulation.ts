import { beatAreaUvS } from '../src/heart/beat-area';
import { mean, median } from '../src/numeric/statistics';
import type { PhaseModulation, Rivals } from '../src/recording/evidence/together';
import { lostOn } from '../src/recording/lost';
import { isMeal, type Phase } from '../src/recording/phase';
import type { Epoch } from '../src/recording/rhythm';
import { isWithin, joinIntervals } from '../src/recording/span';
import { keptSamples } from '../src/stomach/kept-samples';
import { hasRhythm } from '../src/stomach/rhythm-class';
import {
  beatCourse,
  beatPulses,
  type CourseGrid,
  withoutSlowCourse,
} from '../src/trust/beat-course';
import { leakVerdict } from '../src/trust/leak';
import { LEAST_SHIFT_S, type Modulation, phaseModulation } from '../src/trust/phase-modulation';
import { breathingAtDf, nearMultiple, powerAtDouble } from '../src/trust/rivals';
import {
  bandAmplitude,
  cyclesOf,
  HALF_WIDTH_CPM,
  type SlowPhase,
  slowPhase,
} from '../src/trust/slow-phase';
import { breathingReference } from './breathing-reference';
import { inTurns, type Job } from './job';
import { readLead } from './lead-pass';
import type { EvidenceInputs } from './pipeline-evidence';
import { leadChannel } from './pipeline-signals';

/** Read before and after a phase, so that the filter's ends lie outside it. */
const MARGIN_S = 75;
/** Least that both organs must share. */
const LEAST_S = 600;
/** Stretch in which the usual beat of the lead is measured. */
const BEAT_STRETCH_S = 300;
const DEGREES = 180 / Math.PI;

/** The reported lead about a phase, on the slow grid. */
interface Piece {
  readonly grid: CourseGrid;
  readonly samples: Float64Array;
  readonly kept: Uint8Array;
  /** The phase's samples within the piece. */
  readonly from: number;
  readonly to: number;
}

function pieceOf({ inputs, slow, recording }: EvidenceInputs, phase: Phase): Piece {
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
function steadySamples(
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
function intervalsOf({ computed }: EvidenceInputs) {
  const heart = computed.heart;
  if (!heart) return { timesS: new Float64Array(0), rrMs: new Float64Array(0) };
  const { timesS, rrMs, nn } = heart.rr;
  const irregular = joinIntervals(heart.segments.filter(({ state }) => state === 'irregular'));
  const counts = (_: number, i: number) => nn[i] === 1 && !isWithin(timesS[i], irregular);
  const middles = timesS.map((timeS, i) => timeS - rrMs[i] / 2000);
  return { timesS: middles.filter(counts), rrMs: rrMs.filter(counts) };
}

/** What a phase's modulation is computed from. */
interface Ready {
  readonly from: EvidenceInputs;
  readonly piece: Piece;
  readonly dfCpm: number;
  readonly steady: Uint8Array;
  readonly slow: SlowPhase;
  /** RR in ms less its slow course. */
  readonly course: Float64Array;
}

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
  const slow = slowPhase(piece.samples, piece.kept, piece.grid.rateHz, dfCpm);
  await job.breathe();
  const steady = steadySamples(piece, phase, epochs, dfCpm);
  const { timesS, rrMs } = intervalsOf(from);
  const course = beatCourse(timesS, rrMs, piece.grid);
  const ready = { from, piece, dfCpm, steady, slow: within(slow, steady), course };
  const counted = countBoth(ready);
  if (counted < LEAST_S * piece.grid.rateHz)
    return not(
      `${(counted / piece.grid.rateHz / 60).toFixed(1)} min with a steady rhythm and NN intervals are too few (10 wanted)`,
    );
  const found = await inTurns(modulation(ready, ready.slow, course), job, 'Both rhythms');
  const inPhase = (_: number, i: number) => timesS[i] >= phase.fromS && timesS[i] < phase.toS;
  const rrMeanMs = mean(rrMs.filter(inPhase));
  const percent = (depthMs: number) => (100 * depthMs) / rrMeanMs;
  return {
    kind: 'found',
    dfCpm,
    cycles: cyclesOf(ready.slow, piece.from, piece.to),
    minutes: counted / piece.grid.rateHz / 60,
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

const within = (slow: SlowPhase, steady: Uint8Array): SlowPhase => ({
  ...slow,
  usable: slow.usable.map((one, i) => one & steady[i]),
});

function countBoth({ piece, slow, course }: Ready): number {
  let count = 0;
  for (let i = piece.from; i < piece.to; i += 1)
    if (slow.usable[i] === 1 && !Number.isNaN(course[i])) count += 1;
  return count;
}

const modulation = ({ piece }: Ready, slow: SlowPhase, course: Float64Array) =>
  phaseModulation({
    phase: slow.phase.subarray(piece.from, piece.to),
    usable: slow.usable.subarray(piece.from, piece.to),
    course: course.subarray(piece.from, piece.to),
    rateHz: piece.grid.rateHz,
  });

interface Found {
  readonly found: Modulation;
  readonly percent: (depthMs: number) => number;
}

async function rivalsOf(ready: Ready, of: Found, phase: Phase, job: Job): Promise<Rivals> {
  const { piece, course, dfCpm } = ready;
  const inPhase = course.subarray(piece.from, piece.to);
  const powerRatio = powerAtDouble(inPhase, piece.grid.rateHz, dfCpm);
  await job.breathe();
  return {
    breathing: breathingRival(ready, phase),
    waves: {
      verdict: powerRatio === null ? 'not-tested' : powerRatio > 1 ? 'seen' : 'not-seen',
      powerRatio,
      secondDepthPct: of.percent(of.found.secondDepth),
    },
    leak: await leakRival(ready, of, phase, job),
  };
}

function breathingRival({ from, piece, course, dfCpm }: Ready, phase: Phase): Rivals['breathing'] {
  const { rateHz } = piece.grid;
  const { recorded } = from.slow[from.inputs.roles.reported];
  const reference = breathingReference({
    breath: from.breathing,
    heights: from.computed.heights,
    rateHz,
    length: recorded.length,
  });
  const first = Math.round(piece.grid.firstS * rateHz);
  const cut = (x: Float64Array) => x.subarray(piece.from, piece.to);
  const shared = reference
    ? breathingAtDf(
        cut(course),
        cut(withoutSlowCourse(reference.slice(first, first + piece.grid.length), rateHz)),
        rateHz,
        dfCpm,
      )
    : null;
  const series = from.computed.breathing;
  const rates = series
    ? series.perMinute.filter(
        (rate, i) => !Number.isNaN(rate) && isWithin(series.centresS[i], [phase]),
      )
    : new Float64Array(0);
  const perMin = rates.length > 0 ? median(rates) : null;
  const multiple = perMin === null ? null : nearMultiple(perMin, dfCpm);
  const coherence = shared?.coherence ?? null;
  const coherent = shared !== null && coherence !== null && coherence > shared.level;
  const tested = coherence !== null || perMin !== null;
  return {
    verdict: coherent || multiple !== null ? 'seen' : tested ? 'not-seen' : 'not-tested',
    coherence,
    level: coherence === null ? null : (shared?.level ?? null),
    perMin,
    multiple,
  };
}

async function leakRival(
  ready: Ready,
  { found, percent }: Found,
  phase: Phase,
  job: Job,
): Promise<Rivals['leak']> {
  const { piece, slow, course, steady, dfCpm } = ready;
  const slowUv = bandAmplitude(slow.band, slow.usable, piece.from, piece.to);
  const heights = ready.from.computed.heights;
  const areaUvS = await areaOf(ready, phase);
  const relative = heights ? relativeHeights(heights.heightsUv) : new Float64Array(0);
  const heightP = heights ? await heightPOf(ready, heights.timesS, relative, job) : null;
  const none = { leakUv: null, slowUv, withoutDepthPct: null, withoutP: null, heightP };
  const facts = { slowUv, depth: found.depth, p: found.p, heightP };
  if (!heights || areaUvS === null)
    return {
      ...none,
      verdict: leakVerdict({ ...facts, leakUv: null, withoutDepth: null, withoutP: null }),
    };
  const sizes = relative.map((one) => (Number.isNaN(one) ? 1 : one));
  const pulses = beatPulses(heights.timesS, sizes, areaUvS, piece.grid);
  const { rateHz } = piece.grid;
  const leak = slowPhase(pulses, piece.kept, rateHz, dfCpm);
  const leakUv = bandAmplitude(leak.band, slow.usable, piece.from, piece.to);
  const rest = piece.samples.map((value, i) => value - pulses[i]);
  const without = within(slowPhase(rest, piece.kept, rateHz, dfCpm), steady);
  const again = await inTurns(modulation(ready, without, course), job, 'Both rhythms');
  return {
    verdict: leakVerdict({ ...facts, leakUv, withoutDepth: again.depth, withoutP: again.p }),
    leakUv,
    slowUv,
    withoutDepthPct: percent(again.depth),
    withoutP: again.p,
    heightP,
  };
}

/** Heights over their median, NaN where there is none. */
function relativeHeights(heightsUv: Float64Array): Float64Array {
  const usual = median(heightsUv.filter((one) => !Number.isNaN(one)));
  return heightsUv.map((one) => one / usual);
}

async function heightPOf(
  ready: Ready,
  timesS: Float64Array,
  relative: Float64Array,
  job: Job,
): Promise<number | null> {
  const known = (_: number, i: number) => !Number.isNaN(relative[i]);
  const course = beatCourse(timesS.filter(known), relative.filter(known), ready.piece.grid);
  if (countBoth({ ...ready, course }) < LEAST_S * ready.piece.grid.rateHz) return null;
  return (await inTurns(modulation(ready, ready.slow, course), job, 'Both rhythms')).p;
}

/** Area of the usual beat in the reported lead, measured where most of five minutes can be used; null where it cannot be. */
async function areaOf({ from, piece, slow }: Ready, phase: Phase): Promise<number | null> {
  const heights = from.computed.heights;
  if (!heights) return null;
  const { firstS, rateHz } = piece.grid;
  const length = Math.round(BEAT_STRETCH_S * rateHz);
  let [best, most] = [piece.from, -1];
  for (
    let at = piece.from;
    at === piece.from || at + length <= piece.to;
    at += Math.round(60 * rateHz)
  ) {
    const count = slow.usable.subarray(at, at + length).reduce((sum, one) => sum + one, 0);
    if (count > most) [best, most] = [at, count];
  }
  const lead = from.inputs.roles.slow[from.inputs.roles.reported];
  const channelHz = leadChannel(from.recording, lead).rateHz;
  const fromS = firstS + best / rateHz;
  const toS = Math.min(phase.toS, fromS + BEAT_STRETCH_S);
  const first = Math.floor(fromS * channelHz);
  const samples = await readLead(from.study.source, lead, first, Math.ceil(toS * channelHz));
  const beats = heights.timesS.filter((timeS) => timeS >= fromS && timeS < toS);
  return beatAreaUvS(samples, channelHz, first / channelHz, beats);
}
