import { type FigureMeaning, OWN_RULE } from './figure-definition';
import { HEART_MEANINGS } from './heart-figure-meanings';
import { STOMACH_MEANINGS } from './stomach-figure-meanings';

const BREATHING_MEANINGS: Readonly<Record<string, FigureMeaning>> = {
  breathing_bpm: {
    definition:
      'Median breathing rate of the phase, from the breathing lead, else derived from R height and RR intervals (marked derived).',
    source: 'Moody 1985, Comput Cardiol (derived)',
    settings: () => 'Peak between 4 and 40 a minute in windows of 60 s',
  },
  movement_pct: {
    definition:
      'Share of the phase under spoiled spans with cause talk, move, cough, eat, electrode, step or burst on the reported lead.',
    source: OWN_RULE,
    settings: () => 'Spoiled spans as listed',
  },
};

/** What each figure of the catalogue means, by its key. Apart from the catalogue, since only who asks for it loads it. */
export const FIGURE_MEANINGS: Readonly<Record<string, FigureMeaning>> = {
  ...STOMACH_MEANINGS,
  ...HEART_MEANINGS,
  ...BREATHING_MEANINGS,
};
