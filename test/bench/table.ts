import type { Measured } from './measured';

const HEAD = ['part', 'what', 'value', 'budget', 'note'] as const;

function valueWords({ value, decimals, unit }: Measured): string {
  if (!Number.isFinite(value)) return '-';
  const small = value !== 0 && Math.abs(value) < 0.001;
  return `${small ? value.toExponential(1) : value.toFixed(decimals)} ${unit}`.trim();
}

const cellsOf = (row: Measured): readonly string[] => [
  row.part,
  row.what,
  valueWords(row),
  row.budget,
  row.note,
];

/** The lines as columns of text. */
export function plainTable(rows: readonly Measured[]): string {
  const lines = [HEAD, ...rows.map(cellsOf)];
  const widths = HEAD.map((_, i) => Math.max(...lines.map((cells) => cells[i].length)));
  return lines
    .map((cells) =>
      cells
        .map((cell, i) => (i === 2 ? cell.padStart(widths[i]) : cell.padEnd(widths[i])))
        .join('  ')
        .trimEnd(),
    )
    .join('\n');
}

/** The same as a Markdown table. */
export function markdownTable(rows: readonly Measured[]): string {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`;
  const rule = HEAD.map((_, i) => (i === 2 ? '---:' : '---'));
  return [HEAD, rule, ...rows.map(cellsOf)].map(line).join('\n');
}
