import { crc32 } from './crc32';
import { bytesOf, type ResultFile } from './result-file';

/** 1980-01-01 00:00, the earliest that a zip can say: the same files give the same bytes on every day. */
const DOS_TIME = 0;
const DOS_DATE = 0x0021;
const UTF8_NAME = 0x0800;
const VERSION_2_0 = 20;
const MOST = 0xffffffff;

/**
 * A zip of files that are stored as they are, with fixed dates (PKWARE APPNOTE 6.3: local headers, central directory, end
 * record). Throws RangeError above 65,534 files or 4 GB, which want a form of zip this does not write.
 */
export function storedZip(files: readonly ResultFile[]): Uint8Array<ArrayBuffer> {
  if (files.length >= 0xffff) throw new RangeError('too many files for a zip');
  const encoder = new TextEncoder();
  const parts: Uint8Array[] = [];
  const directory: Uint8Array[] = [];
  let offset = 0;
  for (const file of files) {
    const { name } = file;
    const nameBytes = encoder.encode(name);
    const bytes = bytesOf(file);
    const common = commonFields(name, nameBytes, bytes);
    const local = joined([fields([4, 0x04034b50]), common, nameBytes, bytes]);
    directory.push(joined([directoryStart(), common, directoryEnd(offset), nameBytes]));
    parts.push(local);
    offset += local.length;
  }
  const listed = joined(directory);
  if (offset + listed.length > MOST) throw new RangeError('too much for a zip');
  const end = fields(
    [4, 0x06054b50],
    [2, 0],
    [2, 0],
    [2, files.length],
    [2, files.length],
    [4, listed.length],
    [4, offset],
    [2, 0],
  );
  return joined([...parts, listed, end]);
}

/** What the local header and the directory say alike: from the version needed to the length of the extra field. */
function commonFields(name: string, nameBytes: Uint8Array, bytes: Uint8Array): Uint8Array {
  const ascii = nameBytes.length === name.length;
  return fields(
    [2, VERSION_2_0],
    [2, ascii ? 0 : UTF8_NAME],
    [2, 0],
    [2, DOS_TIME],
    [2, DOS_DATE],
    [4, crc32(bytes)],
    [4, bytes.length],
    [4, bytes.length],
    [2, nameBytes.length],
    [2, 0],
  );
}

const directoryStart = () => fields([4, 0x02014b50], [2, VERSION_2_0]);
const directoryEnd = (offset: number) => fields([2, 0], [2, 0], [2, 0], [4, 0], [4, offset]);

/** Little-endian numbers, each of its count of bytes. */
function fields(...values: readonly (readonly [bytes: 2 | 4, value: number])[]): Uint8Array {
  const view = new DataView(new ArrayBuffer(values.reduce((sum, [bytes]) => sum + bytes, 0)));
  let at = 0;
  for (const [bytes, value] of values) {
    if (bytes === 2) view.setUint16(at, value, true);
    else view.setUint32(at, value, true);
    at += bytes;
  }
  return new Uint8Array(view.buffer);
}

function joined(parts: readonly Uint8Array[]): Uint8Array<ArrayBuffer> {
  const all = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    all.set(part, at);
    at += part.length;
  }
  return all;
}
