import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { gzipSync } from 'node:zlib';
import { expect, type Page } from 'playwright/test';
import { RECORD, STEADY } from './support';

/** A file as the page is given it. */
export interface GivenFile {
  readonly name: string;
  readonly mimeType: string;
  readonly buffer: Buffer;
}

const given = (name: string, buffer: Buffer): GivenFile => ({
  name,
  mimeType: 'application/octet-stream',
  buffer,
});

/** Fields of an EDF header by their first byte and length (Kemp 1992; EDF+ 2003 for the last). */
const PATIENT = [8, 80] as const;
const RECORD_DURATION = [244, 8] as const;

/** The record with a field of its header written anew. */
function withField([at, length]: readonly [number, number], text: string): Buffer {
  const bytes = readFileSync(RECORD);
  bytes.write(text.padEnd(length).slice(0, length), at, 'latin1');
  return bytes;
}

/** The record as if it were of a person: an invented one, in the subfields of EDF+. */
export const namedRecord = (): GivenFile =>
  given('visit-7.edf', withField(PATIENT, 'ZZ-0077 F 02-MAY-1961 Avila_Example'));

/** Five steady minutes, an invented person in every place of the header that can hold one: code, name, text, label, file. */
export function namedThroughout(): GivenFile {
  const bytes = readFileSync(STEADY);
  const write = (text: string, at: number, length: number) =>
    bytes.write(text.padEnd(length).slice(0, length), at, 'latin1');
  write('ZZ-0077 F 02-MAY-1961 Avila_Example', 8, 80);
  write('Startdate 14-MAY-2024 ADM-99 Dr_Prober Rig_7', 88, 80);
  write('EGG Avila', 256, 16);
  return given('visit-7.edf', bytes);
}

/** Cut off inside the header. */
export const cutHeader = (): GivenFile => given('cut.edf', readFileSync(RECORD).subarray(0, 500));

/** How the record lies in its bytes. */
function layoutOf(bytes: Buffer) {
  const text = (at: number, length: number) => bytes.toString('latin1', at, at + length).trim();
  const signals = Number(text(252, 4));
  const samples = Array.from({ length: signals }, (_, i) =>
    Number(text(256 + 216 * signals + 8 * i, 8)),
  );
  const recordSamples = samples.reduce((sum, one) => sum + one, 0);
  return {
    signals,
    recordSamples,
    headerBytes: 256 * (signals + 1),
    records: Number(text(236, 8)),
  };
}

/** The steady minutes without the records of 30 s in their middle: a recording that was stopped and went on (EDF+D). */
export function withGap(): GivenFile {
  const bytes = readFileSync(STEADY);
  const { headerBytes, recordSamples, records } = layoutOf(bytes);
  const kept = Buffer.concat([
    bytes.subarray(0, headerBytes + 2 * recordSamples * 120),
    bytes.subarray(headerBytes + 2 * recordSamples * 150),
  ]);
  kept.write('EDF+D'.padEnd(44), 192, 'latin1');
  kept.write(String(records - 30).padEnd(8), 236, 'latin1');
  return given('stopped.edf', kept);
}

/** The steady minutes with their 16-bit samples written as 24-bit ones (BDF+). */
export function of24Bit(): GivenFile {
  const bytes = readFileSync(STEADY);
  const { headerBytes, signals } = layoutOf(bytes);
  const head = Buffer.from(bytes.subarray(0, headerBytes));
  head.write('\u00ffBIOSEMI', 0, 'latin1');
  head.write('BDF+C'.padEnd(44), 192, 'latin1');
  head.write('BDF Annotations'.padEnd(16), 256 + 16 * (signals - 1), 'latin1');
  const last = 256 + 216 * signals + 8 * (signals - 1);
  const annotated = Number(head.toString('latin1', last, last + 8));
  const words = (bytes.length - headerBytes) / 2;
  const record = layoutOf(bytes).recordSamples;
  const wide = Buffer.alloc(3 * words);
  for (let word = 0; word < words; word += 1) {
    const inRecord = word % record;
    const at = headerBytes + 2 * word;
    if (inRecord < record - annotated) wide.writeIntLE(bytes.readInt16LE(at), 3 * word, 3);
    else {
      const from = 3 * (word - inRecord + record - annotated) + 2 * (inRecord - record + annotated);
      bytes.copy(wide, from, at, at + 2);
    }
  }
  return given('wide.bdf', Buffer.concat([head, wide]));
}

/** Packed, under the name of a recording. */
export const packed = (): GivenFile => given('packed.edf', gzipSync(readFileSync(RECORD)));

/** Records of no length, so that no rate can be known. */
export const noDuration = (): GivenFile => given('still.edf', withField(RECORD_DURATION, '0'));

/** Samples of the record's first signal in uV, every `every`-th of them. */
export function microvolts(every = 1): { readonly rateHz: number; readonly uv: readonly number[] } {
  const bytes = readFileSync(RECORD);
  const text = (at: number, length: number) => bytes.toString('latin1', at, at + length).trim();
  const count = Number(text(252, 4));
  const field = (before: number, length: number, signal: number) =>
    Number(text(256 + before * count + length * signal, length));
  const samples = Array.from({ length: count }, (_, signal) => field(216, 8, signal));
  const [low, high] = [field(104, 8, 0), field(112, 8, 0)];
  const [digitalLow, digitalHigh] = [field(120, 8, 0), field(128, 8, 0)];
  const records = Number(text(236, 8));
  const recordBytes = 2 * samples.reduce((sum, one) => sum + one, 0);
  const uv: number[] = [];
  for (let i = 0; i < records * samples[0]; i += every) {
    const record = Math.floor(i / samples[0]);
    const at = Number(text(184, 8)) + record * recordBytes + 2 * (i % samples[0]);
    const digital = bytes.readInt16LE(at);
    uv.push(low + ((digital - digitalLow) * (high - low)) / (digitalHigh - digitalLow));
  }
  return { rateHz: samples[0] / Number(text(244, 8)) / every, uv };
}

/** One column of samples as text, under a header line or none. */
export function textOf(name: string, header: string | null, values: readonly string[]): GivenFile {
  const lines = header === null ? values : [header, ...values];
  return { name, mimeType: 'text/csv', buffer: Buffer.from(`${lines.join('\n')}\n`) };
}

/** A column of times and a column of samples. */
export function timedText(name: string, unit: string, perMicrovolt: number): GivenFile {
  const { rateHz, uv } = microvolts(3);
  const rows = uv.map(
    (value, i) => `${(i / rateHz).toFixed(6)},${(Math.round(value) * perMicrovolt).toFixed(3)}`,
  );
  return textOf(name, `time (s),E1 (${unit})`, rows);
}

/** Drops a file on the page. */
export async function dropFile(page: Page, { name, buffer }: GivenFile): Promise<void> {
  const data = await page.evaluateHandle(
    ({ name, text }) => {
      const transfer = new DataTransfer();
      const bytes = Uint8Array.from(atob(text), (letter) => letter.charCodeAt(0));
      transfer.items.add(new File([bytes], name));
      return transfer;
    },
    { name, text: buffer.toString('base64') },
  );
  const target = page.locator('body');
  await target.dispatchEvent('dragover', { dataTransfer: data });
  await expect(page.getByText('Drop the file to open it')).toBeVisible();
  await target.dispatchEvent('drop', { dataTransfer: data });
}

/** The record as the page would be given it by hand. */
export const recordFile = (): GivenFile => given(basename(RECORD), readFileSync(RECORD));
