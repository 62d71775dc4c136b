import type { Recognition } from './format';
import { detectLayout } from './text-dialect';
import { detectEncoding, linesOf, type TextEncoding } from './text-lines';

/** What a text file is recognised and laid out by. */
export const HEAD_BYTES = 64 * 1024;

/** Text is possible where the bytes decode without control characters and some lines are rows of numbers, or the name says so. */
export function recognisesDelimitedText(head: Uint8Array, fileName: string): Recognition {
  const { text, lines } = headLines(head);
  if (/[^\P{Cc}\t\r\n\f]/u.test(text)) return 'no';
  if (detectLayout(lines) !== null) return 'possible';
  return /\.(csv|tsv|txt|asc)$/i.test(fileName) ? 'possible' : 'no';
}

export interface HeadLines {
  readonly encoding: TextEncoding;
  readonly text: string;
  /** Without a last line that the end of the head may have cut. */
  readonly lines: readonly string[];
}

export function headLines(head: Uint8Array): HeadLines {
  const encoding = detectEncoding(head);
  const text = new TextDecoder(encoding).decode(head, { stream: true });
  const lines = linesOf(text);
  return { encoding, text, lines: head.length < HEAD_BYTES ? lines : lines.slice(0, -1) };
}
