import { analyticSignal } from '../numeric/analytic-signal';
import { choleskySolve } from '../numeric/cholesky';
import { bandPassTaps, convolveSame } from '../numeric/fir';
import { median } from '../numeric/statistics';
import { hannPeriodic } from '../numeric/windows';
import { type Interval, joinIntervals } from '../recording/span';
import { cpmToHz, type Hertz } from '../units/rate';

/** Breathing is looked for between these; slower than four a minute is not parted from the slow wave by any reference. */
const BREATHING_CPM = [4, 30] as const;
const EDGE_CPM = 0.5;
const ATTENUATION_DB = 40;
/** How breathing shows in the lead is learned in windows this long, half overlapping, three together. */
const WINDOW_S = 60;
/** What windows a minute away foretell must be there by at least this part, over nine windows, to be taken out. */
const LEAST_REAL = 0.5;
const NEIGHBOURS = 4;
/** Where it is there in this part of the windows, it is taken out in all, so that it does not come and go. */
const MOSTLY = 0.7;
/** Windows to each side over which shares are usual, and how far from the usual they may lie, as a part of it. */
const USUAL_WINDOWS = 20;
const FARTHEST = 0.5;
const RIDGE = 1e-6;
/** Part of a window over which the reference must be known. */
const LEAST_KNOWN = 0.9;

/** A lead with its breathing taken out where that is real. */
export interface WithoutBreathing {
  readonly lead: Float64Array;
  /** Where something was taken out. */
  readonly takenOut: readonly Interval[];
}

/** Reference and its quarter-cycle neighbour, and the same for its second harmonic, of like size: the shapes breathing may take. */
function shapesOf(reference: Float64Array): readonly Float64Array[] {
  const analytic = analyticSignal(reference);
  const shapes = [0, 1, 2, 3].map(() => new Float64Array(reference.length));
  for (let i = 0; i < reference.length; i += 1) {
    const [re, im] = [analytic[2 * i], analytic[2 * i + 1]];
    const size = Math.hypot(re, im) + 1e-12;
    shapes[0][i] = re;
    shapes[1][i] = im;
    shapes[2][i] = (re * re - im * im) / size;
    shapes[3][i] = (2 * re * im) / size;
  }
  return shapes;
}

/** Products of the shapes with one another and with the lead in one window, under its taper. */
interface Products {
  readonly from: number;
  readonly among: Float64Array;
  readonly withLead: Float64Array;
}

function productsOf(
  lead: Float64Array,
  shapes: readonly Float64Array[],
  taper: Float64Array,
  from: number,
): Products {
  const n = shapes.length;
  const among = new Float64Array(n * n);
  const withLead = new Float64Array(n);
  for (let a = 0; a < n; a += 1) {
    for (let b = 0; b <= a; b += 1) {
      let sum = 0;
      for (let i = 0; i < taper.length; i += 1)
        sum += taper[i] * shapes[a][from + i] * shapes[b][from + i];
      among[a * n + b] = sum;
      among[b * n + a] = sum;
    }
    let sum = 0;
    for (let i = 0; i < taper.length; i += 1)
      sum += taper[i] * shapes[a][from + i] * lead[from + i];
    withLead[a] = sum;
  }
  return { from, among, withLead };
}

/** Least-squares shares of the shapes over some windows; zeros where there is no reference. */
function sharesOver(windows: readonly (Products | undefined)[]): Float64Array {
  const there = windows.filter((one) => one !== undefined);
  const n = 4;
  const among = new Float64Array(n * n);
  const shares = new Float64Array(n);
  for (const one of there) {
    one.among.forEach((value, i) => {
      among[i] += value;
    });
    one.withLead.forEach((value, i) => {
      shares[i] += value;
    });
  }
  let trace = 0;
  for (let a = 0; a < n; a += 1) trace += among[a * n + a];
  if (!(trace > 0)) return shares.fill(0);
  for (let a = 0; a < n; a += 1) among[a * n + a] += RIDGE * trace;
  choleskySolve(among, n, [shares]);
  return shares;
}

/** How much of the lead some shares explain in a window, and how large what they say is. */
function explained({ among, withLead }: Products, shares: Float64Array) {
  const n = shares.length;
  let [shared, size] = [0, 0];
  for (let a = 0; a < n; a += 1) {
    shared += shares[a] * withLead[a];
    for (let b = 0; b < n; b += 1) size += shares[a] * shares[b] * among[a * n + b];
  }
  return { explained: 2 * shared - size, size };
}

/** Windows in which what their neighbours foretell of breathing is really there. */
function realWindows(windows: readonly (Products | undefined)[]): boolean[] {
  const tests = windows.map((one, w) =>
    one ? explained(one, sharesOver([windows[w - 2], windows[w + 2]])) : { explained: 0, size: 0 },
  );
  const real = tests.map((test, w) => {
    if (test.size === 0) return false;
    let [sum, size] = [0, 0];
    for (const near of tests.slice(Math.max(0, w - NEIGHBOURS), w + NEIGHBOURS + 1)) {
      sum += near.explained;
      size += near.size;
    }
    return sum > LEAST_REAL * size;
  });
  const known = tests.filter(({ size }) => size > 0).length;
  const mostly = real.filter((one) => one).length >= MOSTLY * known;
  return mostly ? tests.map(({ size }) => size > 0) : real;
}

/**
 * Shares of each window, held to what is usual over some twenty minutes about it: where they lie further from that than half
 * of its size, the usual ones are taken. How breathing reaches a lead changes slowly; what comes at the breathing rate for a
 * few minutes is not breathing.
 */
function heldShares(windows: readonly (Products | undefined)[]): (Float64Array | null)[] {
  const own = windows.map((one, w) =>
    one ? sharesOver([windows[w - 1], one, windows[w + 1]]) : null,
  );
  return own.map((shares, w) => {
    if (!shares) return null;
    const near = own.slice(Math.max(0, w - USUAL_WINDOWS), w + USUAL_WINDOWS + 1);
    const there = near.filter((one) => one !== null);
    const usual = shares.map((_, a) => median(there.map((one) => one[a])));
    const apart = Math.hypot(shares[0] - usual[0], shares[1] - usual[1]);
    return apart > FARTHEST * Math.hypot(usual[0], usual[1]) ? usual : shares;
  });
}

function inBand(x: Float64Array, rateHz: Hertz): Float64Array {
  const [low, high] = BREATHING_CPM.map(cpmToHz);
  const edge = cpmToHz(EDGE_CPM);
  const top = Math.min(high, 0.4 * rateHz);
  const taps = bandPassTaps({
    rateHz,
    lowStopHz: low - edge,
    lowPassHz: low + edge,
    highPassHz: top - edge,
    highStopHz: top + edge,
    attenuationDb: ATTENUATION_DB,
  });
  return convolveSame(x, taps, 'reflect-odd');
}

/**
 * Takes breathing out of a lead by a reference at the same rate and of the same length (a breathing lead, or R height;
 * Chen 1989 and Komorowski 2015 do so by adaptive filters): in every half-overlapping minute what the lead shares with the
 * reference and its second harmonic, learned over two minutes about it, but only where what the minutes before and after
 * foretell is really there. A reference that tells nothing changes nothing. NaN of the reference count as no breathing.
 */
export function withoutBreathing(
  lead: Float64Array,
  reference: Float64Array,
  rateHz: Hertz,
): WithoutBreathing {
  const length = Math.round(WINDOW_S * rateHz);
  const step = Math.floor(length / 2);
  if (lead.length < 4 * length) return { lead, takenOut: [] };
  const known = reference.map((value) => (Number.isNaN(value) ? 0 : value));
  const shapes = shapesOf(inBand(known, rateHz));
  const band = inBand(lead, rateHz);
  const taper = hannPeriodic(2 * step);
  const windows: (Products | undefined)[] = [];
  for (let from = 0; from + taper.length <= lead.length; from += step) {
    const there = reference.subarray(from, from + taper.length).filter((one) => !Number.isNaN(one));
    const isKnown = there.length >= LEAST_KNOWN * taper.length;
    windows.push(isKnown ? productsOf(band, shapes, taper, from) : undefined);
  }
  const real = realWindows(windows);
  const held = heldShares(windows);
  const out = lead.slice();
  const takenOut: Interval[] = [];
  windows.forEach((one, w) => {
    const shares = held[w];
    if (!one || !shares || !real[w]) return;
    const { from } = one;
    for (let i = 0; i < taper.length; i += 1) {
      let breath = 0;
      for (let a = 0; a < shares.length; a += 1) breath += shares[a] * shapes[a][from + i];
      out[from + i] -= taper[i] * breath;
    }
    const middleS = (from + step) / rateHz;
    takenOut.push({ fromS: middleS - WINDOW_S / 4, toS: middleS + WINDOW_S / 4 });
  });
  return { lead: out, takenOut: joinIntervals(takenOut) };
}
