import type { KeyboardEvent } from 'react';
import type { TimedNote } from '../session/document';
import { Field } from './fields';
import { addEvent, type EventDraft, isBlank, NO_EVENT, timeText } from './phase-draft';

/** Events with the one that is being typed. */
export interface EventsDraft {
  readonly events: readonly TimedNote[];
  readonly typed: EventDraft;
  /** True once adding was tried: from then on what is wrong is said beside the fields. */
  readonly tried: boolean;
}

interface EventsEditorProps {
  readonly draft: EventsDraft;
  readonly durationS: number;
  readonly onChange: (draft: EventsDraft) => void;
}

/** What happened and when, as the reviewer notes it ("turned over", "drank 200 ml"). */
export function EventsEditor({ draft, durationS, onChange }: EventsEditorProps) {
  const { events, typed, tried } = draft;
  const grown = addEvent(events, typed, durationS);
  const wrong = tried && !grown.ok ? grown : null;
  const type = (parts: Partial<EventDraft>) => {
    const next = { ...typed, ...parts };
    onChange({ events, typed: next, tried: tried && !isBlank(next) });
  };
  const add = () =>
    onChange(
      grown.ok
        ? { events: grown.events, typed: NO_EVENT, tried: false }
        : { ...draft, tried: true },
    );
  const addOnEnter = (event: KeyboardEvent<HTMLFieldSetElement>) => {
    if (event.key !== 'Enter' || !(event.target instanceof HTMLInputElement)) return;
    event.preventDefault();
    add();
    if (grown.ok) event.currentTarget.querySelector('input')?.focus();
  };
  return (
    <section aria-labelledby="events-title">
      <h3 id="events-title">Events</h3>
      <EventList events={events} onChange={(left) => onChange({ ...draft, events: left })} />
      <fieldset className="event-new" aria-label="New event" onKeyDown={addOnEnter}>
        <Field
          label="at"
          size="short"
          value={typed.at}
          onChange={(at) => type({ at })}
          error={wrong?.at}
        />
        <Field
          label="what happened"
          value={typed.text}
          onChange={(text) => type({ text })}
          error={wrong?.text}
        />
        <button type="button" className="button slight" onClick={add}>
          Add event
        </button>
      </fieldset>
    </section>
  );
}

interface EventListProps {
  readonly events: readonly TimedNote[];
  readonly onChange: (events: readonly TimedNote[]) => void;
}

function EventList({ events, onChange }: EventListProps) {
  if (events.length === 0) return <p className="quiet">None noted.</p>;
  return (
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
  );
}
