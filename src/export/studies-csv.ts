import type { FigureValue } from '../recording/figure';
import { FIGURES } from '../recording/figure-catalogue';
import type { PhaseFindings } from '../recording/findings';
import { type Cell, csvText, numberCell, timeCell } from './csv';
import type { ExportInput } from './export-input';

/** One study of several: what came of it, or why nothing did. */
export type StudyOutcome =
  | {
      readonly kind: 'analysed';
      /** Name of the study's folder. */
      readonly folder: string;
      readonly input: Pick<ExportInput, 'state' | 'sha256' | 'findings' | 'openDoubts' | 'edit'>;
    }
  | { readonly kind: 'failed'; readonly folder: string; readonly reason: string };

const PLACE = ['study', 'code', 'sha256', 'edit', 'open_doubts', 'phase', 'from_s', 'to_s'];
const KEPT = ['kept_stomach_s', 'kept_heart_s', 'adequacy_stomach', 'adequacy_heart'];
const HEADER = [...PLACE, ...KEPT, ...FIGURES.map(({ key }) => key), 'failure'];

/**
 * studies.csv: a row for each phase and named part of each study, in the order given; every figure under its key of
 * findings.json, empty where it is withheld or given as a count. A study that failed has one row with its reason alone.
 */
export const studiesCsv = (studies: readonly StudyOutcome[]): string =>
  csvText(HEADER, studies.flatMap(rowsOf));

function rowsOf(study: StudyOutcome): readonly (readonly Cell[])[] {
  const empty = (cells: number): readonly Cell[] => new Array<Cell>(cells).fill(null);
  if (study.kind === 'failed') return [[study.folder, ...empty(HEADER.length - 2), study.reason]];
  const { state, sha256, findings, openDoubts, edit } = study.input;
  return findings.phases.map((phase) => [
    study.folder,
    state.study.code,
    sha256,
    numberCell(edit, 0),
    numberCell(openDoubts.length, 0),
    ...phaseCells(phase),
    ...FIGURES.map(({ key, decimals }) => figureCell(phase.figures[key], decimals)),
    null,
  ]);
}

const phaseCells = (phase: PhaseFindings): readonly Cell[] => [
  phase.name,
  timeCell(phase.fromS),
  timeCell(phase.toS),
  timeCell(phase.keptStomachS),
  timeCell(phase.keptHeartS),
  phase.adequacyStomach,
  phase.adequacyHeart,
];

const figureCell = (figure: FigureValue | undefined, decimals: number): Cell =>
  figure?.kind === 'number' ? numberCell(figure.value, decimals) : null;
