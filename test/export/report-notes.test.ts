import { describe, expect, it } from 'vitest';
import { createNotes, inTurn, noteLetter } from '../../src/export/report-notes';

describe('the small print below a table', () => {
  it('letters run a to z, then aa, ab and on', () => {
    expect([0, 25, 26, 27, 51, 52, 701, 702].map(noteLetter)).toEqual([
      'a',
      'z',
      'aa',
      'ab',
      'az',
      'ba',
      'zz',
      'aaa',
    ]);
  });

  it('a text keeps its letter wherever it is said again', () => {
    const notes = createNotes();
    expect(['derived', '27 epochs', 'derived'].map(notes.letterOf)).toEqual(['a', 'b', 'a']);
    expect(notes.list()).toEqual([
      { letter: 'a', text: 'derived' },
      { letter: 'b', text: '27 epochs' },
    ]);
  });

  it('counts of several columns share their words and nothing with a digit', () => {
    expect(inTurn(['27 epochs', '44 epochs', '17 epochs'])).toBe('27; 44; 17 epochs');
    expect(inTurn(['4 of 6 segments', '4 of 4 segments'])).toBe('4 of 6; 4 of 4 segments');
    expect(inTurn(['R times to 0.08 ms', 'R times to 0.09 ms'])).toBe('R times to 0.08; 0.09 ms');
    expect(inTurn(['filled in 5 epochs', 'filled in 1 epoch'])).toBe('filled in 5 epochs; 1 epoch');
  });

  it('what all columns say alike is said once, and a silent column has a dash', () => {
    expect(inTurn(['derived', 'derived', null])).toBe('derived');
    expect(inTurn(['30 NN', null, '20 NN'])).toBe('30; –; 20 NN');
    expect(inTurn([null, null])).toBe('');
  });

  it('a text that is the whole of another still says something in every column', () => {
    expect(inTurn(['of min', 'of 20 min'])).toBe('of min; 20 min');
  });
});
