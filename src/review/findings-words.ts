import type { FigureValue } from '../recording/figure';
import type { FigureDefinition, Organ } from '../recording/figure-catalogue';
import type { Findings, PhaseFindings } from '../recording/findings';
import { formatClock } from '../units/time';

/** A figure in words: the large part, and the small lines beneath it. */
export interface FigureWords {
  readonly large: string;
  readonly small: readonly string[];
}

const fixed = (value: number, decimals: number): string =>
  value
    .toFixed(decimals)
    .replace(/^-(?=0(\.0*)?$)/, '')
    .replace('-', '−');

/** A figure as the table shows it; a withheld one is a dash with its reason. */
export function figureWords(
  value: FigureValue | undefined,
  definition: Pick<FigureDefinition, 'decimals'>,
): FigureWords {
  if (!value) return { large: '—', small: ['not computed'] };
  switch (value.kind) {
    case 'number':
      return {
        large: fixed(value.value, definition.decimals),
        small: [...(value.basis === null ? [] : [value.basis]), ...value.marks],
      };
    case 'count':
      return { large: `${value.count} of ${value.of}`, small: [value.what, ...value.marks] };
    case 'withheld':
      return { large: '—', small: [value.reason] };
  }
}

/** Said of a figure that two phases of unlike length cannot be compared in, or that was not compared. */
export const NOT_COMPARED = 'not compared';

/** A change as the table shows it: with its sign, a plus too. */
export function changeWords(
  value: FigureValue | undefined,
  definition: Pick<FigureDefinition, 'decimals' | 'change'>,
): FigureWords {
  if (definition.change === 'none') return { large: '—', small: [NOT_COMPARED] };
  if (!value) return { large: '—', small: [NOT_COMPARED] };
  const words = figureWords(value, definition);
  const grows = value.kind === 'number' && /[1-9]/.test(words.large) && value.value > 0;
  return grows ? { ...words, large: `+${words.large}` } : words;
}

/** What is said once for many figures of an organ and phase, so that it need not stand beside each. */
export interface SharedWords {
  /** The basis that most of them stand on, null where none is shared. */
  readonly basis: string | null;
  /** The reason why several are withheld, null where none is shared. */
  readonly reason: string | null;
}

/** What the figures of a column share. */
export function sharedWords(values: readonly (FigureValue | undefined)[]): SharedWords {
  const bases: string[] = [];
  const reasons: string[] = [];
  for (const value of values) {
    if (value?.kind === 'number' && value.basis !== null) bases.push(value.basis);
    if (value?.kind === 'withheld') reasons.push(value.reason);
  }
  return { basis: mostUsed(bases, 2), reason: mostUsed(reasons, 3) };
}

/** The text that is there most often, null where none is there at least so often. */
function mostUsed(texts: readonly string[], least: number): string | null {
  const counts = new Map<string, number>();
  for (const text of texts) counts.set(text, (counts.get(text) ?? 0) + 1);
  const [text, count] = [...counts].sort((a, b) => b[1] - a[1])[0] ?? [null, 0];
  return count >= least ? text : null;
}

/** What is left of a phase for an organ, in words; '' where nothing need be said. */
export function adequacyWords(phase: PhaseFindings, organ: Organ): string {
  if (organ === 'breathing') return '';
  const stomach = organ === 'stomach';
  const adequacy = stomach ? phase.adequacyStomach : phase.adequacyHeart;
  if (adequacy === 'enough') return '';
  const keptS = stomach ? phase.keptStomachS : phase.keptHeartS;
  const share = Math.floor((100 * keptS) / (phase.toS - phase.fromS));
  const word = adequacy === 'limited' ? 'limited' : 'not reportable';
  return `${phase.name} is ${word}: ${share} % kept`;
}

/** From and to of a stretch, whole minutes without their seconds: "0:00–0:30". */
export function stretchWords(fromS: number, toS: number): string {
  const short = (s: number) => formatClock(s).replace(/^(\d+:\d\d):00$/, '$1');
  return `${short(fromS)}–${short(toS)}`;
}

/** The pair of phases the table begins with: fasting and fed where they are, else the first, alone. */
export function firstPair(findings: Findings): readonly [left: string, right: string | null] {
  const names = findings.phases.map((phase) => phase.name);
  const left = names.includes('fasting') ? 'fasting' : (names[0] ?? '');
  const fed = names.find((name) => /^fed(-\d+)?$/.test(name) && name !== left) ?? null;
  return [left, fed];
}
