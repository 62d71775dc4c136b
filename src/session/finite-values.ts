/** Whether plain data holds no number that a file could not keep (NaN, infinities); typed arrays are not looked into. */
export function holdsFiniteNumbers(value: unknown): boolean {
  if (typeof value === 'number') return Number.isFinite(value);
  if (typeof value !== 'object' || value === null || ArrayBuffer.isView(value)) return true;
  return Object.values(value).every(holdsFiniteNumbers);
}
