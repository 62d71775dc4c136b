import { useState } from 'react';
import { goTo } from '../review/navigate';
import { lookAtMinutes, lookAtSeconds, type TimeWindow } from '../review/view-store';
import { readTypedTime, typedTimeFault } from '../units/typed-time';
import { useApp } from './app-context';
import { Dialog } from './dialog';
import { Field } from './fields';
import { FormActions } from './form-actions';
import { TimeField, timeRule, useSnapPlaces, useTimeFrame } from './time-field';

/** Widths of the panes as typed: minutes, and seconds. */
interface Widths {
  readonly minutes: string;
  readonly seconds: string;
}

const sameWidths = (a: Widths, b: Widths): boolean =>
  a.minutes === b.minutes && a.seconds === b.seconds;

const readNumber = (text: string): number => Number(text.trim().replace(',', '.') || Number.NaN);
const widthFault = (text: string): string | null =>
  readNumber(text) >= 1 ? null : 'Type a number, 1 or more.';

/** Goes to a typed time, or to that of an annotation or event; the widths of the panes are typed beside it. */
export function GoToDialog() {
  const { shell, view } = useApp();
  const frame = useTimeFrame();
  const places = useSnapPlaces();
  const [text, setText] = useState('');
  const [tried, setTried] = useState(false);
  const [first] = useState<Widths>(() => {
    const { minutes, seconds } = view.getState();
    const width = ({ fromS, toS }: TimeWindow) => toS - fromS;
    return {
      minutes: String(Math.round(width(minutes) / 6) / 10),
      seconds: String(Math.round(10 * width(seconds)) / 10),
    };
  });
  const [widths, setWidths] = useState(first);
  const timeWanted = text.trim() !== '' || sameWidths(widths, first);
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Go to a time"
      subtitle={timeRule(frame)}
      size="small"
      onClose={close}
      onSubmit={() => {
        setTried(true);
        const read = timeWanted ? readTypedTime(text, frame) : null;
        const [minutes, seconds] = [readNumber(widths.minutes), readNumber(widths.seconds)];
        if ((read && !('atS' in read)) || !(minutes >= 1) || !(seconds >= 1)) return;
        const shown = view.getState().seconds;
        const atS = read && 'atS' in read ? read.atS : (shown.fromS + shown.toS) / 2;
        close();
        if (widths.minutes !== first.minutes) lookAtMinutes(view, atS, 60 * minutes);
        if (widths.seconds !== first.seconds) lookAtSeconds(view, atS, seconds);
        goTo(view, atS);
      }}
      actions={<FormActions stay="Stay here" go="Go" onStay={close} />}
    >
      <TimeField
        label="Time"
        value={text}
        frame={frame}
        places={places}
        onChange={setText}
        autoFocus
        error={tried && timeWanted ? typedTimeFault(text, frame) : null}
      />
      <div className="field-grid">
        <Field
          label="Width of Minutes"
          unit="min"
          size="short"
          inputMode="decimal"
          value={widths.minutes}
          onChange={(minutes) => setWidths({ ...widths, minutes })}
          error={tried ? widthFault(widths.minutes) : null}
        />
        <Field
          label="Width of Seconds"
          unit="s"
          size="short"
          inputMode="decimal"
          value={widths.seconds}
          onChange={(seconds) => setWidths({ ...widths, seconds })}
          error={tried ? widthFault(widths.seconds) : null}
        />
      </div>
    </Dialog>
  );
}
