import type { Findings } from '../recording/findings';
import type { Session } from '../session/document';

/** Figures of this sitting that are kept at most; the oldest give way. */
const MOST_KEPT = 200;

const kept = new Map<object, Findings>();

/** What stands for the state after an edit: its line, which never changes; for edit 0 the roles the session began with. */
export const markOf = ({ start, log }: Session, edit: number): object =>
  edit === 0 ? start.roles : log[edit - 1];

/** Keeps the figures that belong to a mark, so that a figure's history need not compute them again. */
export function keepFigures(mark: object, findings: Findings): void {
  kept.delete(mark);
  kept.set(mark, findings);
  for (const [oldest] of kept) {
    if (kept.size <= MOST_KEPT) return;
    kept.delete(oldest);
  }
}

/** The figures of a mark; undefined where they are not kept. */
export const keptFigures = (mark: object): Findings | undefined => kept.get(mark);
