import { describe, expect, it } from 'vitest';
import { parseArguments, WrongArguments } from '../../workers/command-line';

describe('the command line', () => {
  it('reads every option of files.md', () => {
    const request = parseArguments(
      'a.edf --slow #2~#3 --slow EGG1 --heart #1 --breath Resp --phases fasting:0-1800,meal:1800-2400,fed:0:42:00-5400 --route fractional --out results'.split(
        ' ',
      ),
    );
    expect(request).toMatchObject({
      studies: ['a.edf'],
      slow: ['#2~#3', 'EGG1'],
      heart: '#1',
      breath: 'Resp',
      route: 'fractional',
      out: 'results',
    });
    expect(parseArguments(['a.edf', '--code', ' INV-7 ']).code).toBe('INV-7');
    expect(parseArguments(['a.edf', '--reference', 'ours.csv']).reference).toBe('ours.csv');
    expect(request.reference).toBeNull();
    expect(request.code).toBeNull();
    expect(request.phases?.at(-1)).toEqual({ name: 'fed', fromS: 2520, toS: 5400 });
  });

  it.each([
    [[], 'at least one study'],
    [['a.edf', '--colour', 'red'], '--colour'],
    [['a.edf', '--out'], '--out wants a value'],
    [['a.edf', '--route', 'magic'], 'magic'],
    [['a.edf', '--phases', 'fasting:1800-0'], 'is no phase'],
    [['a.edf', '--phases', 'fasting:0-600,fed:300-900'], 'begins before'],
    [['a.edf', 'b.edf', '--session', 's.json'], 'one study'],
    [['a.edf', '--rate', 'fast'], '--rate'],
    [['a.edf', 'b.edf', '--code', 'X'], '--code goes with one study'],
    [['a.edf', '--session', 's.json', '--code', 'X'], 'leave out --code'],
    [['a.edf', '--code', ' '], '--code wants a value'],
  ])('%j is refused in words', (words, part) => {
    expect(() => parseArguments(words)).toThrow(WrongArguments);
    expect(() => parseArguments(words)).toThrow(part);
  });
});
