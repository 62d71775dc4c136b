import { readFileSync } from 'node:fs';

/** Numbers made by test/reference/heart-variability.py with numpy and scipy. */
export interface HeartReference {
  readonly rate_hz: number;
  readonly lists: readonly {
    readonly ticks: readonly number[];
    readonly classes: string;
    readonly expected: Readonly<Record<string, number>>;
  }[];
  readonly spectra: readonly {
    readonly timesS: readonly number[];
    readonly rrMs: readonly number[];
    readonly lomb: { readonly lf: number; readonly hf: number };
    readonly welch: { readonly lf: number; readonly hf: number } | null;
  }[];
  readonly floors: readonly {
    readonly sdMs: number;
    readonly meanMs: number;
    readonly hfMs2: number;
    readonly hfDrawnMs2: number;
    readonly rmssdDrawnMs: number;
  }[];
}

export const HEART_REFERENCE: HeartReference = JSON.parse(
  readFileSync(new URL('../reference/heart-variability.json', import.meta.url), 'utf8'),
);
