/** Bounds of a typed number, both included, and its unit for the words. */
export interface NumberBounds {
  readonly least: number;
  readonly most: number;
  readonly unit: string;
  readonly whole?: boolean;
}

export type ReadNumber =
  | { readonly ok: true; readonly value: number }
  | { readonly ok: false; readonly error: string };

/** Reads a typed number; a decimal comma counts as a point. Says what is wanted where it is none or out of bounds. */
export function readNumber(text: string, bounds: NumberBounds): ReadNumber {
  const { least, most, unit, whole = false } = bounds;
  const plain = text.trim().replace(',', '.');
  const value = /^-?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : Number.NaN;
  const good = value >= least && value <= most && (!whole || Number.isInteger(value));
  const kind = whole ? 'a whole number' : 'a number';
  const error = `Type ${kind} from ${least} to ${most}${unit ? ` ${unit}` : ''}.`;
  return good ? { ok: true, value } : { ok: false, error };
}

/** A number as it is offered for typing: no rounding noise. */
export const numberText = (value: number): string => String(Number(value.toPrecision(12)));
