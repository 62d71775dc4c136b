import { useState } from 'react';
import { goTo } from '../review/navigate';
import { formatClock, parseClock } from '../units/time';
import { useApp } from './app-context';
import { Dialog } from './dialog';
import { Field } from './fields';
import { FormActions } from './form-actions';

/** Goes to a typed time. */
export function GoToDialog() {
  const { shell, view } = useApp();
  const [text, setText] = useState('');
  const [tried, setTried] = useState(false);
  const { durationS } = view.getState();
  const atS = parseClock(text);
  const good = atS !== null && atS <= durationS;
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Go to a time"
      size="small"
      onClose={close}
      onSubmit={() => {
        setTried(true);
        if (atS === null || !good) return;
        close();
        goTo(view, atS);
      }}
      actions={<FormActions stay="Stay here" go="Go" onStay={close} />}
    >
      <Field
        label="Time from the start"
        value={text}
        onChange={setText}
        size="short"
        autoFocus
        hint={`Seconds, m:ss or h:mm:ss, up to ${formatClock(durationS)}.`}
        error={tried && !good ? 'There is no such time in this recording.' : null}
      />
    </Dialog>
  );
}
