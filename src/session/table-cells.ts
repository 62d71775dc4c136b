/** A row of a delimited table: its number as a spreadsheet counts, from 1, and its cells. */
export interface TableRow {
  readonly row: number;
  readonly cells: readonly string[];
}

export const DELIMITERS = [',', ';', '\t'] as const;
export type Delimiter = (typeof DELIMITERS)[number];

/** The delimiter that is most frequent in a head line; a comma where there is none. */
export function delimiterOf(head: string): Delimiter {
  const count = (delimiter: Delimiter) => head.split(delimiter).length;
  return DELIMITERS.reduce((best, one) => (count(one) > count(best) ? one : best));
}

/**
 * The rows of a delimited text (RFC 4180): cells may be quoted, quoted ones may hold delimiters, line breaks and doubled quotes;
 * blanks about a cell are taken off. Rows without any text are left out but counted.
 */
export function tableRows(text: string, delimiter: Delimiter): readonly TableRow[] {
  const rows: TableRow[] = [];
  let cells: string[] = [];
  let cell = '';
  let quoted = false;
  let row = 1;
  const endCell = () => {
    cells.push(cell.trim());
    cell = '';
  };
  const endRow = () => {
    endCell();
    if (cells.some((one) => one !== '')) rows.push({ row, cells });
    cells = [];
    row += 1;
  };
  for (let i = 0; i < text.length; i += 1) {
    const letter = text[i];
    if (quoted) {
      if (letter !== '"') cell += letter;
      else if (text[i + 1] === '"') {
        cell += letter;
        i += 1;
      } else quoted = false;
    } else if (letter === '"' && cell.trim() === '') quoted = true;
    else if (letter === delimiter) endCell();
    else if (letter === '\n') endRow();
    else if (letter !== '\r') cell += letter;
  }
  if (cell !== '' || cells.length > 0) endRow();
  return rows;
}
