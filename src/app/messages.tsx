import { useEffect, useRef } from 'react';
import { useApp, useShell } from './app-context';
import type { Message } from './shell-store';

const NOTE_MS = 7000;

/** Short words to the person: read out politely, notes go by themselves, problems stay. */
export function Messages() {
  const messages = useShell((state) => state.messages);
  return (
    <section className="messages" aria-label="Messages" aria-live="polite">
      {messages.map((message) => (
        <OneMessage key={message.id} message={message} />
      ))}
    </section>
  );
}

function OneMessage({ message }: { readonly message: Message }) {
  const { controller, shell } = useApp();
  const ref = useRef<HTMLDivElement>(null);
  const { putAway } = shell.getState();
  useEffect(() => {
    if (message.kind === 'problem') return;
    const timer = setInterval(() => {
      if (!ref.current?.matches(':hover, :focus-within')) putAway(message.id);
    }, NOTE_MS);
    return () => clearInterval(timer);
  }, [message, putAway]);
  return (
    <div ref={ref} className={`message ${message.kind}`}>
      <p>{message.text}</p>
      {message.undo ? (
        <button
          type="button"
          className="button slight"
          onClick={() => {
            putAway(message.id);
            controller.undo();
          }}
        >
          Undo
        </button>
      ) : null}
      <button type="button" className="button slight" onClick={() => putAway(message.id)}>
        Put away
      </button>
    </div>
  );
}
