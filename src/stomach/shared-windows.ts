import type { Cpm } from '../units/rate';
import { type OverBackground, overBackground } from './over-background';
import { type SmoothLevel, smoothLevel } from './smooth-level';
import { type PreparedWindow, type WindowSpectraOptions, windowSpectra } from './window-spectrum';

/** Windows of one length of one lead, each made once however many ask for it. */
export interface SharedWindows {
  readonly options: WindowSpectraOptions;
  /** What has been made so far, by first sample. */
  readonly made: ReadonlyMap<number, MadeWindow>;
  readonly binCpm: number;
  readonly binCount: number;
  /** The window that begins at a sample; `first` is moved back where it would run past the end. */
  at(first: number): PreparedWindow;
  densityAt(first: number): Float64Array;
  /** Its density over its own background line; where it has holes, with these bridged. */
  overAt(first: number): OverBackground;
  readonly smooth: SmoothLevel;
  /** Density of the window that begins at a sample with lines at these frequencies taken off; not kept. */
  densityWithout(first: number, frequenciesCpm: readonly Cpm[]): Float64Array;
}

interface MadeWindow {
  readonly window: PreparedWindow;
  density: Float64Array | null;
  over: OverBackground | null;
}

const sameLead = (a: WindowSpectraOptions, b: WindowSpectraOptions) =>
  a.signal === b.signal &&
  a.rateHz === b.rateHz &&
  a.lengthS === b.lengthS &&
  a.powerResponse === b.powerResponse;

/** Windows made before for the same lead in which nothing was spoiled or restored since. */
function stillGood(options: WindowSpectraOptions, before: SharedWindows, length: number) {
  const good = new Map<number, MadeWindow>();
  if (!sameLead(options, before.options)) return good;
  const [now, then] = [options.kept, before.options.kept];
  for (const [first, made] of before.made) {
    let i = first;
    while (i < first + length && now[i] === then[i]) i += 1;
    if (i === first + length) good.set(first, made);
  }
  return good;
}

/**
 * Epochs and the picture's columns often lie on the same samples; this keeps them from being made
 * twice. Given the windows made before of the same lead, those no edit has touched are taken over.
 */
export function sharedWindows(
  options: WindowSpectraOptions,
  before: SharedWindows | null = null,
): SharedWindows {
  const spectra = windowSpectra(options);
  const length = spectra.taper.length;
  const last = options.signal.length - length;
  const made = before ? stillGood(options, before, length) : new Map<number, MadeWindow>();
  const smooth = smoothLevel(spectra.binCpm, spectra.binCount);
  const madeAt = (first: number): MadeWindow => {
    const from = Math.min(first, last);
    let one = made.get(from);
    if (!one) {
      one = { window: spectra.prepare(from), density: null, over: null };
      made.set(from, one);
    }
    return one;
  };
  const densityAt = (first: number) => {
    const one = madeAt(first);
    one.density ??= spectra.density(one.window);
    return one.density;
  };
  return {
    options,
    made,
    smooth,
    binCpm: spectra.binCpm,
    binCount: spectra.binCount,
    at: (first) => madeAt(first).window,
    densityAt,
    overAt(first) {
      const one = madeAt(first);
      one.over ??= overBackground(
        one.window.spoiledFraction > 0 ? spectra.densityBridged(one.window) : densityAt(first),
        smooth,
      );
      return one.over;
    },
    densityWithout: (first, frequenciesCpm) =>
      spectra.densityWithout(madeAt(first).window, frequenciesCpm),
  };
}
