import { FED_AFTER_MEAL_S, isMeal, type Phase } from '../recording/phase';
import type { TimedNote } from '../session/document';
import { formatClock, parseClock } from '../units/time';

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

/** A time as it is offered for typing: whole seconds without decimals, others with as many as they need. */
export function timeText(seconds: number): string {
  const decimals = [0, 1, 2, 3].find((d) => seconds === Number(seconds.toFixed(d))) ?? 3;
  return formatClock(seconds, decimals);
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
export function addRow(rows: readonly PhaseRow[], durationS: number): readonly PhaseRow[] {
  const used = new Set(rows.map((row) => row.name));
  const name = phaseNames(rows).find((one) => !used.has(one)) ?? 'fasting';
  const id = 1 + Math.max(-1, ...rows.map((row) => row.id));
  const last = rows.at(-1);
  const end = last ? parseClock(last.to) : 0;
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
  durationS: number,
): { readonly words: string; readonly rows: readonly PhaseRow[] } | null {
  for (const meal of rows.filter((row) => isMealName(row.name))) {
    const end = parseClock(meal.to);
    const fromS = (end ?? durationS) + FED_AFTER_MEAL_S;
    const name = meal.name.replace('meal', 'fed');
    const fed = rows.find((row) => row.name === name);
    if (end === null || fromS >= durationS || (fed && parseClock(fed.from) === fromS)) continue;
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

const WANTED = 'Type seconds, m:ss or h:mm:ss.';

/** Reads the rows: phases in ascending order, or what is wrong with each row. */
export function readPhases(
  rows: readonly PhaseRow[],
  durationS: number,
): { readonly phases: readonly Phase[]; readonly errors: PhaseErrors } {
  const errors: Record<number, PhaseRowErrors> = {};
  const fault = (id: number, error: PhaseRowErrors) => {
    errors[id] = { ...error, ...errors[id] };
  };
  const read: (Phase & { readonly id: number })[] = [];
  for (const { id, name, from, to } of rows) {
    const fromS = parseClock(from);
    const toS = parseClock(to);
    if (fromS === null) fault(id, { from: WANTED });
    if (toS === null) fault(id, { to: WANTED });
    if (rows.some((other) => other.id !== id && other.name === name))
      fault(id, { name: `There are two phases “${name}”.` });
    if (fromS === null || toS === null) continue;
    if (toS > durationS + 1) fault(id, { to: `The recording ends at ${formatClock(durationS)}.` });
    if (fromS >= toS) fault(id, { to: 'The end must come after the start.' });
    read.push({ id, name, fromS, toS: Math.min(toS, durationS) });
  }
  read.sort((a, b) => a.fromS - b.fromS);
  read.forEach((phase, i) => {
    const before = read[i - 1];
    if (before && phase.fromS < before.toS)
      fault(phase.id, { from: `Begins before ${before.name} ends at ${timeText(before.toS)}.` });
  });
  return { phases: read.map(({ name, fromS, toS }) => ({ name, fromS, toS })), errors };
}

/** An event as it is being typed. */
export interface EventDraft {
  readonly at: string;
  readonly text: string;
}

export const NO_EVENT: EventDraft = { at: '', text: '' };

/** True where nothing of an event has been typed. */
export const isBlank = ({ at, text }: EventDraft): boolean =>
  at.trim() === '' && text.trim() === '';

export type GrownEvents =
  | { readonly ok: true; readonly events: readonly TimedNote[] }
  | { readonly ok: false; readonly at?: string; readonly text?: string };

/** The events as they are to be kept: with the typed one where something is typed, or what is wrong with it. */
export function withTypedEvent(
  events: readonly TimedNote[],
  draft: EventDraft,
  durationS: number,
): GrownEvents {
  return isBlank(draft) ? { ok: true, events } : addEvent(events, draft, durationS);
}

/** The events with one more, in ascending time, or what is wrong with the typed one. */
export function addEvent(
  events: readonly TimedNote[],
  { at, text }: EventDraft,
  durationS: number,
): GrownEvents {
  const atS = parseClock(at);
  const wrongAt =
    atS === null
      ? WANTED
      : atS > durationS
        ? `The recording ends at ${formatClock(durationS)}.`
        : null;
  const wrongText = text.trim() === '' ? 'Say what happened.' : null;
  if (atS === null || wrongAt !== null || wrongText !== null)
    return {
      ok: false,
      ...(wrongAt === null ? {} : { at: wrongAt }),
      ...(wrongText === null ? {} : { text: wrongText }),
    };
  const id = 1 + Math.max(0, ...events.map((event) => event.id));
  const grown = [...events, { id, atS, text: text.trim() }];
  return { ok: true, events: grown.sort((a, b) => a.atS - b.atS) };
}
