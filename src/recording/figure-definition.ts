import type { Settings } from './settings';

export type Organ = 'stomach' | 'heart' | 'breathing';

/** How a figure is compared between fasting and fed. */
export type ChangeRule = 'difference' | 'none';

/** One figure of the program: what it is called and how it is written. Keys are stable; files carry them. */
export interface FigureDefinition {
  readonly key: string;
  readonly organ: Organ;
  readonly label: string;
  readonly unit: string;
  readonly decimals: number;
  readonly change: ChangeRule;
  /** Shown in the short list of the Findings pane; the rest opens below it. */
  readonly main: boolean;
}

/** What a figure means, where that comes from, and the settings it depends on, in words. */
export interface FigureMeaning {
  readonly definition: string;
  readonly source: string;
  readonly settings: (settings: Settings) => string;
}

/** A figure's row without its organ, which its table gives. */
export type FigureRow = Omit<FigureDefinition, 'organ'>;

/** A row from its parts: compared as a difference and shown in the long list unless it says otherwise. */
export const figureRow = (
  key: string,
  label: string,
  unit: string,
  decimals: number,
  rest: Partial<Pick<FigureRow, 'change' | 'main'>> = {},
): FigureRow => ({ key, label, unit, decimals, change: 'difference', main: false, ...rest });

/** Source of a rule that is this program's own. */
export const OWN_RULE = 'usual practice of the field; the exact rule is this program’s, see README';
