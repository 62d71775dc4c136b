import { useEffect, useRef } from 'react';
import { useApp, useShell } from './app-context';
import { type Message, messagesInSight } from './shell-store';

/** How long a note stays while nobody points at it or is in it. */
const NOTE_MS = 6000;
const STEP_MS = 250;

/** Short words to the person: read out politely, notes go by themselves, problems stay. */
export function Messages() {
  const messages = useShell((state) => state.messages);
  return (
    <section className="messages" aria-label="Messages" aria-live="polite">
      {messagesInSight(messages).map((message) => (
        <OneMessage key={message.id} message={message} />
      ))}
    </section>
  );
}

function OneMessage({ message }: { readonly message: Message }) {
  const { shell } = useApp();
  const ref = useRef<HTMLDivElement>(null);
  const { putAway } = shell.getState();
  useEffect(() => {
    if (message.kind === 'problem') return;
    let leftMs = NOTE_MS;
    const timer = setInterval(() => {
      if (ref.current?.matches(':hover, :focus-within')) return;
      leftMs -= STEP_MS;
      if (leftMs <= 0) putAway(message.id);
    }, STEP_MS);
    return () => clearInterval(timer);
  }, [message, putAway]);
  return (
    <div ref={ref} className={`message ${message.kind}`}>
      <p>{message.text}</p>
      <button type="button" className="button slight" onClick={() => putAway(message.id)}>
        Put away
      </button>
    </div>
  );
}
