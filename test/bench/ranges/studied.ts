import { NO_BREATHING } from '../../../src/heart/breathing';
import { heartChanceRanges } from '../../../src/heart/chance-ranges';
import { heartFigures } from '../../../src/heart/heart-figures';
import { rrSeries } from '../../../src/heart/rr-series';
import type { ChanceRange } from '../../../src/numeric/chance-range';
import { atOnce } from '../../../src/numeric/in-steps';
import type { Figures } from '../../../src/recording/figure';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import { stomachChanceRanges } from '../../../src/stomach/chance-ranges';
import { stomachFigures } from '../../../src/stomach/figures';
import { beatsAfter, RATE_HZ } from '../../heart/beats';
import { rhythmOfLead } from '../../stomach/leads';

/** A phase of an invented study: its figures with their ranges by chance. */
export interface Studied {
  readonly figures: Figures;
  readonly ranges: Readonly<Record<string, ChanceRange>>;
}

const partOf = (minutes: number) => ({ name: 'fasting', fromS: 0, toS: 60 * minutes });

/** The stomach's figures of a lead at 4 Hz. */
export function stomachStudied(lead: Float64Array, minutes: number): Studied {
  const settings = DEFAULT_SETTINGS;
  const part = partOf(minutes);
  const analysis = rhythmOfLead(lead);
  const { figures, keptS } = stomachFigures({ analysis, phase: part, spoiled: [], settings });
  return {
    figures,
    ranges: atOnce(stomachChanceRanges({ analysis, part, figures, keptS, settings })),
  };
}

/** The heart's figures of intervals in ms. */
export function heartStudied(rrMs: readonly number[], minutes: number): Studied {
  const beats = beatsAfter(rrMs);
  const input = {
    rr: rrSeries(beats, RATE_HZ, []),
    beats,
    rateHz: RATE_HZ,
    part: partOf(minutes),
    blocked: [],
    settings: DEFAULT_SETTINGS,
    timingSdMs: 1,
    breathing: NO_BREATHING,
  };
  const { figures } = heartFigures(input);
  return { figures, ranges: atOnce(heartChanceRanges({ ...input, figures })) };
}
