import { adequacyReason } from '../recording/adequacy';
import { type FigureValue, PARTLY_SPOILED } from '../recording/figure';
import type { Organ } from '../recording/figure-catalogue';
import type { Findings, PhaseFindings } from '../recording/findings';
import { formatClock } from '../units/time';

export {
  changeWords,
  type FigureWords,
  figureWords,
  NOT_COMPARED,
} from '../recording/figure-words';

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
    if (value?.kind === 'number' && value.basis !== null) bases.push(wholeOf(value.basis));
    if (value?.kind === 'withheld') reasons.push(value.reason);
  }
  return { basis: mostUsed(bases, 2), reason: mostUsed(reasons, 3) };
}

const PART_OF = /^(\d+) of (\d+ \D+)$/;

/** What a basis counts in all: "22 of 27 epochs" stands on 27 epochs. */
const wholeOf = (basis: string): string => PART_OF.exec(basis)?.[2] ?? basis;

/**
 * The small lines beneath a figure once the shared words stand above: a part without its unit ("22 of 27"), nothing where
 * the whole or none of it is counted, and no word on epochs filled, which the figure's dialog says.
 */
export function smallWords(
  small: readonly string[],
  { basis, reason }: SharedWords,
): readonly string[] {
  return small.flatMap((line) => {
    if (
      line === basis ||
      line === reason ||
      line.startsWith(PARTLY_SPOILED) ||
      line.startsWith('limited: ')
    )
      return [];
    const part = PART_OF.exec(line);
    if (!part) return [line];
    return part[1] === '0' ? [] : [line.replace(/ \D+$/, '')];
  });
}

/** Marks that every value of a row carries: said once at its name. */
export function sharedMarks(values: readonly (FigureValue | undefined)[]): readonly string[] {
  const marks = values.map((value) => (value && value.kind !== 'withheld' ? value.marks : []));
  const [first = [], ...others] = marks;
  return first.filter(
    (mark) => !mark.startsWith(PARTLY_SPOILED) && others.every((some) => some.includes(mark)),
  );
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
  const nothing = phase.figures[stomach ? 'stomach_kept_min' : 'heart_kept_min'];
  if (adequacy === 'enough' || nothing?.kind === 'withheld') return '';
  const keptS = stomach ? phase.keptStomachS : phase.keptHeartS;
  const word = adequacy === 'limited' ? 'limited' : 'without percentages';
  return `${phase.name} is ${word}: ${adequacyReason(adequacy, keptS, phase.toS - phase.fromS)}`;
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
