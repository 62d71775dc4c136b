import type { Range } from '../../numeric/chance-range';

const minus = (text: string): string => text.replace(/^-(?=0(\.0*)?$)/, '').replace('-', '−');

/** "2.71–2.99"; "−0.20 to 0.41" where one end is below 0. */
export function rangeWords({ low, high }: Range, decimals: number): string {
  const [from, to] = [low, high].map((value) => minus(value.toFixed(decimals)));
  return `${from}${low < 0 ? ' to ' : '–'}${to}`;
}
