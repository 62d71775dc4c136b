import type { TimeFrame } from '../units/typed-time';
import { Choice } from './fields';
import { type PhaseErrors, type PhaseRow, phaseNames } from './phase-draft';
import { TimeField } from './time-field';

/** The time field that annotations are put into. */
export interface AimedField {
  readonly id: number;
  readonly name: string;
  readonly end: 'from' | 'to';
}

interface PhaseTableProps {
  readonly rows: readonly PhaseRow[];
  readonly frame: TimeFrame;
  readonly errors: PhaseErrors;
  readonly field: AimedField | null;
  readonly onField: (field: AimedField) => void;
  readonly onChange: (rows: readonly PhaseRow[]) => void;
}

/** One row a phase: name, from, to. */
export function PhaseTable(props: PhaseTableProps) {
  const { rows, frame, errors, field, onField, onChange } = props;
  const change = (id: number, parts: Partial<PhaseRow>) =>
    onChange(rows.map((row) => (row.id === id ? { ...row, ...parts } : row)));
  const names = phaseNames(rows).map((name) => [name, name] as const);
  if (rows.length === 0)
    return <p>No phase is marked: the whole study is taken as one. Add fasting, meal and fed.</p>;
  return (
    <ul className="phase-rows" aria-label="Phases">
      {rows.map((row, i) => (
        <li key={row.id}>
          <Choice
            label={`Phase ${i + 1}`}
            value={row.name}
            options={names}
            onChange={(name) => change(row.id, { name })}
            error={errors[row.id]?.name}
          />
          {(['from', 'to'] as const).map((end) => (
            <div
              key={end}
              className={field?.id === row.id && field.end === end ? 'time aimed' : 'time'}
            >
              <TimeField
                label={end}
                value={row[end]}
                frame={frame}
                error={errors[row.id]?.[end]}
                onFocus={() => onField({ id: row.id, name: row.name, end })}
                onChange={(text) => change(row.id, { [end]: text })}
              />
            </div>
          ))}
          <button
            type="button"
            className="button slight"
            aria-label={`Remove phase ${i + 1}, ${row.name}`}
            onClick={() => onChange(rows.filter((other) => other.id !== row.id))}
          >
            Remove
          </button>
        </li>
      ))}
    </ul>
  );
}
