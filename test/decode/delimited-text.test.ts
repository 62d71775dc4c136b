import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import type { TextReading } from '../../src/decode/text-reading';
import { refused } from './refused';

const open = (text: BlobPart, reading: TextReading | null = null, name = 'study.csv') =>
  openRecording(new Blob([text]), name, reading);
const samples = async (text: BlobPart, reading: TextReading | null = null) => {
  const source = await open(text, reading);
  const { channels } = source.recording;
  return {
    ...source.recording,
    values: await Promise.all(
      channels.map(async (channel) => [...(await source.read(channel.index, 0, 1e9))]),
    ),
  };
};
const GIVEN: TextReading = { rateHz: 250, unit: 'uV' };

describe('a table of samples as text', () => {
  it.each([
    ['comma', 'time (s),E1 (uV),E2 (uV)\n0,1.5,-2\n0.004,2.5,-3\n0.008,3.5,-4\n'],
    [
      'semicolon and decimal comma',
      'time (s);E1 (uV);E2 (uV)\n0,000;1,5;-2\n0,004;2,5;-3\n0,008;3,5;-4\n',
    ],
    ['tab', 'time (s)\tE1 (uV)\tE2 (uV)\n0\t1.5\t-2\n0.004\t2.5\t-3\n0.008\t3.5\t-4\n'],
    [
      'tab and decimal comma',
      'time (s)\tE1 (uV)\tE2 (uV)\n0\t1,5\t-2\n0,004\t2,5\t-3\n0,008\t3,5\t-4\n',
    ],
    [
      'blanks',
      '  time_s  E1_uV  E2_uV\n  0.000   1.5   -2\n  0.004   2.5   -3\n  0.008   3.5   -4\n',
    ],
    ['a units row', 'time,E1,E2\ns,uV,uV\n0,1.5,-2\n0.004,2.5,-3\n0.008,3.5,-4\n'],
    ['a units row in brackets', 'time;E1;E2\n[ms];[uV];[\u00b5V]\n0;1.5;-2\n4;2.5;-3\n8;3.5;-4\n'],
    ['milliseconds', 'time (ms),E1 (uV),E2 (uV)\n0,1.5,-2\n4,2.5,-3\n8,3.5,-4\n'],
    ['mV', 'time (s),E1 (mV),E2 (mV)\n0,0.0015,-0.002\n0.004,0.0025,-0.003\n0.008,0.0035,-0.004\n'],
    [
      'clock',
      'clock,E1 (uV),E2 (uV)\n9:00:00.000,1.5,-2\n9:00:00.004,2.5,-3\n9:00:00.008,3.5,-4\n',
    ],
    [
      'CRLF and no line end at the end',
      'time (s),E1 (uV),E2 (uV)\r\n0,1.5,-2\r\n0.004,2.5,-3\r\n0.008,3.5,-4',
    ],
    [
      'quotes',
      '"time (s)","E1 (uV)","E2 (uV)"\n"0","1.5","-2"\n"0.004","2.5","-3"\n"0.008","3.5","-4"\n',
    ],
    [
      'comments and blank lines',
      '# exported\n\ntime (s),E1 (uV),E2 (uV)\n0,1.5,-2\n# here\n0.004,2.5,-3\n0.008,3.5,-4\n\n\n',
    ],
    [
      'a delimiter at the end of each row',
      'time (s);E1 (uV);E2 (uV);\n0;1.5;-2;\n0.004;2.5;-3;\n0.008;3.5;-4;\n',
    ],
    ['a byte-order mark', '\ufefftime (s),E1 (uV),E2 (uV)\n0,1.5,-2\n0.004,2.5,-3\n0.008,3.5,-4\n'],
  ])('parted by / with %s', async (_, text) => {
    const read = await samples(text);
    expect(read.channels.map((channel) => channel.label)).toEqual(['E1', 'E2']);
    expect(read.channels.map((channel) => channel.rateHz)).toEqual([250, 250]);
    expect(read.durationS).toBe(0.012);
    [1.5, 2.5, 3.5].forEach((value, i) => {
      expect(read.values[0][i]).toBeCloseTo(value, 9);
      expect(read.values[1][i]).toBeCloseTo(-2 - i, 9);
    });
    expect(read.gaps).toEqual([]);
    expect(read.start).toMatchObject({ kind: 'unknown' });
    expect(read.found.filter((found) => found.severity === 'warning')).toEqual([]);
  });

  it('in UTF-16 and in Windows-1252 is read by its encoding', async () => {
    const text = 'time (s);E1 (\u00b5V)\n0;1\n0.5;2\n1;3\n';
    const utf16 = Uint8Array.from([0xff, 0xfe, ...[...text].flatMap((c) => [c.charCodeAt(0), 0])]);
    expect((await samples(utf16)).values).toEqual([[1, 2, 3]]);
    const latin = Uint8Array.from([...text].map((c) => c.charCodeAt(0)));
    const read = await samples(latin);
    expect(read.values).toEqual([[1, 2, 3]]);
    expect(read.found.map((found) => found.what)).toContain(
      'the text is not UTF-8 and was read as Windows-1252',
    );
  });

  it('without names and time column takes rate and unit from the person', async () => {
    const read = await samples('1.5 7\n2.5 9\n0.5 8\n', { rateHz: 200, unit: 'mV' });
    expect(read.channels.map((channel) => channel.label)).toEqual(['channel 1', 'channel 2']);
    expect(read.channels[0].rateHz).toBe(200);
    expect(read.values).toEqual([
      [1500, 2500, 500],
      [7000, 9000, 8000],
    ]);
  });

  it('of one column needs no delimiter', async () => {
    expect((await samples('12.5\n13\n-14\n', GIVEN)).values).toEqual([[12.5, 13, -14]]);
    expect((await samples('E1 (uV)\n12,5\n13,25\n-14,5\n', GIVEN)).values).toEqual([
      [12.5, 13.25, -14.5],
    ]);
  });

  it('warns where a comma may part cells or decimals', async () => {
    const read = await samples('12,5\n13,2\n14,5\n', GIVEN);
    expect(read.found.some((found) => found.what.includes('if the comma is a decimal one'))).toBe(
      true,
    );
  });

  it('reads an unnamed first column that rises evenly as time, and says so', async () => {
    const rows = Array.from({ length: 8 }, (_, i) => `${(i * 0.004).toFixed(3)},${i * i}`);
    const read = await samples(rows.join('\n'), { rateHz: null, unit: 'uV' });
    expect(read.channels).toHaveLength(1);
    expect(read.channels[0].rateHz).toBe(250);
    const words = read.found.filter((found) => found.severity === 'warning');
    expect(words.map((found) => found.what).join()).toMatch(/rises evenly.*in seconds/s);
  });

  it('does not take a counter of rows for time', async () => {
    const text = Array.from({ length: 8 }, (_, i) => `${i},${i * i}`).join('\n');
    expect((await refused(open(text, { rateHz: null, unit: 'uV' }))).remedy).toBe(
      'Give the rate in samples a second.',
    );
    expect((await samples(text, GIVEN)).values).toEqual([[0, 1, 4, 9, 16, 25, 36, 49]]);
  });

  it('keeps a column in another unit as breathing lead', async () => {
    const read = await samples('t,E1 (uV),belt (a.u.)\n0,1,5\n0.5,2,6\n1,3,7\n');
    expect(read.channels[1].unit).toEqual({ kind: 'unknown', text: 'a.u.' });
    expect(read.values[1]).toEqual([5, 6, 7]);
  });

  it('goes on past midnight', async () => {
    const read = await samples('clock;E1 (uV)\n23:59:59.5;1\n0:00:00.0;2\n0:00:00.5;3\n');
    expect(read.channels[0].rateHz).toBe(2);
    expect(read.start).toEqual({ kind: 'unknown', raw: '23:59:59' });
  });
});

describe('missing values', () => {
  it('become NaN and gaps of their channel', async () => {
    const read = await samples(
      't (s),E1 (uV),E2 (uV)\n0,1,5\n0.5,,6\n1,NaN,7\n1.5,2,NA\n2,3,-\n2.5,4,8\n',
    );
    expect(read.values).toEqual([
      [1, Number.NaN, Number.NaN, 2, 3, 4],
      [5, 6, 7, Number.NaN, Number.NaN, 8],
    ]);
    expect(read.gaps).toEqual([
      { channel: 0, fromS: 0.5, toS: 1.5 },
      { channel: 1, fromS: 1.5, toS: 2.5 },
    ]);
  });

  it('are the rows that a jump of the time leaves out', async () => {
    const read = await samples('t (s),E1 (uV),E2 (uV)\n0,1,5\n0.5,2,6\n1,3,7\n3,4,8\n3.5,5,9\n');
    expect(read.values[0]).toEqual([1, 2, 3, Number.NaN, Number.NaN, Number.NaN, 4, 5]);
    expect(read.gaps).toEqual([{ channel: null, fromS: 1.5, toS: 3 }]);
    expect(read.durationS).toBe(4);
  });

  it('are blank lines in a table of one column', async () => {
    expect((await samples('1.5\n2.5\n\n3.5\n\n', GIVEN)).values).toEqual([
      [1.5, 2.5, Number.NaN, 3.5],
    ]);
  });
});

describe('the time column', () => {
  const table = (times: readonly (number | string)[]) =>
    `t (s),E1 (uV)\n${times.map((time, i) => `${time},${i}`).join('\n')}\n`;

  it('written to the millisecond still gives 360 Hz', async () => {
    const times = Array.from({ length: 3600 }, (_, i) => (i / 360).toFixed(3));
    const read = await samples(table(times));
    expect(read.channels[0].rateHz).toBe(360);
    expect(read.found.some((found) => /scatter by up to 0.44 ms/.test(found.what))).toBe(true);
  });

  it('keeps a rate that is no whole number', async () => {
    const read = await samples(
      table(Array.from({ length: 100 }, (_, i) => (i * 0.016).toFixed(3))),
    );
    expect(read.channels[0].rateHz).toBeCloseTo(62.5, 9);
  });

  it('gives way to the rate that a person gives', async () => {
    expect((await samples(table([0, 1, 2, 3]), { rateHz: 4, unit: null })).channels[0].rateHz).toBe(
      4,
    );
  });

  it.each([
    ['stands still', [0, 0.5, 0.5, 1], /row 4 is not later/],
    ['runs backwards', [0, 0.5, 1, 0.7], /row 5 is not later/],
    ['is uneven', [0, 1, 1.9, 3.5, 3.7, 5.2, 5.3, 7.2, 9], /not evenly spaced: row/],
    ['jumps by years', [0, 1, 2, 1e9], /jumps by 999999998 s at row 5/],
  ])('is refused where it %s', async (_, times, message) => {
    const failure = await refused(open(table(times)));
    expect(failure.kind).toBe('broken-format');
    expect(failure.message).toMatch(message);
    expect(failure.remedy).toMatch(/give the rate/);
  });
});

describe('refusals of text', () => {
  it('ask for the rate', async () => {
    expect(await refused(open('E1 (uV)\n1\n2\n3\n'))).toMatchObject({
      kind: 'needs-reading',
      remedy: 'Give the rate in samples a second.',
    });
  });

  it('ask for the unit', async () => {
    expect(await refused(open('t (s),E1\n0,1\n0.5,2\n1,3\n'))).toMatchObject({
      kind: 'needs-reading',
      message: 'study.csv: column 2 (“E1”) does not say its unit.',
      remedy: 'Give the unit of the columns: V, mV, uV or nV.',
    });
  });

  it('name a bad cell by row and column', async () => {
    const failure = await refused(open('t (s),E1 (uV)\n0,1\n0.5,2\n1,<b>x</b>\n1.5,3\n'));
    expect(failure).toMatchObject({ kind: 'broken-format', place: 'row 4, column 2' });
    expect(failure.message).toContain('“<b>x</b>” in row 4, column 2 (“E1”) is no number');
  });

  it('count comments and blank lines as rows of the file', async () => {
    const text = '# a\nt (s),E1 (uV)\n0,1\n\n0.5,2\n# b\n1,0x10\n1.5,3\n';
    expect((await refused(open(text))).place).toBe('row 7, column 2');
    const times = '# a\nt (s),E1 (uV)\n0,1\n\n0.5,2\n# b\n1,3\n0.7,3\n';
    expect((await refused(open(times))).place).toBe('row 8, time column');
  });

  it('name a row with another number of cells, but not the last one cut off', async () => {
    expect((await refused(open('t (s),E1 (uV)\n0,1\n0.5,2,9\n1,3\n1.5,3\n'))).message).toMatch(
      /row 3 has 3 cells, the others have 2/,
    );
    const read = await samples('t (s),E1 (uV),E2 (uV)\n0,1,1\n0.5,2,1\n1,3,1\n1.5,4');
    expect(read.values[0]).toEqual([1, 2, 3]);
    expect(read.found.some((found) => found.what.includes('cut off'))).toBe(true);
  });

  it('name text that is no table', async () => {
    expect((await refused(open('Dear all,\nhere is the report.\n'))).message).toMatch(
      /no table of numbers/,
    );
  });

  it.each<[TextReading, RegExp]>([
    [{ rateHz: 0, unit: 'uV' }, /rate of 0/],
    [{ rateHz: Number.NaN, unit: 'uV' }, /rate of NaN/],
    [{ rateHz: 250, unit: 'bar' }, /“bar” is none of/],
  ])('check what a person gives', async (reading, message) => {
    expect((await refused(open('1.5\n2.5\n3.5\n', reading))).message).toMatch(message);
  });

  it('end at a line without end', async () => {
    const text = `1.5\n2.5\n3.5\n${'9'.repeat(1_200_000)}`;
    expect((await refused(open(text, GIVEN))).message).toMatch(/row 4 is longer than/);
  });
});

describe('long text', () => {
  it('is the same whatever slices it is read by', async () => {
    // 400 000 rows, about 7 MB: a row lies across the border of two slices.
    const rows = Array.from(
      { length: 400_000 },
      (_, i) => `${(i / 1000).toFixed(3)};${i % 1013};µ`,
    );
    const text = rows.map((row) => row.replace(';µ', ';1\r\n')).join('');
    const source = await open(`t (s);E1 (\u00b5V);E2 (uV)\r\n${text}`);
    expect(source.recording.channels.map((channel) => channel.sampleCount)).toEqual([
      400_000, 400_000,
    ]);
    let at = 0;
    for await (const block of source.blocks([0])) {
      expect(block.firstSamples).toEqual([at]);
      block.samples[0].forEach((value, i) => {
        if (value !== (at + i) % 1013) throw new Error(`sample ${at + i} is ${value}`);
      });
      at += block.samples[0].length;
    }
    expect(at).toBe(400_000);
  });
});
