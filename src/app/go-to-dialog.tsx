import { useState } from 'react';
import { goTo } from '../review/navigate';
import { readTypedTime, typedTimeFault } from '../units/typed-time';
import { useApp } from './app-context';
import { Dialog } from './dialog';
import { FormActions } from './form-actions';
import { TimeField, timeRule, useSnapPlaces, useTimeFrame } from './time-field';

/** Goes to a typed time, or to that of an annotation or event. */
export function GoToDialog() {
  const { shell, view } = useApp();
  const frame = useTimeFrame();
  const places = useSnapPlaces();
  const [text, setText] = useState('');
  const [tried, setTried] = useState(false);
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Go to a time"
      subtitle={timeRule(frame)}
      size="small"
      onClose={close}
      onSubmit={() => {
        setTried(true);
        const read = readTypedTime(text, frame);
        if (read.kind !== 'study' && read.kind !== 'clock') return;
        close();
        goTo(view, read.atS);
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
        error={tried ? typedTimeFault(text, frame) : null}
      />
    </Dialog>
  );
}
