import type { FigureValue } from '../recording/figure';
import { FIGURES, type FigureDefinition } from '../recording/figure-catalogue';
import type { Findings } from '../recording/findings';
import { isFasting, isFed, isMeal } from '../recording/phase';

/** One printed row: the figure before the meal, after it, and what changed; `after` in the order of `columns`. */
export interface FindingsRow {
  readonly definition: FigureDefinition;
  readonly values: readonly (FigureValue | undefined)[];
  readonly change: FigureValue | undefined;
}

export interface FindingsTable {
  /** Names of the phases and parts, left to right. */
  readonly columns: readonly string[];
  /** The fed phase that the change column compares with fasting; null where there is no pair. */
  readonly compared: string | null;
  readonly rows: readonly FindingsRow[];
}

/** The findings as the report lays them out: fasting, fed and its halves, with the change of the whole fed phase. */
export function findingsTable(findings: Findings): FindingsTable {
  const shown = findings.phases.filter((phase) => !isMeal({ ...phase, name: phase.phase }));
  const fed = shown.find((phase) => isFed(phase))?.name ?? null;
  const compared = shown.some((phase) => isFasting(phase)) ? fed : null;
  return {
    columns: shown.map((phase) => phase.name),
    compared,
    rows: FIGURES.map((definition) => ({
      definition,
      values: shown.map((phase) => phase.figures[definition.key]),
      change: findings.changes.find(({ key, to }) => key === definition.key && to === compared)
        ?.value,
    })),
  };
}
