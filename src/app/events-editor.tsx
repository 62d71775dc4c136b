import { useState } from 'react';
import type { TimedNote } from '../session/document';
import { Field } from './fields';
import { addEvent, timeText } from './phase-draft';

interface EventsEditorProps {
  readonly events: readonly TimedNote[];
  readonly durationS: number;
  readonly onChange: (events: readonly TimedNote[]) => void;
}

/** What happened and when, as the reviewer notes it ("turned over", "drank 200 ml"). */
export function EventsEditor({ events, durationS, onChange }: EventsEditorProps) {
  const [at, setAt] = useState('');
  const [text, setText] = useState('');
  const [errors, setErrors] = useState<{ at?: string; text?: string }>({});
  const add = () => {
    const grown = addEvent(events, { at, text }, durationS);
    if (!grown.ok) return setErrors(grown);
    onChange(grown.events);
    setErrors({});
    setAt('');
    setText('');
  };
  return (
    <section aria-labelledby="events-title">
      <h3 id="events-title">Events</h3>
      {events.length === 0 ? <p className="quiet">None noted.</p> : null}
      <ul className="event-list">
        {events.map((event) => (
          <li key={event.id}>
            <span>{timeText(event.atS)}</span>
            <span>{event.text}</span>
            <button
              type="button"
              className="button slight"
              aria-label={`Remove event at ${timeText(event.atS)}`}
              onClick={() => onChange(events.filter((other) => other.id !== event.id))}
            >
              Remove
            </button>
          </li>
        ))}
      </ul>
      <div className="event-new">
        <Field label="at" size="short" value={at} onChange={setAt} error={errors.at} />
        <Field label="what happened" value={text} onChange={setText} error={errors.text} />
        <button type="button" className="button slight" onClick={add}>
          Add event
        </button>
      </div>
    </section>
  );
}
