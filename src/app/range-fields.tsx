import { openBeats, selectedTicks } from '../review/open-beats';
import type { TimeWindow } from '../review/view-store';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import { readTypedTime, type TimeFrame, typedTimeFault } from '../units/typed-time';
import type { AppParts } from './app-context';
import { TimeField } from './time-field';

/** A stretch as it is being typed. */
export interface RangeDraft {
  readonly from: string;
  readonly to: string;
}

/** A typed stretch, or what is wrong with either field. */
export type RangeRead =
  | { readonly ok: true; readonly window: TimeWindow }
  | { readonly ok: false; readonly from: string | null; readonly to: string | null };

/** The stretch that a dialog begins with: of two or more selected beats theirs, else what Seconds shows. */
export function rangeAtFirst(parts: Pick<AppParts, 'view' | 'session' | 'analysis'>): RangeDraft {
  const open = openBeats(parts);
  const ticks = selectedTicks(parts);
  const { seconds } = parts.view.getState();
  const selected = open && ticks.length > 1;
  const fromS = selected ? ticksToSeconds(ticks[0], open.rateHz) : seconds.fromS;
  const toS = selected ? ticksToSeconds(ticks[ticks.length - 1], open.rateHz) : seconds.toS;
  return {
    from: formatClock(Math.floor(fromS * 10) / 10, 1),
    to: formatClock(Math.ceil(toS * 10) / 10, 1),
  };
}

/** Reads a typed stretch of a study. */
export function readRange({ from, to }: RangeDraft, frame: TimeFrame): RangeRead {
  const [first, last] = [readTypedTime(from, frame), readTypedTime(to, frame)];
  if (!('atS' in first) || !('atS' in last))
    return { ok: false, from: typedTimeFault(from, frame), to: typedTimeFault(to, frame) };
  return last.atS > first.atS
    ? { ok: true, window: { fromS: first.atS, toS: last.atS } }
    : { ok: false, from: null, to: 'The end must come after the beginning.' };
}

interface RangeFieldsProps {
  readonly draft: RangeDraft;
  readonly onDraft: (draft: RangeDraft) => void;
  readonly frame: TimeFrame;
  readonly faults: { readonly from: string | null; readonly to: string | null } | null;
}

/** The two times of a stretch. */
export function RangeFields({ draft, onDraft, frame, faults }: RangeFieldsProps) {
  return (
    <div className="field-grid range-fields">
      <TimeField
        label="From"
        value={draft.from}
        frame={frame}
        onChange={(from) => onDraft({ ...draft, from })}
        autoFocus
        error={faults?.from}
      />
      <TimeField
        label="To"
        value={draft.to}
        frame={frame}
        onChange={(to) => onDraft({ ...draft, to })}
        error={faults?.to}
      />
    </div>
  );
}
