import { exp, log, log10 } from '../numeric/elementary';
import type { Microvolts } from '../units/voltage';

/** A wave is shown by a recording where it is found in this share of its epochs. */
export const FOUND_SHARE = 0.95;
/** No wave larger than this is tried: the stomach's are 50 to 500 uV. */
export const LARGEST_UV: Microvolts = 1000;
const SMALLEST_UV: Microvolts = 0.5;
/** From one size to the next until the answer lies between two, and how often what lies between is halved. */
const FACTOR = 2;
const HALVINGS = 4;

/** Share of epochs in which a wave of some size was found. */
export interface TriedWave {
  readonly uv: Microvolts;
  readonly share: number;
}

/** The shares made to rise with the size: pooled where a larger wave was found less often (Ayer et al. 1955). */
export function risingShares(tried: readonly TriedWave[]): readonly TriedWave[] {
  const pools: { sum: number; sizes: Microvolts[] }[] = [];
  for (const { uv, share } of [...tried].sort((a, b) => a.uv - b.uv)) {
    pools.push({ sum: share, sizes: [uv] });
    for (;;) {
      const [before, last] = [pools.at(-2), pools.at(-1)];
      if (!before || !last || before.sum / before.sizes.length <= last.sum / last.sizes.length)
        break;
      before.sum += last.sum;
      before.sizes.push(...last.sizes);
      pools.pop();
    }
  }
  return pools.flatMap(({ sum, sizes }) => sizes.map((uv) => ({ uv, share: sum / sizes.length })));
}

/** The size at which rising shares reach FOUND_SHARE, straight between two of them in the size's logarithm; null where none does. */
export function reachedAt(tried: readonly TriedWave[]): Microvolts | null {
  const rising = risingShares(tried);
  const at = rising.findIndex(({ share }) => share >= FOUND_SHARE);
  if (at < 0) return null;
  const [before, after] = [rising[at - 1], rising[at]];
  if (!before || !(after.share > before.share)) return after.uv;
  const part = (FOUND_SHARE - before.share) / (after.share - before.share);
  return exp(log(before.uv) + part * (log(after.uv) - log(before.uv)));
}

/** Size to two significant digits, as it is shown. */
export function twoDigits(uv: Microvolts): Microvolts {
  const unit = exp((Math.floor(log10(uv)) - 1) * log(10));
  return Number((Math.round(uv / unit) * unit).toPrecision(2));
}

/**
 * The smallest wave found in 95 % of epochs, by trying sizes: doubled or halved from a first guess until the answer lies between
 * two, which are halved four times in the logarithm; then a rising course through all that was tried. `uv` is null where not
 * even 1000 uV are enough.
 */
export async function smallestWave(
  firstUv: Microvolts,
  shareFound: (uv: Microvolts) => Promise<number>,
): Promise<{ readonly uv: Microvolts | null; readonly mostShare: number }> {
  const tried: TriedWave[] = [];
  const isEnough = async (uv: Microvolts): Promise<boolean> => {
    const share = await shareFound(uv);
    tried.push({ uv, share });
    return share >= FOUND_SHARE;
  };
  const first = Math.min(LARGEST_UV, Math.max(SMALLEST_UV, firstUv));
  let [enough, less] = [Number.NaN, Number.NaN];
  if (await isEnough(first)) {
    enough = first;
    for (let uv = first / FACTOR; uv >= SMALLEST_UV; uv /= FACTOR) {
      if (!(await isEnough(uv))) {
        less = uv;
        break;
      }
      enough = uv;
    }
  } else {
    less = first;
    for (let uv = first; uv < LARGEST_UV; ) {
      uv = Math.min(LARGEST_UV, uv * FACTOR);
      if (await isEnough(uv)) {
        enough = uv;
        break;
      }
      less = uv;
    }
  }
  if (Number.isFinite(enough) && Number.isFinite(less))
    for (let k = 0; k < HALVINGS; k += 1) {
      const middle = Math.sqrt(enough * less);
      if (await isEnough(middle)) enough = middle;
      else less = middle;
    }
  return { uv: reachedAt(tried), mostShare: Math.max(...tried.map(({ share }) => share)) };
}
