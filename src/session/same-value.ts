/** Whether two values of plain data (with typed arrays) hold the same; the order of an object's keys does not matter. */
export function sameValue(a: unknown, b: unknown): boolean {
  if (a === b) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (ArrayBuffer.isView(a) || ArrayBuffer.isView(b)) return sameNumbers(a, b);
  if (Array.isArray(a) !== Array.isArray(b)) return false;
  const keys = Object.keys(a);
  if (keys.length !== Object.keys(b).length) return false;
  const left = a as Readonly<Record<string, unknown>>;
  const right = b as Readonly<Record<string, unknown>>;
  return keys.every((key) => Object.hasOwn(right, key) && sameValue(left[key], right[key]));
}

type NumberColumn = Float64Array | Uint8Array;
const isColumn = (value: unknown): value is NumberColumn =>
  value instanceof Float64Array || value instanceof Uint8Array;

function sameNumbers(a: unknown, b: unknown): boolean {
  if (!isColumn(a) || !isColumn(b)) return false;
  if (a.constructor !== b.constructor || a.length !== b.length) return false;
  for (let i = 0; i < a.length; i += 1) if (a[i] !== b[i]) return false;
  return true;
}
