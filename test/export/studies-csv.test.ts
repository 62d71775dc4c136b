import { describe, expect, it } from 'vitest';
import { studiesCsv } from '../../src/export/studies-csv';
import { inventedInput } from './invented-input';
import { readCsv } from './read-csv';

const input = inventedInput();
const rows = () => {
  const [header, ...lines] = readCsv(
    studiesCsv([
      { kind: 'analysed', folder: 'one', input },
      { kind: 'failed', folder: 'two', reason: 'two.edf: the file ends early, at "byte 7".' },
    ]),
  );
  return lines.map((line) => Object.fromEntries(line.map((cell, i) => [header[i], cell])));
};

describe('the table over several studies', () => {
  it('has a row a study and phase, with the figures as findings.json has them', () => {
    const own = rows().filter(({ study }) => study === 'one');
    expect(own.map(({ phase }) => phase)).toEqual(input.findings.phases.map(({ name }) => name));
    const [first] = input.findings.phases;
    for (const [key, figure] of Object.entries(first.figures))
      if (figure.kind === 'number') expect(Number(own[0][key]), key).toBeCloseTo(figure.value, 1);
      else expect(own[0][key], key).toBe('');
    expect(own[0]).toMatchObject({ code: input.state.study.code, failure: '' });
  });

  it('has one row for a study that failed, with its reason alone', () => {
    const failed = rows().filter(({ study }) => study === 'two');
    expect(failed).toHaveLength(1);
    const { study, failure, ...rest } = failed[0];
    expect(failure).toBe('two.edf: the file ends early, at "byte 7".');
    expect(Object.values(rest).every((cell) => cell === '')).toBe(true);
  });
});
