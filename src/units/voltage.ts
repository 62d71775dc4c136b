/** Potential in microvolts; every signal inside the program is in this unit. */
export type Microvolts = number;

const MICROVOLTS_PER: Readonly<Record<string, number>> = { V: 1e6, mV: 1e3, uV: 1, nV: 1e-3 };

/**
 * Microvolts in one unit of the given dimension text: V, mV, uV (also with the micro sign U+00B5 or the Greek mu U+03BC)
 * or nV, blanks around it ignored, case as written in SI. Null where the text names no such unit.
 */
export function microvoltsPerUnit(dimension: string): number | null {
  const text = dimension.trim().replace(/[\u00b5\u03bc]/u, 'u');
  return Object.hasOwn(MICROVOLTS_PER, text) ? MICROVOLTS_PER[text] : null;
}
