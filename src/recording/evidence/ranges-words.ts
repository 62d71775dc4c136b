import type { Range } from '../../numeric/chance-range';
import { FIGURES, type FigureDefinition } from '../figure-catalogue';
import type { EvidenceLine } from './evidence-line';
import { rangeWords } from './range-words';
import type { ChangeRange, DoubtsRange, RangesEvidence } from './ranges';

/** A change in dB as one of the ratio of powers: "× 0.9–2.4"; a dash of any other. */
export const ratioWords = ({ ratio }: ChangeRange): string =>
  ratio ? `× ${rangeWords(ratio, 1)}` : '—';

export const exactWords = ({ exact }: DoubtsRange): string =>
  exact ? 'exact' : 'each doubt’s effect added up';

const definitionOf = (key: string): FigureDefinition | undefined =>
  FIGURES.find((figure) => figure.key === key);

const withUnit = (words: string, { unit }: FigureDefinition): string =>
  unit === '' ? words : `${words} ${unit}`;

/** "DF, median, fasting 2.71–2.99 cpm". */
function saying(key: string, phase: string, range: Range): string {
  const figure = definitionOf(key);
  if (!figure) return '';
  return `${figure.label}, ${phase}: ${withUnit(rangeWords(range, figure.decimals), figure)}`;
}

function chanceLine({ phases, changes }: RangesEvidence): EvidenceLine {
  const said = phases.flatMap(({ name, figures }) =>
    figures.flatMap(({ key, chance }) =>
      key === 'df_median_cpm' && chance ? [saying(key, name, chance)] : [],
    ),
  );
  const ratio = changes.find(({ key }) => key === 'dp_mean_spectrum_db');
  const words = [
    ...said.slice(0, 1),
    ...(ratio ? [`power, ${ratio.to} over ${ratio.from}: ${ratioWords(ratio)}`] : []),
  ];
  const there = phases.some(({ figures }) => figures.some(({ chance }) => chance));
  if (words.length > 0) return { name: 'By chance', words: `${words.join('; ')}.`, mark: NOMINAL };
  return there
    ? { name: 'By chance', words: 'Of the heart’s figures alone.', mark: NOMINAL }
    : { name: 'By chance', words: 'Too little is there for a range.', mark: null };
}

const NOMINAL = 'Nominal 95 %.';

function doubtsLine({ phases, openHeartDoubts }: RangesEvidence): EvidenceLine {
  const name = 'By doubts';
  if (openHeartDoubts === 0)
    return { name, words: 'No open doubt reaches a heart figure.', mark: null };
  const widest = widestOf(phases, ({ doubts }) => doubts);
  if (!widest) return { name, words: 'The open doubts move no figure of a phase.', mark: null };
  const { key, phase, range } = widest;
  return {
    name,
    words: `${saying(key, phase, range)}.`,
    mark: `Most moved; ${exactWords(range)}.`,
  };
}

function limitsLine({ phases }: RangesEvidence): EvidenceLine | null {
  const widest = widestOf(phases, ({ key, limits }) => (key.startsWith('time_') ? limits : null));
  if (!widest) return null;
  const { key, phase, range } = widest;
  return {
    name: 'By limits',
    words: `${saying(key, phase, range)}.`,
    mark: 'Most moved by other published limits and epoch lengths.',
  };
}

/** The range that is widest beside its middle, percentages beside the whole. */
function widestOf<R extends Range>(
  phases: RangesEvidence['phases'],
  rangeOf: (figure: RangesEvidence['phases'][number]['figures'][number]) => R | null,
) {
  let widest: { key: string; phase: string; range: R; width: number } | null = null;
  for (const { name, figures } of phases)
    for (const figure of figures) {
      const range = rangeOf(figure);
      if (!range) continue;
      const percent = definitionOf(figure.key)?.unit.startsWith('%');
      const width = (range.high - range.low) / (percent ? 100 : (range.high + range.low) / 2);
      if (width > (widest?.width ?? 0)) widest = { key: figure.key, phase: name, range, width };
    }
  return widest;
}

/** What the trust section of Findings and the report say of it. */
export function rangesLines(value: RangesEvidence): readonly EvidenceLine[] {
  const limits = limitsLine(value);
  return [chanceLine(value), doubtsLine(value), ...(limits ? [limits] : [])];
}
