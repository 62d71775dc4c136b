import type { Settings } from '../recording/settings';
import { type EpochInput, type EpochRhythm, epochRhythm } from './epoch-rhythm';
import type { OverBackground } from './over-background';
import type { SharedWindows } from './shared-windows';

interface Judged {
  readonly circumstances: string;
  /** The row it was judged in. */
  readonly row: readonly OverBackground[];
  readonly rhythm: EpochRhythm;
}

/** What one lead's analysis leaves for the next of the same lead: windows, spectra, judged epochs. */
export interface StomachMemory {
  windows: SharedWindows | null;
  halfWindows: SharedWindows | null;
  /** By the epoch's spectrum, which is made anew when anything in the epoch changes. */
  readonly judged: WeakMap<Float64Array, Judged>;
}

/** An empty memory; use one a lead. */
export function createStomachMemory(): StomachMemory {
  return { windows: null, halfWindows: null, judged: new WeakMap() };
}

/** epochRhythm, taken from memory where spectrum, crests, breathing and settings are as before. */
export function judgedEpoch(
  memory: StomachMemory,
  input: EpochInput,
  settings: Settings,
): EpochRhythm {
  const circumstances = JSON.stringify([
    input.crestCpm,
    input.breathing,
    settings.rhythmBands,
    settings.epoch,
  ]);
  const known = memory.judged.get(input.density);
  const row = input.row?.windows.map(({ over }) => over) ?? [];
  const sameRow = known?.row.length === row.length && row.every((one, i) => one === known.row[i]);
  if (known && sameRow && known.circumstances === circumstances) return known.rhythm;
  const rhythm = epochRhythm(input, settings);
  memory.judged.set(input.density, { circumstances, row, rhythm });
  return rhythm;
}
