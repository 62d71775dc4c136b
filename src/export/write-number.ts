/**
 * A number with a fixed count of decimals (0 to 20), decimal point always, never "-0". Halves of the stored binary value go
 * away from zero. The digits are those of Number.prototype.toFixed, which ECMA-262 fixes exactly, so every engine writes the
 * same. Throws RangeError where the number is not finite or 1e21 and over.
 */
export function writeNumber(value: number, decimals: number): string {
  if (!(Math.abs(value) < 1e21)) throw new RangeError(`${value} cannot be written`);
  const text = value.toFixed(decimals);
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text;
}

/** The number that writeNumber writes, for places that take numbers. */
export function roundedTo(value: number, decimals: number): number {
  return Number(writeNumber(value, decimals));
}
