import { atOnce } from '../../src/numeric/in-steps';
import { createRandom } from '../../src/numeric/random';
import { beatCourse } from '../../src/trust/beat-course';
import { type Modulation, phaseModulation } from '../../src/trust/phase-modulation';
import { slowPhase } from '../../src/trust/slow-phase';

/** Invented minutes of both rhythms with what ties them known; frequencies and amplitudes wander like real ones. */
export interface BothSpec {
  readonly seed: number;
  readonly minutes?: number;
  readonly dfCpm?: number;
  /** Standard deviation of the slow wave's frequency, correlated over two minutes. */
  readonly wanderCpm?: number;
  /** Peak of what the slow wave's phase does to RR, in percent, and the phase at which RR is longest. */
  readonly depthPct?: number;
  readonly longestRad?: number;
  /** Area of a beat in the lead in uV s. */
  readonly beatAreaUvS?: number;
  readonly slowUv?: number;
  readonly noiseUv?: number;
  /** Peak of RR's own wave in ms, and its rate: near 0.1 Hz unless given. */
  readonly wavesMs?: number;
  readonly wavesHz?: number;
}

export interface BothRhythms {
  readonly lead: Float64Array;
  readonly beatTimesS: Float64Array;
  readonly rrMs: Float64Array;
}

export const RATE_HZ = 4;
const RR_MS = 900;

/** Standard normal numbers that forget themselves over `memory` steps. */
function wandering(random: { gaussian(): number }, memory: number): () => number {
  const keep = 1 - 1 / memory;
  let value = random.gaussian();
  return () => {
    value = keep * value + Math.sqrt(1 - keep * keep) * random.gaussian();
    return value;
  };
}

/** Cycles of a wave of a rate in Hz that wanders by a part of it. */
function cyclesOf(
  random: { gaussian(): number; uniform(): number },
  length: number,
  hz: number,
  spreadHz: number,
  memoryS: number,
): Float64Array {
  const drift = wandering(random, memoryS * RATE_HZ);
  let cycles = random.uniform();
  return Float64Array.from({ length }, () => {
    cycles += (hz + spreadHz * drift()) / RATE_HZ;
    return cycles;
  });
}

export function bothRhythms(spec: BothSpec): BothRhythms {
  const { seed, minutes = 30, dfCpm = 3, wanderCpm = 0.1, depthPct = 0, longestRad = 1 } = spec;
  const { beatAreaUvS = 0, slowUv = 100, noiseUv = 25, wavesMs = 18, wavesHz = 0.1 } = spec;
  const random = createRandom(seed);
  const length = minutes * 60 * RATE_HZ;
  const slow = cyclesOf(random, length, dfCpm / 60, wanderCpm / 60, 120);
  const breath = cyclesOf(random, length, 0.25, 0.012, 20);
  const waves = cyclesOf(random, length, wavesHz, 0.15 * wavesHz, 15);
  const height = wandering(random, 20 * RATE_HZ);
  const trend = wandering(random, 60 * RATE_HZ);
  const course = Float64Array.from(slow, (cycles, i) => {
    const turn = 2 * Math.PI;
    return (
      RR_MS +
      25 * Math.sin(turn * breath[i]) +
      wavesMs * (1 + 0.3 * height()) * Math.sin(turn * waves[i]) +
      12 * trend() +
      RR_MS * (depthPct / 100) * Math.cos(turn * cycles - longestRad)
    );
  });
  const beatTimesS: number[] = [0.3];
  const rrMs: number[] = [];
  for (;;) {
    const at = beatTimesS[beatTimesS.length - 1];
    const rr = course[Math.min(length - 1, Math.round(at * RATE_HZ))] + 8 * random.gaussian();
    if (at + rr / 1000 >= length / RATE_HZ) break;
    beatTimesS.push(at + rr / 1000);
    rrMs.push(rr);
  }
  const noise = wandering(random, 12 * RATE_HZ);
  const lead = Float64Array.from(
    slow,
    (cycles) => slowUv * Math.cos(2 * Math.PI * cycles) + noiseUv * noise() + 500,
  );
  for (let k = 0; k < beatTimesS.length; k += 1) {
    const place = Math.round(beatTimesS[k] * RATE_HZ * 16) / 16;
    const left = Math.floor(place);
    lead[left] += (1 - (place - left)) * beatAreaUvS * RATE_HZ;
    if (left + 1 < length) lead[left + 1] += (place - left) * beatAreaUvS * RATE_HZ;
  }
  return { lead, beatTimesS: Float64Array.from(beatTimesS), rrMs: Float64Array.from(rrMs) };
}

/** Modulation of RR in invented minutes, all of them kept, the way the pipeline takes it. */
export function modulationIn(
  { lead, beatTimesS, rrMs }: BothRhythms,
  dfCpm = 3,
  surrogates = 500,
): Modulation {
  const kept = new Uint8Array(lead.length).fill(1);
  const { phase, usable } = atOnce(slowPhase(lead, kept, RATE_HZ, dfCpm));
  const middles = rrMs.map((one, i) => beatTimesS[i] + one / 2000);
  const grid = { firstS: 0, rateHz: RATE_HZ, length: lead.length };
  const course = atOnce(beatCourse(middles, rrMs, grid));
  const found = atOnce(phaseModulation({ phase, usable, course, rateHz: RATE_HZ }, surrogates));
  if (!found) throw new Error('no modulation can be computed');
  return found;
}
