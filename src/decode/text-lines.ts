import { readAhead, readBytes, SLICE_BYTES } from './file-bytes';
import { refusal } from './refusals';

export type TextEncoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';

/** Longest line taken for a row. */
const LONGEST_LINE = 1_000_000;

/**
 * Encoding by the byte-order mark, else UTF-8 where the bytes are valid UTF-8 (a character cut off at the end does not
 * count), else Windows-1252.
 */
export function detectEncoding(head: Uint8Array): TextEncoding {
  if (head[0] === 0xff && head[1] === 0xfe) return 'utf-16le';
  if (head[0] === 0xfe && head[1] === 0xff) return 'utf-16be';
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(head, { stream: true });
    return 'utf-8';
  } catch {
    return 'windows-1252';
  }
}

/** Lines of a piece of text, without line ends (LF, CRLF or CR). */
export function linesOf(text: string): string[] {
  return text.split(/\r\n|\n|\r/);
}

/** Lines of a slice of the file, in order. */
export interface LineBatch {
  readonly lines: readonly string[];
  /** True for the last batch where the file does not end with a line end. */
  readonly lastUnclosed: boolean;
}

/**
 * All lines of a file, decoded slice by slice. Throws a Refusal where the file cannot be read, or where a line is longer
 * than a million characters.
 */
export async function* lineBatches(
  file: Blob,
  fileName: string,
  encoding: TextEncoding,
): AsyncGenerator<LineBatch> {
  const decoder = new TextDecoder(encoding);
  const slices = Math.ceil(file.size / SLICE_BYTES);
  let rest = '';
  let line = 1;
  const slice = (i: number) => readBytes(file, fileName, i * SLICE_BYTES, (i + 1) * SLICE_BYTES);
  for await (const bytes of readAhead(slices, slice)) {
    const text = rest + decoder.decode(bytes, { stream: true });
    const heldBack = text.endsWith('\r') ? '\r' : '';
    const lines = linesOf(heldBack === '' ? text : text.slice(0, -1));
    rest = (lines.pop() ?? '') + heldBack;
    if (rest.length > LONGEST_LINE)
      throw refusal('broken-format', fileName, {
        message: `row ${line + lines.length} is longer than ${LONGEST_LINE} characters; this is no table of samples.`,
        place: `row ${line + lines.length}`,
        remedy: 'Export the recording as one row a sample.',
      });
    line += lines.length;
    yield { lines, lastUnclosed: false };
  }
  const last = linesOf(rest + decoder.decode());
  const unclosed = last[last.length - 1] !== '';
  yield { lines: unclosed ? last : last.slice(0, -1), lastUnclosed: unclosed };
}
