import { type PreparedWindow, type WindowSpectraOptions, windowSpectra } from './window-spectrum';

/** Windows of one length of one lead, each made once however many ask for it. */
export interface SharedWindows {
  readonly binCpm: number;
  readonly binCount: number;
  /** The window that begins at a sample; `first` is moved back where it would run past the end. */
  at(first: number): PreparedWindow;
  densityAt(first: number): Float64Array;
}

/** Epochs and the picture's columns often lie on the same samples; this keeps them from being made twice. */
export function sharedWindows(options: WindowSpectraOptions): SharedWindows {
  const spectra = windowSpectra(options);
  const last = options.signal.length - spectra.taper.length;
  const prepared = new Map<number, PreparedWindow>();
  const densities = new Map<number, Float64Array>();
  const at = (first: number) => {
    const from = Math.min(first, last);
    const known = prepared.get(from);
    if (known) return known;
    const window = spectra.prepare(from);
    prepared.set(from, window);
    return window;
  };
  return {
    binCpm: spectra.binCpm,
    binCount: spectra.binCount,
    at,
    densityAt(first) {
      const from = Math.min(first, last);
      const known = densities.get(from);
      if (known) return known;
      const density = spectra.density(at(from));
      densities.set(from, density);
      return density;
    },
  };
}
