import { type FigureDefinition, type FigureRow, figureRow, type Organ } from './figure-definition';
import { HEART_ROWS } from './heart-figure-rows';
import { STOMACH_ROWS } from './stomach-figure-rows';

export type { ChangeRule, FigureDefinition, Organ } from './figure-definition';

const BREATHING_ROWS: readonly FigureRow[] = [
  figureRow('breathing_bpm', 'Breathing', '1/min', 1, { main: true }),
  figureRow('movement_pct', 'Movement', '% of time', 0, { main: true }),
];

const withOrgan = (organ: Organ, rows: readonly FigureRow[]): readonly FigureDefinition[] =>
  rows.map((one) => ({ ...one, organ }));

/** Every figure in the order it is shown. */
export const FIGURES: readonly FigureDefinition[] = [
  ...withOrgan('stomach', STOMACH_ROWS),
  ...withOrgan('heart', HEART_ROWS),
  ...withOrgan('breathing', BREATHING_ROWS),
];
