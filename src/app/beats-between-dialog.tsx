import { useState } from 'react';
import { ticksWithin } from '../review/beat-choosing';
import { goTo } from '../review/navigate';
import { beatsWords, openBeats } from '../review/open-beats';
import { useApp } from './app-context';
import type { CommandParts } from './command';
import { Dialog } from './dialog';
import { FormActions } from './form-actions';
import { RangeFields, rangeAtFirst, readRange } from './range-fields';
import { timeRule, useTimeFrame } from './time-field';

/** Selects the beats from one typed time to another. */
export function BeatsBetweenDialog({ parts }: { readonly parts: CommandParts }) {
  const { shell, view } = useApp();
  const frame = useTimeFrame();
  const [draft, setDraft] = useState(() => rangeAtFirst(parts));
  const [tried, setTried] = useState(false);
  const range = readRange(draft, frame);
  const open = openBeats(parts);
  const ticks = range.ok && open ? ticksWithin(open, range.window) : [];
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Select beats from one time to another"
      subtitle={timeRule(frame)}
      size="small"
      onClose={close}
      onSubmit={() => {
        setTried(true);
        if (!range.ok || ticks.length === 0) return;
        close();
        parts.panes.selectBeatsWithin(range.window);
        goTo(view, range.window.fromS);
      }}
      actions={<FormActions stay="Leave it" go="Select" onStay={close} />}
    >
      <RangeFields
        draft={draft}
        onDraft={setDraft}
        frame={frame}
        faults={tried && !range.ok ? range : null}
      />
      <p role="status">{open && range.ok ? `${beatsWords(ticks, open.rateHz)}.` : '\u00a0'}</p>
      <p className="small quiet">
        Then one key classes, deletes, or marks them not usable, all in one step.
      </p>
    </Dialog>
  );
}
