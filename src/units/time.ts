/** Time in seconds from the start of the recording unless a name says otherwise. */
export type Seconds = number;

/**
 * Writes a time as h:mm:ss, or h:mm:ss.d with the given count of decimals (0 to 6).
 * Negative times carry a leading minus.
 */
export function formatClock(seconds: Seconds, decimals = 0): string {
  if (!Number.isFinite(seconds)) throw new RangeError('formatClock wants a finite time');
  const unit = decimalUnit(decimals);
  const total = Math.round(Math.abs(seconds) * unit);
  const whole = Math.floor(total / unit);
  const fraction = decimals > 0 ? `.${String(total % unit).padStart(decimals, '0')}` : '';
  const two = (value: number) => String(value).padStart(2, '0');
  const sign = seconds < 0 && total > 0 ? '-' : '';
  const hours = Math.floor(whole / 3600);
  return `${sign}${hours}:${two(Math.floor(whole / 60) % 60)}:${two(whole % 60)}${fraction}`;
}

/**
 * Reads a typed time: seconds ("754.5"), m:ss ("12:34") or h:mm:ss ("0:12:34.5"); a decimal comma counts as a point.
 * Returns null where the text is no such time.
 */
export function parseClock(text: string): Seconds | null {
  const parts = text.trim().replace(',', '.').split(':');
  if (parts.length > 3 || !parts.every((part) => /^\d+(\.\d+)?$/.test(part))) return null;
  const leading = parts.slice(0, -1);
  if (!leading.every((part) => /^\d+$/.test(part))) return null;
  const below60 = parts.slice(1).every((part) => Number(part) < 60);
  if (!below60) return null;
  return parts.reduce((sum, part) => sum * 60 + Number(part), 0);
}

function decimalUnit(decimals: number): number {
  if (!Number.isInteger(decimals) || decimals < 0 || decimals > 6)
    throw new RangeError('decimals: 0 to 6');
  let unit = 1;
  for (let i = 0; i < decimals; i += 1) unit *= 10;
  return unit;
}
