interface FormActionsProps {
  /** Words of the button that leaves things as they are, and of the one that submits. */
  readonly stay: string;
  readonly go: string;
  readonly onStay: () => void;
  readonly disabled?: boolean;
}

/** The two buttons at the foot of a dialog with a form. */
export function FormActions({ stay, go, onStay, disabled = false }: FormActionsProps) {
  return (
    <>
      <button type="button" className="button" onClick={onStay}>
        {stay}
      </button>
      <button type="submit" className="button strong" disabled={disabled}>
        {go}
      </button>
    </>
  );
}
