import type { Figures, FigureValue } from '../figure';
import type { Findings, PhaseFindings } from '../findings';
import type { Evidence } from './evidence';

/** A figure with a mark more; a withheld one has none. */
const marked = (figure: FigureValue, mark: string): FigureValue =>
  figure.kind === 'withheld' ? figure : { ...figure, marks: [...figure.marks, mark] };

function markedPart(part: PhaseFindings, { opinions }: Partial<Evidence>): PhaseFindings {
  const said = opinions?.parts.find(({ name }) => name === part.name)?.disagreements ?? [];
  if (said.length === 0) return part;
  const figures: Record<string, FigureValue> = { ...part.figures };
  for (const { key, words } of said) if (figures[key]) figures[key] = marked(figures[key], words);
  return { ...part, figures: figures satisfies Figures };
}

/** The findings with a mark at every figure that the evidence does not bear out. Both are of the same edit. */
export const withEvidenceMarks = (findings: Findings, evidence: Partial<Evidence>): Findings => ({
  ...findings,
  phases: findings.phases.map((part) => markedPart(part, evidence)),
});
