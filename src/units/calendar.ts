/**
 * Milliseconds from the start of 1970 of a date and time of day as written ("1985-01-01T00:00:00", with or without a fraction),
 * whatever clock it is of. NaN where the text is none.
 */
export function clockMs(text: string): number {
  const found = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2}):(\d{2})(\.\d+)?/.exec(text);
  if (!found) return Number.NaN;
  const [year, month, day, hours, minutes, seconds] = found.slice(1, 7).map(Number);
  const fractionMs = found[7] === undefined ? 0 : Math.round(1000 * Number(`0${found[7]}`));
  return Date.UTC(year, month - 1, day, hours, minutes, seconds) + fractionMs;
}

/** A date and time of day from such milliseconds, "1985-01-01T00:00:00Z", to the second. */
export const clockText = (ms: number): string => `${new Date(ms).toISOString().slice(0, 19)}Z`;
