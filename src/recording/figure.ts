/** A figure as shown: a number, a count where percent would say too much, or withheld with its reason. */
export type FigureValue =
  | {
      readonly kind: 'number';
      readonly value: number;
      /** What the number stands on, as "27 epochs"; null where there is nothing to count. */
      readonly basis: string | null;
      /** Marks to print beside it ("breathing below 9 a minute"). */
      readonly marks: readonly string[];
    }
  | {
      readonly kind: 'count';
      readonly count: number;
      readonly of: number;
      readonly what: string;
      readonly marks: readonly string[];
    }
  | { readonly kind: 'withheld'; readonly reason: string };

export const withheld = (reason: string): FigureValue => ({ kind: 'withheld', reason });
export const numberFigure = (
  value: number,
  basis: string | null = null,
  marks: readonly string[] = [],
): FigureValue => ({ kind: 'number', value, basis, marks });

/** A figure as a number, one given as a count as its percentage; NaN where it is withheld. */
export function numberOf(figure: FigureValue): number {
  if (figure.kind === 'number') return figure.value;
  return figure.kind === 'count' ? (100 * figure.count) / figure.of : Number.NaN;
}

/** Figures of one phase by key of the figure catalogue. */
export type Figures = Readonly<Record<string, FigureValue>>;

/** Something a person should look at, seen in passing; never a diagnosis. */
export interface SeenInPassing {
  readonly fromS: number;
  readonly toS: number;
  readonly text: string;
}

/** How the mark of a figure begins whose epochs are kept though a part of each is spoiled. */
export const PARTLY_SPOILED = 'partly spoiled';
