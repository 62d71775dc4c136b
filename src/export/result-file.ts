/** A file of results on its way out: text, or bytes in parts. */
export interface ResultFile {
  readonly name: string;
  readonly content: string | readonly Uint8Array<ArrayBuffer>[];
}

/** The bytes of a file; text as UTF-8. */
export function bytesOf({ content }: ResultFile): Uint8Array<ArrayBuffer> {
  if (typeof content === 'string') return new TextEncoder().encode(content);
  const all = new Uint8Array(content.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of content) {
    all.set(part, at);
    at += part.length;
  }
  return all;
}
