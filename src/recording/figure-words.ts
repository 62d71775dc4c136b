import type { FigureValue } from './figure';
import type { FigureDefinition } from './figure-catalogue';

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
