import type { ReactNode, RefObject } from 'react';
import { Dialog } from './dialog';

interface EntryDialogProps {
  readonly title: string;
  readonly subtitle: string;
  readonly size: 'medium' | 'large';
  /** What the fields stand for now. */
  readonly legend: string;
  readonly fields: ReactNode;
  readonly form: RefObject<HTMLFieldSetElement | null>;
  /** The act on what is typed as something new. */
  readonly go: string;
  /** True while the fields change an entry of the table below. */
  readonly changing: boolean;
  /** What was done last, read out. */
  readonly done: string;
  readonly onSave: () => void;
  /** Leaves the entry that is being changed as it was. */
  readonly onLeave: () => void;
  readonly onClose: () => void;
  /** The table of entries. */
  readonly children: ReactNode;
}

/** A dialog that fills a table one entry after the other: fields above, what was done, the table below. */
export function EntryDialog(props: EntryDialogProps) {
  const { title, subtitle, size, legend, fields, form, go, changing, done, children } = props;
  const { onSave, onLeave, onClose } = props;
  return (
    <Dialog
      title={title}
      subtitle={subtitle}
      size={size}
      onClose={onClose}
      onSubmit={onSave}
      actions={
        <>
          <button type="button" className="button" onClick={onClose}>
            Close
          </button>
          <button type="submit" className="button strong">
            {changing ? 'Change it' : go}
          </button>
        </>
      }
    >
      <fieldset ref={form}>
        <legend>{legend}</legend>
        {fields}
        {changing ? (
          <button type="button" className="button slight" onClick={onLeave}>
            Leave it as it was
          </button>
        ) : null}
      </fieldset>
      <p role="status" className="small done-line">
        {done}
      </p>
      {children}
    </Dialog>
  );
}
