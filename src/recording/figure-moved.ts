import type { FigureValue } from './figure';
import { FIGURES, type FigureDefinition } from './figure-catalogue';
import { figureWords } from './figure-words';
import type { Findings, PhaseFindings } from './findings';

/** A figure that is another one after an edit, as it would be printed. */
export interface MovedFigure {
  readonly definition: FigureDefinition;
  /** Phase or part it belongs to. */
  readonly phase: string;
  readonly before: FigureValue;
  readonly after: FigureValue;
}

/** What is a large change: of percentages the whole, of levels 10 dB, of other figures as much as the figure itself. */
function scaleOf(unit: string, before: number, after: number): number {
  if (unit.startsWith('%')) return 100;
  if (unit === 'dB') return 10;
  return Math.max(Math.abs(before), Math.abs(after), Number.MIN_VALUE);
}

/** How far a figure moved, from 0; one that comes or goes moved most of all. */
function distance({ unit }: FigureDefinition, before: FigureValue, after: FigureValue): number {
  if (before.kind === 'number' && after.kind === 'number')
    return Math.abs(after.value - before.value) / scaleOf(unit, before.value, after.value);
  if (before.kind === 'count' && after.kind === 'count')
    return Math.abs(after.count - before.count) / Math.max(1, before.of, after.of);
  return before.kind === after.kind ? 0 : Number.POSITIVE_INFINITY;
}

const largeWords = (value: FigureValue, definition: FigureDefinition): string =>
  figureWords(value, definition).large;

/** Main figures of whole phases count before those of parts, and both before the figures of the long list. */
const rankOf = ({ main }: FigureDefinition, { name, phase }: PhaseFindings): number =>
  (main ? 2 : 0) + (name === phase ? 1 : 0);

/**
 * The figure that moved most between two findings of one study: of the main figures of whole phases, else of the rest; null
 * where none is printed otherwise than before.
 */
export function mostMoved(before: Findings, after: Findings): MovedFigure | null {
  const moved = after.phases.flatMap((part) => {
    const was = before.phases.find(({ name }) => name === part.name);
    if (!was) return [];
    return FIGURES.flatMap((definition) => {
      const [a, b] = [was.figures[definition.key], part.figures[definition.key]];
      if (!a || !b || largeWords(a, definition) === largeWords(b, definition)) return [];
      const found = { definition, phase: part.name, before: a, after: b };
      return [{ found, rank: rankOf(definition, part), far: distance(definition, a, b) }];
    });
  });
  const [most] = moved.sort((a, b) => b.rank - a.rank || b.far - a.far);
  return most?.found ?? null;
}

/** A moved figure in words: "RMSSD fed 38.2 to 31.4 ms". */
export function movedWords({ definition, phase, before, after }: MovedFigure): string {
  const { label, unit } = definition;
  const what = `${label}${label.includes(',') ? ',' : ''} ${phase}`;
  const withUnit = (value: FigureValue) =>
    `${largeWords(value, definition)}${value.kind === 'number' && unit !== '' ? ` ${unit}` : ''}`;
  if (after.kind === 'withheld')
    return `${what} ${withUnit(before)}, now withheld: ${after.reason}`;
  if (before.kind === 'withheld') return `${what} ${withUnit(after)}, withheld before`;
  return `${what} ${largeWords(before, definition)} to ${withUnit(after)}`;
}
