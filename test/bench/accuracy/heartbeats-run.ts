import { detectBeats } from '../../../src/heart/detect';
import type { BeatDoubtsInput } from '../../../src/heart/doubt-view';
import { createRandom } from '../../../src/numeric/random';
import { leadKey } from '../../../src/recording/lead';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import { type Interval, joinIntervals } from '../../../src/recording/span';
import { createSeparation } from '../../../src/separate/separation';
import { addEcgNoise } from '../../../src/simulate/ecg-noise';
import { createSpoilWatch } from '../../../src/trust/spoil-watch';
import { TICKS_PER_SAMPLE } from '../../../src/units/ticks';
import { doubtedOf, judgedSpans } from '../../../workers/judged-spans';
import { ALL_ROUTES } from '../../separate/all-routes';

const PIECE = 16384;
const LEAD = { kind: 'channel', channel: 0 } as const;

export interface LeadToScore {
  /** In uV. */
  readonly signal: Float64Array;
  readonly rateHz: number;
  readonly stepUv: number;
  readonly railUv: number;
}

/** The usual height of an R peak in an abdominal mixture, in uV; null: the ECG as it was recorded. */
export type Level = null | 100 | 50 | 25;
export const LEVELS: readonly Level[] = [null, 100, 50, 25];
export const levelWords = (level: Level) => (level === null ? 'as recorded' : `${level} uV`);

const SLOW_UV = 200;
const BREATH_UV = 60;

/** An ECG with R peaks of `heightUv` scaled to a level and mixed with what an abdominal lead holds; all of it invented. */
export function atLevel(
  ecg: LeadToScore,
  heightUv: number,
  level: Level,
  seed: number,
): LeadToScore {
  if (level === null) return ecg;
  const { rateHz } = ecg;
  const random = createRandom(seed + 77_000);
  const [slowCycle, breathCycle] = [random.uniform(), random.uniform()];
  const signal = ecg.signal.map((uv, i) => {
    const t = i / rateHz;
    const slow = 2 * Math.PI * (0.05 * t + slowCycle);
    return (
      (uv * level) / heightUv +
      SLOW_UV * (Math.sin(slow) + 0.2 * Math.sin(2 * slow + 0.6)) +
      BREATH_UV * Math.sin(2 * Math.PI * (0.25 * t + breathCycle))
    );
  });
  addEcgNoise(
    signal,
    rateHz,
    {
      wanderUv: 15,
      muscleUv: 2.5,
      burstsPerMin: 5,
      burstUv: 18,
      burstS: 2,
      motionPerMin: 0,
      motionUv: 0,
      humUv: 20,
      humHz: 50,
      stepsPerHour: 0,
      stepUv: 0,
      popsPerHour: 0,
      popUv: 0,
    },
    random,
  );
  const stepUv = 4000 / 65535;
  return {
    rateHz,
    stepUv,
    railUv: 2000,
    signal: signal.map((uv) => Math.max(-2000, Math.min(2000, Math.round(uv / stepUv) * stepUv))),
  };
}

export interface Found {
  readonly timesS: readonly number[];
  /** The spans for the heart that the program proposes in the end. */
  readonly proposed: readonly Interval[];
  /** What the doubts of these beats are read from. */
  readonly doubted: BeatDoubtsInput;
}

/** Beats as the program finds them: separation by the default route, its own spoiled spans, then detection. */
export function findAsProgram({ signal, rateHz, stepUv, railUv }: LeadToScore): Found {
  const separation = createSeparation({
    lead: leadKey(LEAD),
    rateHz,
    sampleCount: signal.length,
    settings: DEFAULT_SETTINGS,
    routes: ALL_ROUTES,
    wants: { slow: false, heart: true },
  });
  const watch = createSpoilWatch({
    lead: leadKey(LEAD),
    rateHz,
    railsUv: [-railUv, railUv],
    stepUv,
  });
  for (let from = 0; from < signal.length; from += PIECE) {
    separation.push(signal.subarray(from, from + PIECE));
    watch.push(signal.subarray(from, from + PIECE));
  }
  const { heart } = separation.finish();
  if (!heart) throw new Error('the heartbeat was wanted');
  const spans = watch.finish();
  const doubted = doubtedOf(LEAD, spans);
  const empty = spans.filter((span) => span.target !== 'stomach' && !doubted.includes(span));
  const ticksPerSample = TICKS_PER_SAMPLE * heart.decimation;
  const detection = detectBeats({
    heartbeat: heart.heartbeat,
    rateHz: heart.rateHz,
    ticksPerSample,
    excluded: joinIntervals(empty),
    doubted,
  });
  const { beats, legible } = detection;
  const kept = judgedSpans(spans, doubted, legible).filter(({ target }) => target !== 'stomach');
  const blocked = joinIntervals(kept);
  return {
    timesS: Array.from(beats.ticks, (tick) => tick / (TICKS_PER_SAMPLE * rateHz)),
    proposed: blocked,
    doubted: {
      beats,
      rateHz,
      heartbeat: heart.heartbeat,
      heartbeatHz: heart.rateHz,
      ticksPerSample,
      blocked,
      detection,
    },
  };
}
