import type { SignalAccess } from './analysis-store';
import { fittedGain } from './gain';
import type { SignalRow } from './rows';
import type { TimeWindow } from './view-store';

const COLUMNS_PER_WINDOW = 60;
const MOST_COLUMNS = 4000;

/** Gain in uV that fits a row over the whole study, looked at in windows as wide as the one given. Null where nothing came. */
export async function wholeStudyGain(
  signals: SignalAccess,
  { lead, signal, centred }: SignalRow,
  window: TimeWindow,
  durationS: number,
): Promise<number | null> {
  const windowS = window.toS - window.fromS;
  const wanted = Math.ceil((durationS / windowS) * COLUMNS_PER_WINDOW);
  const columns = Math.max(COLUMNS_PER_WINDOW, Math.min(MOST_COLUMNS, wanted));
  const found = await signals.columns({ lead, signal, fromS: 0, toS: durationS, columns });
  if (!found) return null;
  return fittedGain(found, (windowS / durationS) * found.low.length, centred);
}

/** Gain in uV that fits what a row shows in one window. Null where nothing came. */
export async function windowGain(
  signals: SignalAccess,
  { lead, signal, centred }: SignalRow,
  { fromS, toS }: TimeWindow,
): Promise<number | null> {
  const found = await signals.columns({ lead, signal, fromS, toS, columns: 500 });
  return found && fittedGain(found, found.low.length, centred);
}
