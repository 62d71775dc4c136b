import { describe, expect, it } from 'vitest';
import { type FigureValue, numberFigure, withheld } from '../../src/recording/figure';
import type { PhaseFindings } from '../../src/recording/findings';
import { EMPTY_PROTOCOL, type Protocol } from '../../src/recording/protocol';
import {
  rangeGrounds,
  rangesOf,
  rangeWords,
  type SiteRange,
} from '../../src/recording/site-reference';
import { INVENTED_RANGE } from './invented-range';

interface Case {
  readonly range?: Partial<SiteRange>;
  readonly phase?: string;
  readonly minutes?: number;
  readonly value?: FigureValue;
  readonly protocol?: Partial<Protocol>;
}

/** Whether a range stands beside DF of a phase. */
function stands({ range, phase = 'fasting', minutes = 30, value, protocol }: Case): boolean {
  const part: PhaseFindings = {
    name: phase,
    phase,
    fromS: 600,
    toS: 600 + 60 * minutes,
    keptStomachS: 1800,
    keptHeartS: 1800,
    adequacyStomach: 'enough',
    adequacyHeart: 'enough',
    figures: { df_median_cpm: value ?? numberFigure(3), rmssd_ms: numberFigure(30) },
  };
  const reference = { ranges: [{ ...INVENTED_RANGE, ...range }] };
  const found = rangesOf(reference, { ...EMPTY_PROTOCOL, ...protocol });
  expect(found('rmssd_ms', part)).toEqual([]);
  return found('df_median_cpm', part).length === 1;
}

describe('a range of the site stands beside a figure', () => {
  it('of the same kind of phase only, a later meal’s among them', () => {
    expect(stands({})).toBe(true);
    expect(stands({ phase: 'fed' })).toBe(false);
    expect(stands({ range: { phase: 'fed' }, phase: 'fed-2' })).toBe(true);
    expect(stands({ range: { phase: 'meal' }, phase: 'meal' })).toBe(true);
    expect(stands({ range: { phase: 'whole' }, phase: 'whole' })).toBe(true);
    expect(stands({ range: { phase: 'whole' }, phase: 'rest' })).toBe(false);
  });

  it('of the same length only, limits included', () => {
    expect(stands({ minutes: 25 })).toBe(true);
    expect(stands({ minutes: 35 })).toBe(true);
    expect(stands({ minutes: 24.9 })).toBe(false);
    expect(stands({ minutes: 35.1 })).toBe(false);
  });

  it('where the protocol has the posture and the meal it asks for, letter case aside', () => {
    const range = { posture: 'half lying', meal: 'oat  porridge' };
    expect(stands({ range, protocol: { posture: ' Half lying', meal: 'Oat porridge' } })).toBe(
      true,
    );
    expect(stands({ range, protocol: { posture: 'half lying', meal: 'soup' } })).toBe(false);
    expect(stands({ range })).toBe(false);
    expect(stands({ protocol: { posture: 'sitting', meal: 'soup' } })).toBe(true);
  });

  it('that is a number: not beside a withheld one or a count, which the range was not made of', () => {
    expect(stands({ value: withheld('too short') })).toBe(false);
    const count = { kind: 'count', count: 5, of: 7, what: 'epochs', marks: [] } as const;
    expect(stands({ value: count })).toBe(false);
  });

  it('never where the site keeps none', () => {
    const part = { figures: { df_median_cpm: numberFigure(3) } } as unknown as PhaseFindings;
    expect(rangesOf(null, EMPTY_PROTOCOL)('df_median_cpm', part)).toEqual([]);
  });
});

describe('a range in words', () => {
  it('may be open on one side, and says nothing of normal or abnormal', () => {
    expect(rangeWords(INVENTED_RANGE)).toBe('2.1–4.3');
    expect(rangeWords({ low: 61, high: null })).toBe('at least 61');
    expect(rangeWords({ low: null, high: 30 })).toBe('at most 30');
    expect(rangeWords({ low: -1.5, high: 2 })).toBe('−1.5–2');
  });

  it('says what it holds for and where it comes from', () => {
    expect(
      rangeGrounds({
        ...INVENTED_RANGE,
        posture: 'lying',
        meal: 'soup',
        minMinutes: 30,
        maxMinutes: 30,
      }),
    ).toBe('fasting of 30 min; lying; meal: soup; invented people; source: invented paper');
  });
});
