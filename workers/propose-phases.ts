import { FED_AFTER_MEAL_S, type Phase } from '../src/recording/phase';
import type { Annotation } from '../src/recording/recording';

type Mark = 'fasting' | 'meal' | 'meal-end' | 'fed';

const MARKS: readonly (readonly [Mark, RegExp])[] = [
  ['meal-end', /^(test )?meal (end|ends|ended|stop|finished|over)\b|^end of (test )?meal\b/i],
  ['fed', /^fed\b|^post-?(prandial|meal)\b|^after (the )?meal\b/i],
  ['fasting', /^fast(ing|ed)?\b|^baseline\b|^pre-?(prandial|meal)\b|^before (the )?meal\b/i],
  ['meal', /^(test )?meal\b|^start of (test )?meal\b|^eating\b/i],
];

/** What an annotation says of the protocol; null where it is about something else. */
export function phaseMark(text: string): Mark | null {
  return MARKS.find(([, pattern]) => pattern.test(text.trim()))?.[0] ?? null;
}

/**
 * Phases as the file's annotations tell them, in order and without overlap; empty where they tell none. A mark's own
 * duration counts where it has one; else a phase lasts to the next mark. Without a mark of its own the fed phase begins two
 * minutes after the meal's end. Later meals become `meal-2`, `fed-2` and so on.
 */
export function phasesFromAnnotations(
  annotations: readonly Annotation[],
  durationS: number,
): readonly Phase[] {
  const marks = annotations
    .flatMap(({ onsetS, durationS: lasts, text }) => {
      const mark = phaseMark(text);
      return mark && onsetS < durationS ? [{ mark, fromS: Math.max(0, onsetS), lasts }] : [];
    })
    .sort((a, b) => a.fromS - b.fromS);
  if (marks.length === 0) return [];
  const phases: Phase[] = [];
  let meals = 0;
  const add = (kind: 'fasting' | 'meal' | 'fed', fromS: number, toS: number) => {
    const name = kind !== 'fasting' && meals > 1 ? `${kind}-${meals}` : kind;
    const end = Math.min(toS, durationS);
    if (end > fromS && !phases.some((one) => one.name === name))
      phases.push({ name, fromS, toS: end });
  };
  marks.forEach(({ mark, fromS, lasts }, i) => {
    const next = marks.at(i + 1);
    const untilS = lasts !== null && lasts > 0 ? fromS + lasts : (next?.fromS ?? durationS);
    if (i === 0 && mark === 'meal' && fromS > 0) add('fasting', 0, fromS);
    if (mark === 'meal') meals += 1;
    if (mark === 'meal-end') {
      if (next?.mark !== 'fed') add('fed', fromS + FED_AFTER_MEAL_S, next?.fromS ?? durationS);
    } else add(mark, fromS, untilS);
    const mealEndsUnmarked = mark === 'meal' && lasts !== null && lasts > 0;
    if (mealEndsUnmarked && next?.mark !== 'fed' && next?.mark !== 'meal-end')
      add('fed', untilS + FED_AFTER_MEAL_S, next?.fromS ?? durationS);
  });
  return withoutOverlap(phases);
}

function withoutOverlap(phases: readonly Phase[]): readonly Phase[] {
  const sorted = [...phases].sort((a, b) => a.fromS - b.fromS);
  return sorted.map((phase, i) => {
    const nextS = sorted.at(i + 1)?.fromS ?? Number.POSITIVE_INFINITY;
    return { ...phase, toS: Math.min(phase.toS, nextS) };
  });
}
