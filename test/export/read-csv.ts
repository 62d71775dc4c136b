/** Rows of a text by RFC 4180, read by its grammar and by nothing of the program's. Throws where a quote is out of place. */
export function readCsv(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let at = 0;
  while (at < text.length) {
    let cell = '';
    if (text[at] === '"') {
      at += 1;
      for (;;) {
        if (at >= text.length) throw new Error('a quoted cell does not end');
        if (text[at] !== '"') cell += text[at];
        else if (text[at + 1] === '"') {
          cell += '"';
          at += 1;
        } else break;
        at += 1;
      }
      at += 1;
    } else
      while (at < text.length && text[at] !== ',' && text[at] !== '\n') {
        if (text[at] === '"') throw new Error(`a quote inside a bare cell at ${at}`);
        cell += text[at];
        at += 1;
      }
    row.push(cell);
    if (text[at] === ',') {
      at += 1;
      if (at === text.length) row.push('');
    } else if (text[at] === '\n') {
      rows.push(row);
      row = [];
      at += 1;
    } else if (at < text.length) throw new Error(`something after a quoted cell at ${at}`);
  }
  if (row.length > 0) rows.push(row);
  return rows;
}
