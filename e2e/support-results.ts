import { readFile } from 'node:fs/promises';
import { expect, type Page } from 'playwright/test';
import { dialogOf, LONG_MS, settled } from './support';

/** A file that the page offered. */
export interface Offered {
  readonly name: string;
  readonly bytes: Buffer;
}

/** Runs an act that ends in a download and reads what came. */
export async function downloaded(page: Page, act: () => Promise<void>): Promise<Offered> {
  const [offered] = await Promise.all([page.waitForEvent('download'), act()]);
  return { name: offered.suggestedFilename(), bytes: await readFile(await offered.path()) };
}

/** The session as the page writes it. */
export const downloadSession = (page: Page): Promise<Offered> =>
  downloaded(page, () => page.keyboard.press('Control+s'));

/** The zip of results as the page writes it. */
export async function downloadResults(page: Page, withoutIdentity = false): Promise<Offered> {
  await settled(page);
  await page.keyboard.press('Control+Shift+s');
  const dialog = dialogOf(page, 'Download the results');
  const all = dialog.getByRole('button', { name: 'All as one zip' });
  await expect(all).toBeEnabled({ timeout: LONG_MS });
  if (withoutIdentity) await dialog.getByLabel('Without identity').check();
  const offered = await downloaded(page, () => all.click());
  await dialog.getByRole('button', { name: 'Close' }).click();
  await expect(dialog).toBeHidden();
  return offered;
}

const LOCAL_HEADER = 0x04034b50;

/** The files of a zip whose entries are stored as they are (PKWARE APPNOTE 6.3), in their order. */
export function unzipStored(zip: Buffer): ReadonlyMap<string, Buffer> {
  const files = new Map<string, Buffer>();
  let at = 0;
  while (zip.readUInt32LE(at) === LOCAL_HEADER) {
    expect(zip.readUInt16LE(at + 8), 'entries are stored, not deflated').toBe(0);
    const size = zip.readUInt32LE(at + 22);
    const nameLength = zip.readUInt16LE(at + 26);
    const dataAt = at + 30 + nameLength + zip.readUInt16LE(at + 28);
    const name = zip.toString('utf8', at + 30, at + 30 + nameLength);
    files.set(name, zip.subarray(dataAt, dataAt + size));
    at = dataAt + size;
  }
  return files;
}

export type Row = Readonly<Record<string, string>>;

/** Rows of a CSV without quoted cells, by the names of its first line. */
export function csvRows(text: string): readonly Row[] {
  const [head, ...lines] = text.trimEnd().split('\n');
  const names = head.split(',');
  return lines.map((line) => {
    const cells = line.split(',');
    return Object.fromEntries(names.map((name, i) => [name, cells[i] ?? '']));
  });
}

/** Beats and spans as the page writes them now. */
export async function tables(page: Page): Promise<{
  readonly beats: readonly Row[];
  readonly spans: readonly Row[];
}> {
  const files = unzipStored((await downloadResults(page)).bytes);
  const rows = (name: string) => csvRows(files.get(name)?.toString('utf8') ?? '');
  return { beats: rows('beats.csv'), spans: rows('spans.csv') };
}

/** An interval between neighbouring beats, in ms, and whether it is NN by the rule of numbers.md. */
export interface Interval {
  readonly endS: number;
  readonly rrMs: number;
  readonly nn: boolean;
}

/**
 * The intervals from the times of the beats alone. NN: both beats N, neither placed, no spoiled span for the heart between
 * (Task Force 1996; ANSI/AAMI EC57 for the classes).
 */
export function intervalsByHand(
  beats: readonly Row[],
  spans: readonly Row[],
  heartLead: string,
): readonly Interval[] {
  const spoils = spans
    .filter((span) => span.for !== 'stomach' && (span.lead === '' || span.lead === heartLead))
    .map((span) => [Number(span.from_s), Number(span.to_s)] as const);
  const carries = (beat: Row) => beat.class === 'N' && beat.origin !== 'placed';
  return beats.slice(1).map((beat, i) => {
    const startS = Number(beats[i].time_s);
    const endS = Number(beat.time_s);
    const spoiled = spoils.some(([fromS, toS]) => fromS < endS && toS > startS);
    const rrMs = 1000 * (endS - startS);
    const likely = rrMs >= 300 && rrMs <= 2000;
    return { endS, rrMs, nn: carries(beats[i]) && carries(beat) && !spoiled && likely };
  });
}

/** RMSSD in ms over neighbouring NN intervals: root of the mean of the squared differences (Task Force 1996). */
export function rmssdByHand(intervals: readonly Interval[]): number {
  const squares = intervals.flatMap((one, i) => {
    const before = intervals[i - 1];
    return i > 0 && before.nn && one.nn ? [(one.rrMs - before.rrMs) ** 2] : [];
  });
  return Math.sqrt(squares.reduce((sum, one) => sum + one, 0) / squares.length);
}

/** What a figure with so many decimals may differ by from an exact value, with times given to 1 us. */
export const roundedTo = (decimals: number): number => 0.5 * 10 ** -decimals + 0.002;
