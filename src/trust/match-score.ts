import { cos, log10, sin } from '../numeric/elementary';
import type { Seconds } from '../units/time';
import type { StretchProducts } from './stretch-products';

/** How well a drawn signal matches what is known. */
export interface MatchScore {
  /** Power of what follows the known signal over power of the rest, in the drawn signal, dB; from -20 to 60. */
  readonly snrDb: number;
  /** Seconds the drawn signal is ahead. */
  readonly aheadS: Seconds;
}

/** Products behind a response. */
export interface FilteredProducts {
  /** |H|^2 times the lead's power. */
  readonly power: Float64Array;
  /** H times the cross products. */
  readonly crossRe: Float64Array;
  readonly crossIm: Float64Array;
}

/** Delays are tried at so many places; between them the crest is found by its slope and curvature. */
const PLACES = 41;
/** Groups whose product is below this share of the largest say nothing of the delay. */
const LEAST_SHARE = 1e-3;
/** Nothing in common, or all of it, is not written beyond these. */
const LIMITS_DB = [-20, 60] as const;

/** What the search for the best delay uses of one stretch, whatever the route; made once for all cells. */
interface DelayTable {
  readonly stepS: Seconds;
  readonly firstS: Seconds;
  /** Groups that tell of the delay, neighbours joined; `of[g]` is the joined group of group g, -1 for none. */
  readonly of: Int32Array;
  readonly count: number;
  /** cos and sin of 2 pi f tau, tau by tau, one value a joined group. */
  readonly cosines: readonly Float64Array[];
  readonly sines: readonly Float64Array[];
}

/** The delays to be tried on a stretch. */
function delayTable({ freqsHz, crossRe, crossIm }: StretchProducts, mostS: Seconds): DelayTable {
  const widthHz = 0.01 / mostS;
  const sizes = freqsHz.map((_, g) => Math.hypot(crossRe[g], crossIm[g]));
  const least = LEAST_SHARE * sizes.reduce((most, size) => Math.max(most, size), 0);
  const of = new Int32Array(freqsHz.length).fill(-1);
  const sums: { hz: number; weight: number; fromHz: number }[] = [];
  freqsHz.forEach((hz, g) => {
    if (!(sizes[g] >= least)) return;
    const last = sums.at(-1);
    if (last && hz - last.fromHz < widthHz) {
      last.hz += sizes[g] * hz;
      last.weight += sizes[g];
    } else sums.push({ hz: sizes[g] * hz, weight: sizes[g], fromHz: hz });
    of[g] = sums.length - 1;
  });
  const stepS = (2 * mostS) / (PLACES - 1);
  const turns = sums.map(({ hz, weight }) => (weight > 0 ? (2 * Math.PI * hz) / weight : 0));
  const at = (place: number) => turns.map((turn) => turn * (place * stepS - mostS));
  const places = Array.from({ length: PLACES }, (_, place) => at(place));
  return {
    stepS,
    firstS: -mostS,
    of,
    count: sums.length,
    cosines: places.map((angles) => Float64Array.from(angles, cos)),
    sines: places.map((angles) => Float64Array.from(angles, sin)),
  };
}

/** Place of the delay at which the products, weighted by a gain, agree best. */
function bestPlace(
  { crossRe, crossIm }: FilteredProducts,
  gain: Float64Array,
  { of, count, cosines, sines }: DelayTable,
): number {
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  for (let g = 0; g < of.length; g += 1) {
    if (of[g] < 0) continue;
    re[of[g]] += gain[g] * crossRe[g];
    im[of[g]] += gain[g] * crossIm[g];
  }
  let best = 0;
  let most = Number.NEGATIVE_INFINITY;
  for (let place = 0; place < cosines.length; place += 1) {
    const [c, s] = [cosines[place], sines[place]];
    let sum = 0;
    for (let j = 0; j < count; j += 1) sum += re[j] * c[j] + im[j] * s[j];
    if (sum > most) [best, most] = [place, sum];
  }
  return best;
}

/** Angles of every group at every delay tried; the finest table, made once a stretch. */
interface TurnTable {
  readonly cosines: readonly Float64Array[];
  readonly sines: readonly Float64Array[];
}

/** cos and sin of 2 pi f tau for all groups and delays, by turning from one delay to the next. */
function turnTable({ freqsHz }: StretchProducts, { stepS, firstS }: DelayTable): TurnTable {
  const step = freqsHz.map((hz) => 2 * Math.PI * hz * stepS);
  const [stepCos, stepSin] = [step.map(cos), step.map(sin)];
  const first = freqsHz.map((hz) => 2 * Math.PI * hz * firstS);
  const cosines = [first.map(cos)];
  const sines = [first.map(sin)];
  for (let place = 1; place < PLACES; place += 1) {
    const [c, s] = [cosines[place - 1], sines[place - 1]];
    cosines.push(c.map((value, g) => value * stepCos[g] - s[g] * stepSin[g]));
    sines.push(s.map((value, g) => value * stepCos[g] + c[g] * stepSin[g]));
  }
  return { cosines, sines };
}

/** A stretch made ready for any number of routes. */
export interface ReadyStretch {
  readonly products: StretchProducts;
  readonly delays: DelayTable;
  readonly turns: TurnTable;
}

/** Makes a stretch ready to be scored; a drawn signal may be up to `mostS` ahead or behind. */
export function readyStretch(products: StretchProducts, mostS: Seconds): ReadyStretch {
  const delays = delayTable(products, mostS);
  return { products, delays, turns: turnTable(products, delays) };
}

/** Products behind a response: H at each group's frequency. */
export function filtered(
  { power, crossRe, crossIm }: StretchProducts,
  re: Float64Array,
  im: Float64Array,
): FilteredProducts {
  const made = {
    power: new Float64Array(power.length),
    crossRe: new Float64Array(power.length),
    crossIm: new Float64Array(power.length),
  };
  for (let g = 0; g < power.length; g += 1) {
    made.power[g] = (re[g] * re[g] + im[g] * im[g]) * power[g];
    made.crossRe[g] = re[g] * crossRe[g] - im[g] * crossIm[g];
    made.crossIm[g] = re[g] * crossIm[g] + im[g] * crossRe[g];
  }
  return made;
}

/** rho^2 / (1 - rho^2) in dB from rho^2 = both / all, within the limits. */
function decibels(both: number, all: number): number {
  if (!(both > 0 && all > 0)) return LIMITS_DB[0];
  const ratio = both / Math.max(1e-12 * both, all - both);
  return Math.max(LIMITS_DB[0], Math.min(LIMITS_DB[1], 10 * log10(ratio)));
}

/**
 * Score of the route that `by` is behind followed by a real gain, from the products alone (Parseval): what the drawn signal
 * holds of the target after the best scale above 0 and the best delay, over what else it holds: 10 log10 of
 * rho^2 / (1 - rho^2) with rho their correlation.
 */
export function scoreOf(
  { products, delays, turns }: ReadyStretch,
  by: FilteredProducts,
  gain: Float64Array,
): MatchScore {
  const place = bestPlace(by, gain, delays);
  const { freqsHz, targetPower } = products;
  const [c, s] = [turns.cosines[place], turns.sines[place]];
  let [power, level, slope, curve] = [0, 0, 0, 0];
  for (let g = 0; g < freqsHz.length; g += 1) {
    const turn = 2 * Math.PI * freqsHz[g];
    const re = gain[g] * (by.crossRe[g] * c[g] + by.crossIm[g] * s[g]);
    const im = gain[g] * (by.crossIm[g] * c[g] - by.crossRe[g] * s[g]);
    power += gain[g] * gain[g] * by.power[g];
    level += re;
    slope += turn * im;
    curve -= turn * turn * re;
  }
  const off = curve < 0 ? -slope / curve : 0;
  const inside = Math.abs(off) <= delays.stepS;
  const most = Math.max(0, inside ? level + (slope * off) / 2 : level);
  return {
    snrDb: decibels(most * most, power * targetPower),
    aheadS: delays.firstS + place * delays.stepS + (inside ? off : 0),
  };
}
