import './times.css';
import { useMemo } from 'react';
import { type SnapPlace, snapPlaces } from '../review/snap';
import {
  clockText,
  readTypedTime,
  type TimeFrame,
  timeOfDay,
  timeText,
  typedTimeHelp,
} from '../units/typed-time';
import { useAnalysis, useSession, useView } from './app-context';
import { Field } from './fields';

const NO_FRAME: TimeFrame = { durationS: 0, startOfDayS: null };

/** What times typed into the open study are read against. */
export function useTimeFrame(): TimeFrame {
  const study = useSession((now) => now.session?.state.study);
  return useMemo(
    () => (study ? { durationS: study.durationS, startOfDayS: timeOfDay(study.start) } : NO_FRAME),
    [study],
  );
}

/** Times of annotations and events to choose from. */
export function useSnapPlaces(): readonly SnapPlace[] {
  const annotations = useAnalysis((now) => now.recording?.annotations);
  const events = useSession((now) => now.session?.state.events);
  return useMemo(() => snapPlaces(annotations ?? [], events ?? []), [annotations, events]);
}

/** What can be typed for a time and how it is read, once for a dialog. */
export function timeRule(frame: TimeFrame): string {
  const rule =
    frame.startOfDayS === null
      ? ''
      : ' A plain h:mm:ss counts from the start; only past the end it is taken for the clock.';
  const help = typedTimeHelp(frame);
  return `Times: ${help}.${rule}`;
}

interface TimeFieldProps {
  readonly label: string;
  readonly value: string;
  readonly frame: TimeFrame;
  readonly onChange: (text: string) => void;
  readonly error?: string | null | undefined;
  readonly autoFocus?: boolean;
  readonly onFocus?: () => void;
  /** Offered beside the field, to be put into it. */
  readonly places?: readonly SnapPlace[];
}

/** A field for a time; beneath it stands how it is read, the other way of saying it. */
export function TimeField({ places = [], frame, ...field }: TimeFieldProps) {
  const { label, value, onChange, error } = field;
  const hidden = useView((view) => view.identityHidden);
  return (
    <Field
      {...field}
      size="short"
      hint={error ? '' : readWords(value, frame, hidden)}
      beside={
        places.length > 0 ? (
          <PlaceChoice
            label={`At an annotation or event (${label})`}
            places={places}
            hidden={hidden}
            onChoose={(atS) => onChange(timeText(atS))}
          />
        ) : null
      }
    />
  );
}

/** "= 0:12:34" of a clock time or of bare seconds; the clock time of a time in the study, unless identity is hidden. */
function readWords(text: string, frame: TimeFrame, hidden: boolean): string {
  const read = readTypedTime(text, frame);
  if (read.kind !== 'study' && read.kind !== 'clock') return '';
  const inStudy = timeText(read.atS);
  if (read.kind === 'clock') return `= ${inStudy} in the study`;
  const onClock = hidden ? null : clockText(read.atS, frame);
  if (onClock !== null) return `= ${onClock} on the clock`;
  return text.includes(':') ? '' : `= ${inStudy}`;
}

const MOST_PLACES = 200;

function PlaceChoice(props: {
  readonly label: string;
  readonly places: readonly SnapPlace[];
  readonly hidden: boolean;
  readonly onChoose: (atS: number) => void;
}) {
  const { label, places, hidden, onChoose } = props;
  return (
    <select
      className="place-choice"
      aria-label={label}
      value=""
      onChange={(event) => {
        const place = places[Number(event.target.value)];
        if (event.target.value !== '' && place) onChoose(place.atS);
      }}
    >
      <option value="">at…</option>
      {places.slice(0, MOST_PLACES).map(({ atS, text }, i) => (
        <option key={`${atS} ${text}`} value={i}>
          {timeText(atS)} {hidden ? '' : text}
        </option>
      ))}
    </select>
  );
}
