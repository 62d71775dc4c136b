const LATIN1 = new TextDecoder('windows-1252');
const UTF8 = new TextDecoder('utf-8', { fatal: true });

/**
 * Text of a header field: the standard's ASCII; other bytes as UTF-8 where they are valid UTF-8, else as Latin-1. Padding
 * (blanks, NUL, tabs, line ends) is taken off both ends.
 */
export function fieldText(bytes: Uint8Array): string {
  return decodeLoosely(bytes).replace(/^[\s\0]+|[\s\0]+$/gu, '');
}

/** UTF-8 where the bytes are valid UTF-8, else Latin-1. */
export function decodeLoosely(bytes: Uint8Array): string {
  try {
    return UTF8.decode(bytes);
  } catch {
    return LATIN1.decode(bytes);
  }
}

/** A number of a header field; `comma` where a decimal comma stood for the point. */
export interface FieldNumber {
  readonly value: number;
  readonly comma: boolean;
}

const POINT = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;
const COMMA = /^[+-]?\d*,\d+$/;
const GROUPED = /^[+-]?[1-9]\d{0,2},\d{3}$/;

/**
 * Reads a decimal number as headers write it: "500", "+500", "-500.", "5E2", and "0,5" with a decimal comma. Null where it
 * is none, is not finite, or where the comma could also group thousands ("1,234").
 */
export function fieldNumber(text: string): FieldNumber | null {
  const comma = COMMA.test(text) && !GROUPED.test(text);
  if (!comma && !POINT.test(text)) return null;
  const value = Number(comma ? text.replace(',', '.') : text);
  return Number.isFinite(value) ? { value, comma } : null;
}

/** A whole number of a header field, or null. */
export function fieldInteger(text: string): number | null {
  const number = fieldNumber(text);
  return number && !number.comma && Number.isSafeInteger(number.value) ? number.value : null;
}

const MONTHS = ['JAN', 'FEB', 'MAR', 'APR', 'MAY', 'JUN', 'JUL', 'AUG', 'SEP', 'OCT', 'NOV', 'DEC'];

export interface CalendarDate {
  readonly year: number;
  /** 1 to 12. */
  readonly month: number;
  readonly day: number;
}

/** Two-digit year of a header: 85-99 are 1985-1999, 00-84 are 2000-2084 (Kemp & Olivan 2003). */
export function fullYear(twoDigits: number): number {
  return twoDigits >= 85 ? 1900 + twoDigits : 2000 + twoDigits;
}

/** Reads "dd.mm.yy" (Kemp 1992). Null where it is no such date; other orders and separators are not guessed. */
export function shortDate(text: string): CalendarDate | null {
  const match = /^(\d{2})\.(\d{2})\.(\d{2})$/.exec(text);
  if (!match) return null;
  return realDate(fullYear(Number(match[3])), Number(match[2]), Number(match[1]));
}

/** Reads "dd-MMM-yyyy" with English months (Kemp & Olivan 2003), in any case. Null where it is no such date. */
export function longDate(text: string): CalendarDate | null {
  const match = /^(\d{1,2})-([A-Za-z]{3})-(\d{4})$/.exec(text);
  if (!match) return null;
  return realDate(Number(match[3]), MONTHS.indexOf(match[2].toUpperCase()) + 1, Number(match[1]));
}

/** Reads "hh.mm.ss", also with colons, as seconds of the day. Null where it is no such time. */
export function dayTime(text: string): number | null {
  const match = /^(\d{1,2})[.:](\d{2})[.:](\d{2})$/.exec(text);
  if (!match) return null;
  const [hours, minutes, seconds] = match.slice(1).map(Number);
  if (hours > 23 || minutes > 59 || seconds > 59) return null;
  return hours * 3600 + minutes * 60 + seconds;
}

function realDate(year: number, month: number, day: number): CalendarDate | null {
  if (month < 1 || month > 12 || day < 1) return null;
  const leap = (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;
  const days = [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31][month - 1];
  return day <= days ? { year, month, day } : null;
}
