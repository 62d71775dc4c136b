import { fitLine } from './detrend';

/** A window of a signal with holes, made ready for a periodogram. */
export interface ZeroedWindow {
  /** The kept samples less the line fitted to them; 0 in the holes. */
  readonly samples: Float64Array;
  /** Sum of the taper over the kept samples. */
  readonly keptTaper: number;
}

/**
 * A window whose holes are set to 0 once the line of what is kept (`kept` not 0) is taken off. Its periodogram leaks less than
 * one with the line left in; the power of a line in it is that of the whole window times (keptTaper / sum of the taper)^2. All
 * three arrays are of one length; what stands in the holes may be NaN.
 */
export function zeroedWindow(
  window: Float64Array,
  kept: Uint8Array,
  taper: Float64Array,
): ZeroedWindow {
  const line = fitLine(window, kept);
  const samples = new Float64Array(window.length);
  let keptTaper = 0;
  for (let i = 0; i < samples.length; i++) {
    if (kept[i] === 0) continue;
    samples[i] = window[i] - line.mean - line.slope * (i - line.centre);
    keptTaper += taper[i];
  }
  return { samples, keptTaper };
}
