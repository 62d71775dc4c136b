import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { Refusal } from '../../src/recording/failure';
import {
  faultList,
  REFERENCE_COLUMNS,
  readSiteReference,
  siteReferenceOf,
} from '../../src/session/read-site-reference';

const HEAD = REFERENCE_COLUMNS.join(',');
const GOOD = 'df_median_cpm,fasting,25,35,,,2.1,4.3,cpm,invented people,invented paper';

const rangesIn = (text: string) => {
  const read = readSiteReference(text);
  if (!read.ok) throw new Error(faultList(read.faults).join('\n'));
  return read.reference.ranges;
};
const faultsIn = (text: string): readonly string[] => {
  const read = readSiteReference(text);
  return read.ok ? [] : faultList(read.faults);
};
/** The faults of one row with one cell put in another's place. */
const faultsWith = (column: (typeof REFERENCE_COLUMNS)[number], cell: string) => {
  const cells = GOOD.split(',');
  cells[REFERENCE_COLUMNS.indexOf(column)] = cell;
  return faultsIn(`${HEAD}\n${cells.join(',')}\n`);
};

describe('a file of reference values', () => {
  it('is one range a row, with its figure, phase, lengths, limits and source', () => {
    expect(rangesIn(`${HEAD}\n${GOOD}\n`)).toEqual([
      {
        figure: 'df_median_cpm',
        phase: 'fasting',
        minMinutes: 25,
        maxMinutes: 35,
        posture: '',
        meal: '',
        low: 2.1,
        high: 4.3,
        population: 'invented people',
        source: 'invented paper',
      },
    ]);
  });

  it('may come from a spreadsheet that writes semicolons, decimal commas, quotes, a mark of UTF-8 and CRLF', () => {
    const rows = [
      HEAD.replaceAll(',', ';'),
      'df_median_cpm;Fasting;25;35;;;2,1;4,3;cpm;"people; invented";"paper ""A"",\r\ninvented"',
      ';;;;;;;;;;',
      'time_normo_pct;fed;25,5;35;;;61;;%;;invented paper',
    ];
    const ranges = rangesIn(`\ufeff${rows.join('\r\n')}\r\n`);
    expect(ranges[0]).toMatchObject({
      low: 2.1,
      high: 4.3,
      population: 'people; invented',
      source: 'paper "A", invented',
    });
    expect(ranges[1]).toMatchObject({ minMinutes: 25.5, low: 61, high: null });
  });

  it('may have its columns in any order, and remarks', () => {
    const columns = [...REFERENCE_COLUMNS].reverse();
    const cells = [...GOOD.split(',')].reverse();
    const text = `# made up\n${columns.join('\t')}\n# again, made up\n${cells.join('\t')}\n`;
    expect(rangesIn(text)).toEqual(rangesIn(`${HEAD}\n${GOOD}`));
  });

  it('keeps what looks like HTML or a formula as the text it is', () => {
    const source = '<img src=x onerror=alert(1)>=1+1';
    const [range] = rangesIn(`${HEAD}\n${GOOD.replace('invented paper', source)}\n`);
    expect(range.source).toBe(source);
  });

  it('is shown by an example in which every range says that it is invented and not for use', () => {
    const ranges = rangesIn(readFileSync('public/site-reference-example.csv', 'utf8'));
    expect(ranges.length).toBeGreaterThan(3);
    for (const { source, population } of ranges) {
      expect(source).toBe('INVENTED EXAMPLE, not for use');
      expect(population).toBe('INVENTED');
    }
  });
});

describe('what is wrong is told by row and column as a spreadsheet shows them', () => {
  it.each([
    ['figure', 'df_median', 'row 2, column figure: “df_median” is no key of a figure'],
    ['figure', '', 'row 2, column figure: an empty cell is no key'],
    ['phase', 'lunch', 'row 2, column phase: “lunch” is none of fasting, meal, fed, whole.'],
    ['min_minutes', '', 'row 2, column min_minutes: Say how long'],
    ['min_minutes', '0', 'row 2, column min_minutes: Minutes are above 0.'],
    ['max_minutes', '20', 'row 2, column max_minutes: max_minutes is below min_minutes.'],
    ['low', 'two', 'row 2, column low: “two” is no number (write 3.75).'],
    ['low', '1e999', 'row 2, column low: “1e999” is no number'],
    ['high', '2', 'row 2, column high: high is below low.'],
    ['unit', 'Hz', 'row 2, column unit: The figure is in cpm, not “Hz”.'],
    ['unit', '', 'row 2, column unit: The figure is in cpm, not an empty cell.'],
    ['source', '', 'row 2, column source: Name where the range comes from.'],
    ['population', 'x'.repeat(301), 'row 2, column population: Over 300 letters.'],
  ] as const)('%s “%s”', (column, cell, words) => {
    expect(faultsWith(column, cell)).toEqual([expect.stringContaining(words)]);
  });

  it('every one of them, at the rows as they are counted with empty rows and remarks', () => {
    const wrong = GOOD.replace('fasting', 'lunch').replace('4.3', 'much');
    expect(faultsIn(`# remark\n${HEAD}\n${GOOD}\n\n${wrong}\n`)).toEqual([
      expect.stringMatching(/^row 5, column phase: /),
      expect.stringMatching(/^row 5, column high: /),
    ]);
    const many = `${HEAD}\n${`${wrong}\n`.repeat(20)}`;
    expect(faultsIn(many)).toHaveLength(13);
    expect(faultsIn(many).at(-1)).toBe('and 28 more');
  });

  it('of columns too: missing, strange, twice, and cells beyond the head line', () => {
    expect(faultsIn(`${HEAD.replace('low,', '')}\n`)).toEqual([
      'row 1, column low: This column is missing.',
    ]);
    expect(faultsIn(`${HEAD},verdict\n${GOOD},normal\n`)).toEqual([
      'row 1, column verdict: There is no such column.',
    ]);
    expect(faultsIn(`${HEAD},low\n`)).toEqual(['row 1, column low: This column is there twice.']);
    expect(faultsIn(`${HEAD}\n${GOOD},more\n`)).toEqual([
      'row 2: The row has more cells than the head line.',
    ]);
    expect(faultsIn(`${HEAD}\n${GOOD.replace('2.1,4.3', ',')}\n`)).toEqual([
      'row 2, column low: Give low, high or both.',
    ]);
  });

  it('also where nothing is a table', () => {
    expect(faultsIn('')).toEqual(['The file is empty.']);
    expect(faultsIn(HEAD)).toEqual(['The file has a head line but no ranges below it.']);
    expect(faultsIn('PK\u0003\u0004\u0000')).toEqual([expect.stringContaining('no plain text')]);
    expect(faultsIn(`${HEAD}\n${`${GOOD}\n`.repeat(2001)}`)).toEqual([
      'The file has over 2000 ranges.',
    ]);
    expect(faultsIn('x'.repeat(1_000_001))).toEqual([expect.stringContaining('a million')]);
  });

  it('to the command line as a refusal that names the file', () => {
    expect(() => siteReferenceOf(`${HEAD}\n`, 'ours.csv')).toThrow(Refusal);
    expect(() => siteReferenceOf(`${HEAD}\n`, 'ours.csv')).toThrow(/^ours\.csv holds no reference/);
  });
});
