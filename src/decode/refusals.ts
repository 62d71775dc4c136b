import { type FailureKind, Refusal } from '../recording/failure';

/** What every refusal of a file says besides its kind: what is wrong, where, and what the person can do. */
export interface RefusalWords {
  readonly message: string;
  readonly place: string | null;
  readonly remedy: string;
}

/** A refusal that begins with the file's name. */
export function refusal(kind: FailureKind, fileName: string, words: RefusalWords): Refusal {
  return new Refusal({
    kind,
    message: `${fileName}: ${words.message}`,
    place: words.place,
    remedy: words.remedy,
  });
}

/** Text of a file as a refusal quotes it: control characters shown as blanks, cut to 40 characters. */
export function quoted(text: string): string {
  const plain = text.replace(/\p{Cc}/gu, ' ').trim();
  const cut = plain.length > 40 ? `${plain.slice(0, 39)}…` : plain;
  return cut === '' ? 'blank' : `“${cut}”`;
}
