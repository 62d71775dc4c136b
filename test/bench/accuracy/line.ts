import type { Measured } from '../measured';

/** One line of the table of this part. */
export const line = (
  what: string,
  value: number,
  unit: string,
  decimals: number,
  budget = '',
  note = '',
): Measured => ({ part: 'accuracy', what, value, unit, decimals, budget, note });

export const sum = (values: readonly number[]) => values.reduce((total, one) => total + one, 0);
export const worst = (values: readonly number[]) =>
  values.reduce((most, one) => (Math.abs(one) > Math.abs(most) ? one : most), 0);
export const meanSize = (values: readonly number[]) => sum(values.map(Math.abs)) / values.length;
