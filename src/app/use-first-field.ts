import { useEffect, useRef, useState } from 'react';

/**
 * A form that is filled more than once: `again` puts the focus into its first field for a line of text, so that the next one can
 * be typed at once and the focus is never lost with a row that goes. `place` is the field that has it at the beginning.
 */
export function useFirstField(place = 0) {
  const form = useRef<HTMLFieldSetElement>(null);
  const [turn, setTurn] = useState(0);
  useEffect(() => {
    const fields = form.current?.querySelectorAll<HTMLElement>('input[type="text"]');
    fields?.[turn === 0 ? place : 0]?.focus();
  }, [turn, place]);
  return { form, again: () => setTurn((now) => now + 1) };
}
