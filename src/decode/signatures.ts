interface Signature {
  readonly name: string;
  readonly at: number;
  readonly bytes: readonly number[] | string;
}

/** First bytes of files that people choose by mistake. Sources: RFC 1952 (gzip), ISO 32000 (PDF), the rest common practice. */
const SIGNATURES: readonly Signature[] = [
  { name: 'a gzip archive', at: 0, bytes: [0x1f, 0x8b] },
  { name: 'a zip archive or an office document', at: 0, bytes: 'PK\u0003\u0004' },
  { name: 'an empty zip archive', at: 0, bytes: 'PK\u0005\u0006' },
  { name: 'a 7z archive', at: 0, bytes: [0x37, 0x7a, 0xbc, 0xaf, 0x27, 0x1c] },
  { name: 'a PDF document', at: 0, bytes: '%PDF' },
  { name: 'a PNG picture', at: 0, bytes: [0x89, 0x50, 0x4e, 0x47] },
  { name: 'a JPEG picture', at: 0, bytes: [0xff, 0xd8, 0xff] },
  { name: 'an old office document', at: 0, bytes: [0xd0, 0xcf, 0x11, 0xe0] },
  { name: 'an HDF5 file (many MATLAB files are)', at: 0, bytes: [0x89, 0x48, 0x44, 0x46] },
  { name: 'a MATLAB file', at: 0, bytes: 'MATLAB' },
  { name: 'a tar archive', at: 257, bytes: 'ustar' },
];

const TEXT_SIGNATURES: readonly (readonly [name: string, pattern: RegExp])[] = [
  ['a web page (HTML)', /^\s*(<!doctype html|<html|<head|<body)/i],
  ['an XML file', /^\s*<\?xml/i],
  ['a JSON file', /^\s*[[{]\s*["[{\]}]/],
];

/** What a file looks like by its first bytes, in words ("a zip archive"); null where nothing known fits. */
export function looksLike(head: Uint8Array): string | null {
  if (head.length === 0) return 'an empty file';
  for (const { name, at, bytes } of SIGNATURES) {
    const wanted = typeof bytes === 'string' ? [...bytes].map((c) => c.charCodeAt(0)) : bytes;
    if (wanted.every((byte, i) => head[at + i] === byte)) return name;
  }
  const text = new TextDecoder('utf-8').decode(head.subarray(0, 512));
  for (const [name, pattern] of TEXT_SIGNATURES) if (pattern.test(text)) return name;
  return null;
}
