import { type KeyboardEvent, useId, useState } from 'react';
import { useStore } from 'zustand';
import type { Span } from '../recording/span';
import { readTypedTime, timeOfDay, timeText, typedTimeFault } from '../units/typed-time';
import { leftInWords } from './left-while-moving';
import { placesOf } from './pointed-time';
import type { PaneStores } from './row-view';
import { nextPlace } from './snap';
import type { SpanCommands } from './span-commands';
import { moveSpanEnd, type SpanEnd } from './span-ends';
import type { Moved } from './view-store';

interface SpanEndFieldProps {
  readonly stores: PaneStores;
  readonly commands: SpanCommands;
  readonly span: Span;
  readonly end: SpanEnd;
}

const STEPS_S: Readonly<Record<string, number>> = {
  ArrowDown: -1,
  ArrowUp: 1,
  PageDown: -60,
  PageUp: 60,
};

/**
 * One end of the selected span: typed, or moved by the arrows up and down by 1 s, with Shift by 10 s, with Ctrl to the next
 * annotation or event. Enter or going on keeps it, Escape takes it back; once more, the keys are the page's again.
 */
export function SpanEndField({ stores, commands, span, end }: SpanEndFieldProps) {
  const id = useId();
  const study = useStore(stores.session, (now) => now.session?.state.study);
  const draft = useStore(stores.view, (state) => state.draft);
  const [typed, setTyped] = useState<string | null>(null);
  const frame = {
    durationS: study?.durationS ?? 0,
    startOfDayS: timeOfDay(study?.start ?? null),
  };
  const key = end === 'left' ? 'fromS' : 'toS';
  const own = draft?.spanId === span.id ? draft : null;
  const atS = (own ?? span)[key];
  const fault = typed === null ? null : faultOf(typed, span, end, frame);
  const clear = () => {
    setTyped(null);
    stores.view.setState({ draft: null });
  };
  const keep = () => {
    if (fault !== null) return;
    const read = typed === null ? null : readTypedTime(typed, frame);
    const toS = read && 'atS' in read ? read.atS : atS;
    clear();
    if (toS !== span[key]) commands.changeSelectedSpan({ [key]: toS });
  };
  const step = (to: Moved) => {
    const inside = { ...to, atS: Math.min(Math.max(0, to.atS), frame.durationS) };
    setTyped(null);
    stores.view.setState({ draft: moveSpanEnd(span, end, inside) });
  };
  const onKey = (event: KeyboardEvent<HTMLInputElement>) => {
    const by = STEPS_S[event.key];
    const place =
      by && (event.ctrlKey || event.metaKey)
        ? nextPlace(placesOf(stores), atS, by > 0 ? 1 : -1)
        : null;
    if (place) step({ atS: place.atS, snap: place.text });
    else if (by) step({ atS: atS + by * (event.shiftKey ? 10 : 1), snap: null });
    else if (event.key === 'Enter') keep();
    else if (event.key === 'Escape' && (own || typed !== null)) clear();
    else if (event.key === 'Escape') event.currentTarget.blur();
    else return;
    event.preventDefault();
    event.stopPropagation();
  };
  const snap = own?.moved.snap ? `, at ${own.moved.snap}` : '';
  const left = own ? `; ${leftInWords(stores, own)}` : '';
  return (
    <label>
      {end === 'left' ? 'from' : 'to'}
      <input
        type="text"
        className="span-end"
        role="spinbutton"
        autoComplete="off"
        aria-valuemin={0}
        aria-valuemax={frame.durationS}
        aria-valuenow={atS}
        aria-valuetext={`${timeText(atS)}${snap}${left}`}
        aria-invalid={fault === null ? undefined : true}
        aria-describedby={fault === null ? undefined : id}
        title="Arrows up and down: 1 s, with Shift 10 s, with Ctrl to the next annotation or event. Enter keeps, Esc takes back."
        value={typed ?? timeText(atS)}
        onChange={(event) => {
          setTyped(event.target.value);
          stores.view.setState({ draft: null });
        }}
        onKeyDown={onKey}
        onBlur={() => (fault === null ? keep() : clear())}
      />
      {fault === null ? null : (
        <span id={id} role="alert" className="span-fault">
          {fault}
        </span>
      )}
    </label>
  );
}

function faultOf(
  text: string,
  span: Span,
  end: SpanEnd,
  frame: Parameters<typeof readTypedTime>[1],
): string | null {
  const read = readTypedTime(text, frame);
  if (!('atS' in read)) return typedTimeFault(text, frame);
  const good = end === 'left' ? read.atS < span.toS : read.atS > span.fromS;
  if (good) return null;
  return end === 'left'
    ? `The span ends at ${timeText(span.toS)}: type a time before that.`
    : `The span begins at ${timeText(span.fromS)}: type a time after that.`;
}
