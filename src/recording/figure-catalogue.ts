import {
  type FigureDefinition,
  type FigureRow,
  figureRow,
  type Organ,
  OWN_RULE,
} from './figure-definition';
import { HEART_ROWS } from './heart-figure-rows';
import { STOMACH_ROWS } from './stomach-figure-rows';

export type { ChangeRule, FigureDefinition, Organ } from './figure-definition';

const BREATHING_ROWS: readonly FigureRow[] = [
  figureRow('breathing_bpm', 'Breathing', '1/min', 1, {
    main: true,
    definition:
      'Median breathing rate of the phase, from the breathing lead, else derived from R height and RR intervals (marked derived).',
    source: 'Moody 1985, Comput Cardiol (derived)',
    settings: () => 'Peak between 4 and 40 a minute in windows of 60 s',
  }),
  figureRow('movement_pct', 'Movement', '% of time', 0, {
    main: true,
    definition:
      'Share of the phase under spoiled spans with cause talk, move, cough, eat, electrode, step or burst on the reported lead.',
    source: OWN_RULE,
    settings: () => 'Spoiled spans as listed',
  }),
];

const withOrgan = (organ: Organ, rows: readonly FigureRow[]): readonly FigureDefinition[] =>
  rows.map((one) => ({ ...one, organ }));

/** Every figure in the order it is shown. */
export const FIGURES: readonly FigureDefinition[] = [
  ...withOrgan('stomach', STOMACH_ROWS),
  ...withOrgan('heart', HEART_ROWS),
  ...withOrgan('breathing', BREATHING_ROWS),
];
