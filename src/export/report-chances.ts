import { rangeWords } from '../recording/evidence/range-words';
import type { RangesEvidence } from '../recording/evidence/ranges';
import { FIGURES } from '../recording/figure-catalogue';
import type { FindingsColumn, FindingsTable } from './report-findings';

/** The name of a cell's place in a table. */
export const placeOf = (key: string, { kind, name }: FindingsColumn): string =>
  `${key} ${kind} ${name}`;

/** A table with the range by chance, nominal 95 %, of every figure and change of it that has one. */
export function withChances(table: FindingsTable, ranges: RangesEvidence | null): FindingsTable {
  const chances: Record<string, string> = {};
  if (ranges)
    for (const { key, decimals } of FIGURES) {
      for (const { name, figures } of ranges.phases) {
        const chance = figures.find((one) => one.key === key)?.chance;
        if (chance) chances[placeOf(key, { kind: 'phase', name })] = rangeWords(chance, decimals);
      }
      for (const change of ranges.changes)
        if (change.key === key)
          chances[placeOf(key, { kind: 'change', name: change.to })] = rangeWords(change, decimals);
    }
  return { ...table, chances };
}
