import { useState } from 'react';
import type { Failure } from '../recording/failure';
import { useApp } from './app-context';
import { Dialog } from './dialog';
import { Field } from './fields';
import { FormActions } from './form-actions';

/** Asks who edits, before the first edit; the name goes into the log. */
export function ReviewerDialog({ act }: { readonly act: () => void }) {
  const { session, shell } = useApp();
  const [name, setName] = useState(session.getState().reviewer);
  const [tried, setTried] = useState(false);
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Who reviews?"
      subtitle="Your name or initials stand beside each of your edits in the log. They are typed, not authenticated."
      size="small"
      onClose={close}
      onSubmit={() => {
        setTried(true);
        if (name.trim() === '') return;
        session.getState().setReviewer(name.trim());
        close();
        act();
      }}
      actions={<FormActions stay="Not now" go="Go on" onStay={close} />}
    >
      <Field
        label="Name or initials of the reviewer"
        value={name}
        onChange={setName}
        required
        autoFocus
        error={tried && name.trim() === '' ? 'Type a name or initials.' : null}
      />
    </Dialog>
  );
}

/** Something could not be done: what, where, and what to do about it. */
export function FailureDialog({ failure }: { readonly failure: Failure }) {
  const { shell } = useApp();
  return (
    <Dialog title="This did not work" size="small" onClose={() => shell.getState().closeDialog()}>
      <FailureWords failure={failure} />
    </Dialog>
  );
}

/** What went wrong, where, and what to do. */
export function FailureWords({ failure }: { readonly failure: Failure }) {
  return (
    <>
      <p className="failure-what">{failure.message}</p>
      {failure.place === null ? null : <p className="quiet">Where: {failure.place}</p>}
      <p>{failure.remedy}</p>
    </>
  );
}
