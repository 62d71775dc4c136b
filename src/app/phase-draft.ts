import { FED_AFTER_MEAL_S, isMeal, type Phase } from '../recording/phase';
import { readTypedTime, type TimeFrame, timeText, typedTimeFault } from '../units/typed-time';

/** A phase as it is being typed. */
export interface PhaseRow {
  readonly id: number;
  readonly name: string;
  readonly from: string;
  readonly to: string;
}

export interface PhaseRowErrors {
  readonly name?: string;
  readonly from?: string;
  readonly to?: string;
}

/** What is wrong, by row id; rows without faults are absent. */
export type PhaseErrors = Readonly<Record<number, PhaseRowErrors>>;

const isMealName = (name: string): boolean => isMeal({ name, fromS: 0, toS: 0 });

/** Seconds of a typed time; null where it is none of the recording's. */
function typedS(text: string, frame: TimeFrame): number | null {
  const read = readTypedTime(text, frame);
  return read.kind === 'study' || read.kind === 'clock' ? read.atS : null;
}

export const rowsOf = (phases: readonly Phase[]): readonly PhaseRow[] =>
  phases.map(({ name, fromS, toS }, id) => ({
    id,
    name,
    from: timeText(fromS),
    to: timeText(toS),
  }));

/** Names a phase may take: the usual ones, numbered as a long study needs them, and those in use. */
export function phaseNames(rows: readonly PhaseRow[]): readonly string[] {
  const meals = rows.filter((row) => isMealName(row.name)).length;
  const numbered = Array.from({ length: meals }, (_, i) => [`meal-${i + 2}`, `fed-${i + 2}`]);
  return [
    ...new Set(['fasting', 'meal', 'fed', ...numbered.flat(), ...rows.map((row) => row.name)]),
  ];
}

/** A row more, of the first usual name that is free, beginning where the last one ends. */
export function addRow(rows: readonly PhaseRow[], frame: TimeFrame): readonly PhaseRow[] {
  const { durationS } = frame;
  const used = new Set(rows.map((row) => row.name));
  const name = phaseNames(rows).find((one) => !used.has(one)) ?? 'fasting';
  const id = 1 + Math.max(-1, ...rows.map((row) => row.id));
  const last = rows.at(-1);
  const end = last ? typedS(last.to, frame) : 0;
  const mealBefore = last && isMealName(last.name);
  const from =
    end === null
      ? ''
      : timeText(
          Math.min(durationS, end + (mealBefore && /^fed/.test(name) ? FED_AFTER_MEAL_S : 0)),
        );
  return [...rows, { id, name, from, to: timeText(durationS) }];
}

/** The fed phase put to begin 2 min after its meal's end; null where no meal has an end, or the fed row begins there already. */
export function proposedFed(
  rows: readonly PhaseRow[],
  frame: TimeFrame,
): { readonly words: string; readonly rows: readonly PhaseRow[] } | null {
  const { durationS } = frame;
  for (const meal of rows.filter((row) => isMealName(row.name))) {
    const end = typedS(meal.to, frame);
    const fromS = (end ?? durationS) + FED_AFTER_MEAL_S;
    const name = meal.name.replace('meal', 'fed');
    const fed = rows.find((row) => row.name === name);
    if (end === null || fromS >= durationS || (fed && typedS(fed.from, frame) === fromS)) continue;
    const from = timeText(fromS);
    const id = 1 + Math.max(-1, ...rows.map((row) => row.id));
    return {
      words: `${name} from ${from}, 2 min after the meal’s end`,
      rows: fed
        ? rows.map((row) => (row === fed ? { ...row, from } : row))
        : [...rows, { id, name, from, to: timeText(durationS) }],
    };
  }
  return null;
}

/** Reads the rows: phases in ascending order, or what is wrong with each row. */
export function readPhases(
  rows: readonly PhaseRow[],
  frame: TimeFrame,
): { readonly phases: readonly Phase[]; readonly errors: PhaseErrors } {
  const errors: Record<number, PhaseRowErrors> = {};
  const fault = (id: number, error: PhaseRowErrors) => {
    errors[id] = { ...error, ...errors[id] };
  };
  const read: (Phase & { readonly id: number })[] = [];
  for (const { id, name, from, to } of rows) {
    const fromS = typedS(from, frame);
    const toS = typedS(to, frame);
    const wrong = { from: typedTimeFault(from, frame), to: typedTimeFault(to, frame) };
    if (wrong.from !== null) fault(id, { from: wrong.from });
    if (wrong.to !== null) fault(id, { to: wrong.to });
    if (rows.some((other) => other.id !== id && other.name === name))
      fault(id, { name: `There are two phases “${name}”.` });
    if (fromS === null || toS === null) continue;
    if (fromS >= toS) fault(id, { to: 'The end must come after the start.' });
    read.push({ id, name, fromS, toS });
  }
  read.sort((a, b) => a.fromS - b.fromS);
  read.forEach((phase, i) => {
    const before = read[i - 1];
    if (before && phase.fromS < before.toS)
      fault(phase.id, { from: `Begins before ${before.name} ends at ${timeText(before.toS)}.` });
  });
  return { phases: read.map(({ name, fromS, toS }) => ({ name, fromS, toS })), errors };
}
