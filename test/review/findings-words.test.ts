import { describe, expect, it } from 'vitest';
import { numberFigure, withheld } from '../../src/recording/figure';
import type { Findings, PhaseFindings } from '../../src/recording/findings';
import {
  adequacyWords,
  changeWords,
  figureWords,
  firstPair,
  sharedMarks,
  sharedWords,
  smallWords,
  stretchWords,
} from '../../src/review/findings-words';

const CPM = { decimals: 2, change: 'difference' } as const;

const phase = (name: string, parts: Partial<PhaseFindings> = {}): PhaseFindings => ({
  name,
  phase: name.replace(/ .*/, ''),
  fromS: 0,
  toS: 1800,
  keptStomachS: 1800,
  keptHeartS: 1800,
  adequacyStomach: 'enough',
  adequacyHeart: 'enough',
  figures: {},
  ...parts,
});

describe('a figure in the findings', () => {
  it('is written with its decimals and what it stands on', () => {
    expect(figureWords(numberFigure(2.9, '27 epochs', ['derived']), CPM)).toEqual({
      large: '2.90',
      small: ['27 epochs', 'derived'],
    });
  });

  it('is a count where percent would say too much', () => {
    const count = { kind: 'count', count: 5, of: 7, what: 'epochs', marks: [] } as const;
    expect(figureWords(count, CPM)).toEqual({ large: '5 of 7', small: ['epochs'] });
  });

  it('is never an empty cell', () => {
    expect(figureWords(withheld('under 10 clean minutes'), CPM)).toEqual({
      large: '—',
      small: ['under 10 clean minutes'],
    });
    expect(figureWords(undefined, CPM).large).toBe('—');
    expect(changeWords(undefined, CPM).large).toBe('—');
  });
});

describe('a change in the findings', () => {
  it('carries its sign, but none on what rounds to nought', () => {
    expect(changeWords(numberFigure(0.16), CPM).large).toBe('+0.16');
    expect(changeWords(numberFigure(-13.4), { ...CPM, decimals: 1 }).large).toBe('−13.4');
    expect(changeWords(numberFigure(0.004), CPM).large).toBe('0.00');
    expect(changeWords(numberFigure(-0.004), CPM).large).toBe('0.00');
  });

  it('is not made for figures that grow with the length of a phase', () => {
    expect(changeWords(numberFigure(12), { ...CPM, change: 'none' }).large).toBe('—');
  });
});

describe('what is said once for many figures', () => {
  it('is the basis most of them share and the reason several are withheld for', () => {
    const reason = withheld('under 10 clean minutes');
    const values = [
      numberFigure(1, '27 epochs'),
      numberFigure(2, '27 epochs'),
      numberFigure(3, 'of 30.0 min'),
      reason,
      reason,
      reason,
    ];
    expect(sharedWords(values)).toEqual({ basis: '27 epochs', reason: 'under 10 clean minutes' });
    expect(sharedWords(values.slice(1, 5))).toEqual({ basis: null, reason: null });
  });
});

describe('how much of a phase is left', () => {
  it('is said where it limits the organ’s figures', () => {
    const limited = phase('fasting', { adequacyStomach: 'limited', keptStomachS: 1100 });
    expect(adequacyWords(limited, 'stomach')).toBe('fasting is limited: 61 % kept');
    expect(adequacyWords(limited, 'heart')).toBe('');
    const gone = phase('fed', { adequacyHeart: 'not-reportable', keptHeartS: 180 });
    expect(adequacyWords(gone, 'heart')).toBe('fed is without percentages: 10 % kept');
  });
});

describe('the phases shown at first', () => {
  const findings = (...names: string[]): Findings => ({
    edit: 0,
    phases: names.map((name) => phase(name)),
    changes: [],
    seen: [],
    warnings: [],
  });

  it('are fasting and fed, whole', () => {
    expect(firstPair(findings('fasting', 'meal', 'fed 0-30', 'fed', 'fed 30-60'))).toEqual([
      'fasting',
      'fed',
    ]);
  });

  it('are the one there is where no meal was given', () => {
    expect(firstPair(findings('whole'))).toEqual(['whole', null]);
  });

  it('have their times in whole minutes where they are', () => {
    expect(stretchWords(0, 1800)).toBe('0:00–0:30');
    expect(stretchWords(2520, 5399.6)).toBe('0:42–1:30');
    expect(stretchWords(90, 3600)).toBe('0:01:30–1:00');
  });
});

describe('the small lines once shared words stand above', () => {
  const shared = { basis: '27 epochs', reason: null };

  it('a part of the whole is written short, and none of it not at all', () => {
    expect(smallWords(['22 of 27 epochs'], shared)).toEqual(['22 of 27']);
    expect(smallWords(['0 of 27 epochs'], shared)).toEqual([]);
    expect(smallWords(['27 epochs'], shared)).toEqual([]);
    expect(smallWords(['44 epochs'], shared)).toEqual(['44 epochs']);
  });

  it('percentages of one whole share that whole, whatever their parts', () => {
    const values = [numberFigure(81, '22 of 27 epochs'), numberFigure(19, '5 of 27 epochs')];
    expect(sharedWords(values).basis).toBe('27 epochs');
  });

  it('a mark that holds in every phase is said once at the row', () => {
    const lf = [numberFigure(1, null, ['inside LF', 'slow']), numberFigure(2, null, ['inside LF'])];
    expect(sharedMarks(lf)).toEqual(['inside LF']);
  });
});
