import { describe, expect, it } from 'vitest';
import {
  dayTime,
  fieldInteger,
  fieldNumber,
  fieldText,
  fullYear,
  longDate,
  shortDate,
} from '../../src/decode/edf-fields';

const bytes = (...values: number[]) => Uint8Array.from(values);

describe('header numbers', () => {
  it.each([
    ['500', 500],
    ['+500', 500],
    ['-500.', -500],
    ['.5', 0.5],
    ['5E2', 500],
    ['-1.25e-2', -0.0125],
  ])('reads %s', (text, value) => {
    expect(fieldNumber(text)).toEqual({ value, comma: false });
  });

  it('reads a decimal comma and says so', () => {
    expect(fieldNumber('0,5')).toEqual({ value: 0.5, comma: true });
    expect(fieldNumber('-3276,8')).toEqual({ value: -3276.8, comma: true });
  });

  it.each([
    '',
    'abc',
    '1,234',
    '1 000',
    '0x10',
    'NaN',
    'Infinity',
    '9E999',
    '1,2,3',
    '1.2.3',
    '--1',
  ])('does not guess at “%s”', (text) => {
    expect(fieldNumber(text)).toBeNull();
  });

  it('takes whole numbers only as counts', () => {
    expect(fieldInteger('250')).toBe(250);
    expect(fieldInteger('2.5')).toBeNull();
    expect(fieldInteger('9E99')).toBeNull();
  });
});

describe('header dates', () => {
  // CV-36, clipping date of Kemp & Olivan 2003.
  it.each([
    [84, 2084],
    [85, 1985],
    [99, 1999],
    [0, 2000],
    [24, 2024],
  ])('reads the year %i as %i', (two, four) => {
    expect(fullYear(two)).toBe(four);
  });

  it('reads dd.mm.yy and no other order or separator', () => {
    expect(shortDate('02.03.21')).toEqual({ year: 2021, month: 3, day: 2 });
    expect(shortDate('29.02.24')).toEqual({ year: 2024, month: 2, day: 29 });
    for (const text of [
      '00.00.00',
      '32.13.99',
      '29.02.23',
      '-',
      '2/3/2021',
      '02.03.2021',
      '12-31-20',
    ])
      expect(shortDate(text), text).toBeNull();
  });

  it('reads dd-MMM-yyyy in English', () => {
    expect(longDate('29-JAN-1956')).toEqual({ year: 1956, month: 1, day: 29 });
    expect(longDate('29-jan-1956')).toEqual({ year: 1956, month: 1, day: 29 });
    for (const text of ['31-FEB-2020', '29-JAN-56', '29-JAM-1956', 'X', 'yy'])
      expect(longDate(text), text).toBeNull();
  });

  it('reads hh.mm.ss, with colons too', () => {
    expect(dayTime('10.20.30')).toBe(37230);
    expect(dayTime('10:20:30')).toBe(37230);
    for (const text of ['24.00.00', '10.60.00', '10.20', ''])
      expect(dayTime(text), text).toBeNull();
  });
});

describe('header text', () => {
  it('takes padding off, whatever it is made of', () => {
    expect(fieldText(bytes(0x20, 0x45, 0x47, 0x47, 0x09, 0x0d, 0x00, 0x20))).toBe('EGG');
  });

  it('reads the micro sign in Latin-1 and in UTF-8', () => {
    expect(fieldText(bytes(0xb5, 0x56, 0x20))).toBe('\u00b5V');
    expect(fieldText(bytes(0xc2, 0xb5, 0x56))).toBe('\u00b5V');
    expect(fieldText(bytes(0xce, 0xbc, 0x56))).toBe('\u03bcV');
  });
});
