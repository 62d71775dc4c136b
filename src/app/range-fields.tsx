import { openBeats, selectedTicks } from '../review/open-beats';
import type { TimeWindow } from '../review/view-store';
import { ticksToSeconds } from '../units/ticks';
import { formatClock, parseClock } from '../units/time';
import type { AppParts } from './app-context';
import { Field } from './fields';

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

/** Reads a typed stretch inside a study. */
export function readRange({ from, to }: RangeDraft, durationS: number): RangeRead {
  const [fromS, toS] = [parseClock(from), parseClock(to)];
  const end = formatClock(durationS, 1);
  const fault = (atS: number | null) =>
    atS === null
      ? 'Type seconds, m:ss or h:mm:ss.'
      : atS > durationS + 0.1
        ? `The recording ends at ${end}.`
        : null;
  const wrong = { from: fault(fromS), to: fault(toS) };
  if (fromS === null || toS === null || wrong.from !== null || wrong.to !== null)
    return { ok: false, ...wrong };
  return toS > fromS
    ? { ok: true, window: { fromS, toS: Math.min(toS, durationS) } }
    : { ok: false, from: null, to: 'The end must come after the beginning.' };
}

interface RangeFieldsProps {
  readonly draft: RangeDraft;
  readonly onDraft: (draft: RangeDraft) => void;
  readonly durationS: number;
  readonly faults: { readonly from: string | null; readonly to: string | null } | null;
}

/** The two times of a stretch. */
export function RangeFields({ draft, onDraft, durationS, faults }: RangeFieldsProps) {
  return (
    <div className="field-grid range-fields">
      <Field
        label="From"
        value={draft.from}
        onChange={(from) => onDraft({ ...draft, from })}
        size="short"
        autoFocus
        error={faults?.from}
      />
      <Field
        label="To"
        value={draft.to}
        onChange={(to) => onDraft({ ...draft, to })}
        size="short"
        error={faults?.to}
        hint={`up to ${formatClock(durationS)}`}
      />
    </div>
  );
}
