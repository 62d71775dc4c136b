import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { csvText, flagCell, numberCell, timeCell } from '../../src/export/csv';
import { roundedTo, writeNumber } from '../../src/export/write-number';
import { always } from '../properties';
import { readCsv } from './read-csv';

describe('numbers in files', () => {
  it('have a point, their decimals and no minus before nought', () => {
    expect(writeNumber(3, 2)).toBe('3.00');
    expect(writeNumber(-2.345_678, 3)).toBe('-2.346');
    expect(writeNumber(-0, 1)).toBe('0.0');
    expect(writeNumber(-0.004, 2)).toBe('0.00');
    expect(writeNumber(-0.4, 0)).toBe('0');
    expect(writeNumber(-0.006, 2)).toBe('-0.01');
  });
  it('go by the stored binary value at a half: 0.5 and 2.5 up, 1.005 (stored below) down', () => {
    expect(writeNumber(0.5, 0)).toBe('1');
    expect(writeNumber(2.5, 0)).toBe('3');
    expect(writeNumber(-2.5, 0)).toBe('-3');
    expect(writeNumber(1.005, 2)).toBe('1.00');
  });
  it('are finite, or it is an error', () => {
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY, 1e21])
      expect(() => writeNumber(value, 2)).toThrow(RangeError);
    expect(roundedTo(2.349, 1)).toBe(2.3);
    expect(Object.is(roundedTo(-0.01, 1), 0)).toBe(true);
  });
});

describe('a delimited file', () => {
  it('ends every line with a line feed and leaves out what does not apply', () => {
    const rows = [[timeCell(1.5), numberCell(null, 1), numberCell(Number.NaN, 1), flagCell(true)]];
    expect(csvText(['a', 'b', 'c', 'd'], rows)).toBe('a,b,c,d\n1.500000,,,1\n');
  });
  it('puts an apostrophe before text that a spreadsheet would run, and none before numbers', () => {
    const rows = ['=1+1', '+1', '-1', '@a', 'a=1', "'x"].map((text) => [text, numberCell(-1, 0)]);
    expect(readCsv(csvText(['text', 'n'], rows)).slice(1)).toEqual([
      ["'=1+1", '-1'],
      ["'+1", '-1'],
      ["'-1", '-1'],
      ["'@a", '-1'],
      ['a=1', '-1'],
      ["'x", '-1'],
    ]);
  });
  it('is read back as it was by a reader of RFC 4180, whatever the text', () => {
    const cell = fc.string({ unit: fc.constantFrom('a', ',', '"', '\n', '\r', ' ', 'µ', '=') });
    const rows = fc.array(fc.tuple(cell, cell), { maxLength: 10 });
    fc.assert(
      fc.property(rows, (list) => {
        const expected = list.map((row) =>
          row.map((text) => (text.startsWith('=') ? `'${text}` : text)),
        );
        expect(readCsv(csvText(['one', 'two'], list))).toEqual([['one', 'two'], ...expected]);
      }),
      always(100),
    );
  });
  it('never has a row of another length than its header', () => {
    expect(() => csvText(['a', 'b'], [['x']])).toThrow('a row of 1 under 2');
  });
});
