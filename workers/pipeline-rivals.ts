import { beatAreaUvS } from '../src/heart/beat-area';
import { median } from '../src/numeric/statistics';
import type { Rivals } from '../src/recording/evidence/together';
import type { Phase } from '../src/recording/phase';
import { isWithin } from '../src/recording/span';
import { beatCourse, beatPulses, withoutSlowCourse } from '../src/trust/beat-course';
import { leakVerdict } from '../src/trust/leak';
import type { Modulation } from '../src/trust/phase-modulation';
import { breathingAtDf, nearMultiple, powerAtDouble } from '../src/trust/rivals';
import { bandAmplitude, slowPhase } from '../src/trust/slow-phase';
import { breathingReference } from './breathing-reference';
import { inTurns, type Job } from './job';
import { readLead } from './lead-pass';
import {
  BOTH_RHYTHMS,
  countBoth,
  LEAST_SHARED_S,
  modulationIn,
  type Ready,
  within,
} from './pipeline-shared-phase';
import { leadChannel } from './pipeline-signals';

/** Stretch in which the usual beat of the lead is measured. */
const BEAT_STRETCH_S = 300;

interface Found {
  readonly found: Modulation;
  readonly percent: (depthMs: number) => number;
}

/** What else could make RR follow the slow wave in a phase of the study. */
export async function rivalsOf(ready: Ready, of: Found, phase: Phase, job: Job): Promise<Rivals> {
  const { piece, course, dfCpm } = ready;
  const inPhase = course.subarray(piece.from, piece.to);
  const powerRatio = powerAtDouble(inPhase, piece.grid.rateHz, dfCpm);
  await job.breathe();
  return {
    breathing: await breathingRival(ready, phase, job),
    waves: {
      verdict: powerRatio === null ? 'not-tested' : powerRatio > 1 ? 'seen' : 'not-seen',
      powerRatio,
      secondDepthPct: of.percent(of.found.secondDepth),
    },
    leak: await leakRival(ready, of, phase, job),
  };
}

async function breathingRival(
  { from, piece, course, dfCpm }: Ready,
  phase: Phase,
  job: Job,
): Promise<Rivals['breathing']> {
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
  const about = reference?.slice(first, first + piece.grid.length) ?? null;
  const rest = about && (await inTurns(withoutSlowCourse(about, rateHz), job, BOTH_RHYTHMS));
  const shared = rest && breathingAtDf(cut(course), cut(rest), rateHz, dfCpm);
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
  const phaseOf = (samples: Float64Array) =>
    inTurns(slowPhase(samples, piece.kept, rateHz, dfCpm), job, BOTH_RHYTHMS);
  const leak = await phaseOf(pulses);
  const leakUv = bandAmplitude(leak.band, slow.usable, piece.from, piece.to);
  const rest = piece.samples.map((value, i) => value - pulses[i]);
  const without = within(await phaseOf(rest), steady);
  const again = await modulationIn(ready, without, course, job);
  const [withoutDepth, withoutP] = [again?.depth ?? null, again?.p ?? null];
  return {
    verdict: leakVerdict({ ...facts, leakUv, withoutDepth, withoutP }),
    leakUv,
    slowUv,
    withoutDepthPct: withoutDepth === null ? null : percent(withoutDepth),
    withoutP,
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
  const { grid } = ready.piece;
  const work = beatCourse(timesS.filter(known), relative.filter(known), grid);
  const course = await inTurns(work, job, BOTH_RHYTHMS);
  if (countBoth({ ...ready, course }) < LEAST_SHARED_S * grid.rateHz) return null;
  return (await modulationIn(ready, ready.slow, course, job))?.p ?? null;
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
