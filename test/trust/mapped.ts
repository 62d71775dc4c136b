import { atOnce } from '../../src/numeric/in-steps';
import { cubicSpline } from '../../src/numeric/spline';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import {
  MAP_ORDERS,
  MAP_WINDOWS_MS,
  type MapOrgan,
  type MapScore,
} from '../../src/recording/settings-map';
import { foldedLead, fractionalResponses } from '../../src/separate/route-responses';
import { createSeparation } from '../../src/separate/separation';
import { simulateSources } from '../../src/simulate/simulate-study';
import { PLAIN_LEAD, PLAIN_STUDY, type SimulationSpec } from '../../src/simulate/spec';
import { readyStretch } from '../../src/trust/match-score';
import { scoreMapInSteps } from '../../src/trust/score-map';
import { stretchProducts } from '../../src/trust/stretch-products';
import { ALL_ROUTES } from '../separate/all-routes';

/** A lead and the part of it that is known, at the lead's own rate. */
export interface Mixture {
  readonly lead: Float64Array;
  readonly target: Float64Array;
  readonly rateHz: number;
}

/** A wave of 100 uV about 3 cpm, beats of 250 uV, breathing, 1/f background, hum, muscle and white noise. */
export const TYPICAL: SimulationSpec = {
  ...PLAIN_STUDY,
  seed: 5,
  leads: [{ ...PLAIN_LEAD, heartUv: 250 }],
  slowWave: PLAIN_STUDY.slowWave && {
    ...PLAIN_STUDY.slowWave,
    amplitudeUv: 100,
    harmonics: [],
    wanderCpm: 0.1,
  },
};

export function mixtureOf(organ: MapOrgan, spec: SimulationSpec): Mixture {
  const [sources] = simulateSources(spec).leads;
  const target = sources[organ === 'slow' ? 'slow wave' : 'heartbeat'];
  const lead = new Float64Array(target.length);
  for (const source of Object.values(sources))
    for (let i = 0; i < lead.length; i += 1) lead[i] += source[i];
  return { lead, target, rateHz: spec.rateHz };
}

/** Farthest that a drawn signal is moved against what is known. */
export const MOST_AHEAD_S: Readonly<Record<MapOrgan, number>> = { slow: 5, heart: 0.03 };

/** The map from the spectra; `passedBy` is the organ whose low-pass and rate count. */
export function mapOf(
  organ: MapOrgan,
  { lead, target, rateHz }: Mixture,
  passedBy: MapOrgan = organ,
): readonly (readonly MapScore[])[] {
  const x = atOnce(foldedLead(passedBy, lead, rateHz));
  const s = atOnce(foldedLead(passedBy, target, rateHz));
  const products = stretchProducts(s.samples, x.samples, x.rateHz);
  const ask = { organ: passedBy, rateHz, freqsHz: products.freqsHz };
  const factors = fractionalResponses(DEFAULT_SETTINGS.fractional, ask);
  const stretch = readyStretch(products, MOST_AHEAD_S[organ]);
  return atOnce(scoreMapInSteps(stretch, factors, MAP_ORDERS, MAP_WINDOWS_MS[organ]));
}

/** What route fractional itself draws of a lead. */
export function drawnBy(
  organ: MapOrgan,
  { lead, rateHz }: Mixture,
  order: number,
  windowMs: number,
) {
  const separation = createSeparation({
    lead: '1',
    rateHz,
    sampleCount: lead.length,
    settings: {
      ...DEFAULT_SETTINGS,
      slowRoute: 'fractional',
      heartRoute: 'fractional',
      fractional: {
        ...DEFAULT_SETTINGS.fractional,
        order,
        slowWindowMs: windowMs,
        heartWindowMs: windowMs,
      },
    },
    routes: ALL_ROUTES,
    wants: { slow: organ === 'slow', heart: organ === 'heart' },
  });
  separation.push(lead);
  const { slow, heart } = separation.finish();
  if (slow) return { drawn: slow.forSpectra, rateHz: slow.rateHz };
  if (heart) return { drawn: Float64Array.from(heart.heartbeat), rateHz: heart.rateHz };
  throw new Error('one output was wanted');
}

const RAMP_S = 60;

/** The known signal moved by each delay that is tried, read between samples, and the weights of the ends. */
export function timeScorer(organ: MapOrgan, target: Float64Array, rateHz: number) {
  const n = target.length;
  const ramp = Math.min(RAMP_S * rateHz, n / 4);
  const weights = Float64Array.from({ length: n }, (_, i) => {
    const fromEnd = Math.min(i, n - 1 - i) + 0.5;
    return fromEnd < ramp ? (0.5 - 0.5 * Math.cos((Math.PI * fromEnd) / ramp)) ** 2 : 1;
  });
  const most = MOST_AHEAD_S[organ];
  const lagS = most / 40;
  const curve = cubicSpline(
    target.map((_, i) => i / rateHz),
    target,
  );
  const last = (n - 1) / rateHz;
  const moved = Array.from({ length: 81 }, (_, k) =>
    curve(target.map((_, i) => Math.max(0, Math.min(last, i / rateHz + (k - 40) * lagS)))),
  );
  /** rho^2 / (1 - rho^2) in dB at the best of the delays, the crest read by a parabola. */
  return (drawn: Float64Array): number => {
    const rho = moved.map((known) => correlation(drawn, known, weights));
    const best = rho.indexOf(Math.max(...rho));
    const [a, b, c] = [rho[best - 1] ?? rho[best], rho[best], rho[best + 1] ?? rho[best]];
    const bend = a - 2 * b + c;
    const crest = best > 0 && best < 80 && bend < 0 ? b - (a - c) ** 2 / (8 * bend) : b;
    return 10 * Math.log10(crest ** 2 / (1 - crest ** 2));
  };
}

function correlation(a: Float64Array, b: Float64Array, weights: Float64Array): number {
  let [w, sumA, sumB, aa, bb, ab] = [0, 0, 0, 0, 0, 0];
  for (let i = 0; i < b.length; i += 1) {
    const weight = weights[i];
    w += weight;
    sumA += weight * a[i];
    sumB += weight * b[i];
    aa += weight * a[i] * a[i];
    bb += weight * b[i] * b[i];
    ab += weight * a[i] * b[i];
  }
  return (ab - (sumA * sumB) / w) / Math.sqrt((aa - (sumA * sumA) / w) * (bb - (sumB * sumB) / w));
}
