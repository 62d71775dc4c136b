import { type ReactNode, useId } from 'react';

interface FieldProps {
  readonly label: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly unit?: string;
  /** What is wrong with the value, said beside the field. */
  readonly error?: string | null | undefined;
  readonly hint?: string;
  readonly size?: 'short' | 'long';
  readonly inputMode?: 'decimal' | 'text';
  readonly required?: boolean;
  readonly autoFocus?: boolean;
  readonly suggestions?: readonly string[];
  readonly onFocus?: () => void;
  /** The label is read out only, where a column heading says it to the eye. */
  readonly labelHidden?: boolean;
  /** Stands on the field's line, after its unit. */
  readonly beside?: ReactNode;
}

/** A one-line field with its label, unit, hint and message. */
export function Field(props: FieldProps) {
  const { label, value, onChange, unit, error, hint, size = 'long', suggestions } = props;
  const id = useId();
  const about = [error ? `${id}-error` : '', hint ? `${id}-hint` : ''].filter(Boolean).join(' ');
  return (
    <div className={`field ${size}`}>
      <label htmlFor={id} className={props.labelHidden ? 'unseen' : undefined}>
        {label}
      </label>
      <span className="field-line">
        <input
          id={id}
          type="text"
          value={value}
          inputMode={props.inputMode ?? 'text'}
          autoComplete="off"
          spellCheck={false}
          required={props.required ?? false}
          aria-invalid={error ? true : undefined}
          aria-describedby={about || undefined}
          list={suggestions ? `${id}-list` : undefined}
          data-autofocus={props.autoFocus ? 'true' : undefined}
          onFocus={props.onFocus}
          onChange={(event) => onChange(event.target.value)}
        />
        {unit ? <span className="unit">{unit}</span> : null}
        {props.beside}
      </span>
      {suggestions ? (
        <datalist id={`${id}-list`}>
          {suggestions.map((one) => (
            <option key={one} value={one} />
          ))}
        </datalist>
      ) : null}
      {hint ? (
        <p id={`${id}-hint`} className="small quiet">
          {hint}
        </p>
      ) : null}
      {error ? (
        <p id={`${id}-error`} className="field-error">
          {error}
        </p>
      ) : null}
    </div>
  );
}

interface ChoiceProps<T extends string> {
  readonly label: string;
  readonly value: T;
  readonly options: readonly (readonly [value: T, words: string])[];
  readonly onChange: (value: T) => void;
  readonly error?: string | null | undefined;
  readonly labelHidden?: boolean;
}

/** A choice from a list, with its label and message. */
export function Choice<T extends string>(props: ChoiceProps<T>) {
  const id = useId();
  const { options, error } = props;
  return (
    <div className="field">
      <label htmlFor={id} className={props.labelHidden ? 'unseen' : undefined}>
        {props.label}
      </label>
      <select
        id={id}
        value={props.value}
        aria-invalid={error ? true : undefined}
        aria-describedby={error ? `${id}-error` : undefined}
        onChange={(event) => {
          const chosen = options.find(([value]) => value === event.target.value);
          if (chosen) props.onChange(chosen[0]);
        }}
      >
        {options.map(([value, words]) => (
          <option key={value} value={value}>
            {words}
          </option>
        ))}
      </select>
      {error ? (
        <p id={`${id}-error`} className="field-error">
          {error}
        </p>
      ) : null}
    </div>
  );
}

interface TickProps {
  readonly label: ReactNode;
  readonly checked: boolean;
  readonly onChange: (checked: boolean) => void;
}

/** A box to tick, with its words. */
export function Tick({ label, checked, onChange }: TickProps) {
  return (
    <label className="tick">
      <input
        type="checkbox"
        checked={checked}
        onChange={(event) => onChange(event.target.checked)}
      />
      <span>{label}</span>
    </label>
  );
}

interface TextProps {
  readonly label: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly rows?: number;
}

/** A field of several lines. */
export function TextArea({ label, value, onChange, rows = 4 }: TextProps) {
  const id = useId();
  return (
    <div className="field">
      <label htmlFor={id}>{label}</label>
      <textarea
        id={id}
        value={value}
        rows={rows}
        onChange={(event) => onChange(event.target.value)}
      />
    </div>
  );
}
