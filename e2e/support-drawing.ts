import { expect, type Locator, type Page } from 'playwright/test';
import { pane, settled } from './support';

/** Counts of differing colours in every canvas of a pane that has a size, by a coarse look at its pixels. */
export async function coloursOf(part: Locator): Promise<readonly number[]> {
  return part.locator('canvas').evaluateAll((canvases) =>
    canvases.flatMap((canvas) => {
      if (!(canvas instanceof HTMLCanvasElement) || canvas.width < 20 || canvas.height < 20)
        return [];
      const { width, height } = canvas;
      const copy = new OffscreenCanvas(width, height).getContext('2d', {
        willReadFrequently: true,
      });
      copy?.drawImage(canvas, 0, 0);
      const data = copy?.getImageData(0, 0, width, height).data;
      const seen = new Set<number>();
      for (let i = 0; data && i < data.length; i += 4)
        if (data[i + 3] > 0) seen.add((data[i] << 16) | (data[i + 1] << 8) | data[i + 2]);
      return [seen.size];
    }),
  );
}

/** A trace row's own drawing. */
export const rowDrawing = (page: Page, paneName: 'Minutes' | 'Seconds', rowKey: string): Locator =>
  pane(page, paneName).locator(`[data-part="plot ${rowKey}"]`);

/** Every signal of a pane, and the spectrogram, is drawn: its canvas shows something. */
export async function expectDrawn(page: Page, name: 'Minutes' | 'Seconds'): Promise<void> {
  await settled(page);
  const rows = pane(page, name).locator('.pane-row:has(.of-signal, .of-spectrogram) .row-plot');
  const drawn: boolean[] = [];
  for (const row of await rows.all()) {
    drawn.push((await coloursOf(row)).some((count) => count > 0));
  }
  expect(drawn.length).toBeGreaterThan(0);
  expect(drawn).not.toContain(false);
}

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Where a part of the page is; throws where it is not to be seen. */
export async function boxOf(part: Locator): Promise<Box> {
  const box = await part.boundingBox();
  if (!box) throw new Error(`${part} is not on the page`);
  return box;
}

export const centreOf = ({ x, y, width, height }: Box) => ({ x: x + width / 2, y: y + height / 2 });

/** Where the drawing of a pane is on the page. */
export const stageBox = (page: Page, name: 'Whole study' | 'Minutes' | 'Seconds'): Promise<Box> =>
  boxOf(pane(page, name).locator('[data-part="stage"]'));

/** Where a time stands in a pane whose window is known. */
export const xOfTime = (box: Box, window: readonly [number, number], atS: number): number =>
  box.x + ((atS - window[0]) / (window[1] - window[0])) * box.width;

/** A pane's pixels between two places, as text that differs when any of them does. */
export async function picture(page: Page, clip: Box): Promise<string> {
  await settled(page);
  return (await page.screenshot({ clip, animations: 'disabled' })).toString('base64');
}

/** Drags from one place to another in a few moves, as a hand does. */
export async function drag(
  page: Page,
  from: readonly [number, number],
  to: readonly [number, number],
): Promise<void> {
  await page.mouse.move(...from);
  await page.mouse.down();
  await page.mouse.move((from[0] + to[0]) / 2, (from[1] + to[1]) / 2, { steps: 4 });
  await page.mouse.move(...to, { steps: 4 });
  await page.mouse.up();
  await settled(page);
}

const clock = (text: string): number =>
  text.split(':').reduce((sum, part) => 60 * sum + Number(part), 0);

/** The window of a pane from its words, in seconds (whole, as they are written). */
export function windowOf(words: string): readonly [number, number] {
  const found = /from ([\d:.]+) to ([\d:.]+)\.(?: |$)/.exec(words);
  if (!found) throw new Error(`no window in: ${words.slice(0, 80)}`);
  return [clock(found[1]), clock(found[2])];
}

/** Seconds of a clock like "0:02:25.133". */
export const secondsOf = clock;
