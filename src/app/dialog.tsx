import { type ReactNode, type RefObject, useId, useLayoutEffect, useRef } from 'react';

interface DialogProps {
  readonly title: string;
  /** Small line beneath the title. */
  readonly subtitle?: string;
  /** `above`: at the top of the page, clear of Seconds, which stays in sight. */
  readonly size?: 'small' | 'medium' | 'large' | 'above';
  readonly onClose: () => void;
  /** Runs on the form's submit button or Enter in a field; without it the dialog has no form. */
  readonly onSubmit?: () => void;
  readonly children: ReactNode;
  /** Buttons at the foot; a lone Close where left out. */
  readonly actions?: ReactNode;
}

/**
 * A native modal dialog, shown as long as it is mounted: Escape closes it, focus goes back to where it was. Browsers close a
 * dialog that opened by itself without asking first, so its closing counts as Escape does.
 */
export function Dialog(props: DialogProps) {
  const { title, subtitle, size = 'medium', onClose, onSubmit, children, actions } = props;
  const ref = useModal();
  const titleId = useId();
  const inside = (
    <>
      <header className="dialog-head">
        <h2 id={titleId}>{title}</h2>
        {subtitle ? <p className="quiet">{subtitle}</p> : null}
      </header>
      <div className="dialog-body">{children}</div>
      <footer className="dialog-foot">
        {actions ?? (
          <button type="button" className="button strong" onClick={onClose}>
            Close
          </button>
        )}
      </footer>
    </>
  );
  return (
    <dialog
      ref={ref}
      className={`dialog ${size}`}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClose={(event) => {
        if (ref.current === event.currentTarget && !event.currentTarget.open) onClose();
      }}
    >
      {onSubmit ? (
        <form
          noValidate
          className="dialog-frame"
          onSubmit={(event) => {
            event.preventDefault();
            onSubmit();
            focusFirstFault(ref);
          }}
        >
          {inside}
        </form>
      ) : (
        <div className="dialog-frame">{inside}</div>
      )}
    </dialog>
  );
}

/** A refused form puts the focus where the first thing is wrong, once what is wrong has been drawn. */
function focusFirstFault(ref: RefObject<HTMLDialogElement | null>): void {
  requestAnimationFrame(() =>
    ref.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus(),
  );
}

/** Shows a dialog while it is mounted, and puts the focus where the person begins. */
function useModal() {
  const ref = useRef<HTMLDialogElement>(null);
  useLayoutEffect(() => {
    const dialog = ref.current;
    if (dialog && !dialog.open) {
      dialog.showModal();
      const wanted =
        dialog.querySelector<HTMLElement>('[data-autofocus]') ??
        dialog.querySelector<HTMLElement>('.dialog-body :is(input, select, textarea)') ??
        dialog.querySelector<HTMLElement>('.dialog-foot .strong');
      wanted?.focus();
    }
    return () => dialog?.close();
  }, []);
  return ref;
}
