import type { Browser, Page } from 'playwright';
import { type Measured, median } from './measured';
import { scriptMsByFrame } from './trace';

/** How panning went, in ms. */
export interface Panned {
  /** Script on the main thread in each frame. */
  readonly scriptMs: readonly number[];
  /** Time from one frame to the next. */
  readonly intervalsMs: readonly number[];
  readonly longTasksMs: readonly number[];
}

export type PaneName = 'Minutes' | 'Seconds';
type Gesture = (page: Page, turn: number) => Promise<void>;

const PAN_MS = 3000;
const SWING_PX = 300;
const TURN_MOVES = 90;

/** Where the pointer stands at a move, to and fro about the middle. */
const swing = (turn: number): number => {
  const part = (turn % TURN_MOVES) / TURN_MOVES;
  return SWING_PX * (part < 0.5 ? 4 * part - 1 : 3 - 4 * part);
};

async function middleOf(page: Page, pane: PaneName): Promise<readonly [number, number]> {
  const stage = page
    .getByRole('region', { name: pane, exact: true })
    .locator('[data-part="stage"]');
  const box = await stage.boundingBox();
  if (!box) throw new Error(`${pane} has no drawing`);
  return [box.x + 0.5 * box.width, box.y + 0.6 * box.height];
}

/** Runs a gesture for three seconds and watches the frames. */
async function watchFrames(browser: Browser, page: Page, gesture: Gesture): Promise<Panned> {
  await browser.startTracing(page, { categories: ['devtools.timeline', '__metadata'] });
  const fromMs = await page.evaluate(() => {
    window.watched.frames.length = 0;
    window.watched.recording = true;
    return performance.now();
  });
  const endMs = performance.now() + PAN_MS;
  for (let turn = 0; performance.now() < endMs; turn += 1) await gesture(page, turn);
  const { frames, longTasks } = await page.evaluate(() => {
    window.watched.recording = false;
    return window.watched;
  });
  const trace = await browser.stopTracing();
  return {
    scriptMs: scriptMsByFrame(trace.toString('utf8')),
    intervalsMs: frames.slice(1).map((at, i) => at - frames[i]),
    longTasksMs: longTasks.filter(({ atMs }) => atMs >= fromMs).map(({ ms }) => ms),
  };
}

/** Drags a pane to and fro. */
export async function dragged(browser: Browser, page: Page, pane: PaneName): Promise<Panned> {
  const [x, y] = await middleOf(page, pane);
  await page.mouse.move(x, y);
  await page.mouse.down();
  const panned = await watchFrames(browser, page, (one, turn) =>
    one.mouse.move(x + swing(turn + TURN_MOVES / 4), y),
  );
  await page.mouse.up();
  return panned;
}

/** Zooms a pane out and in by the wheel. */
export async function wheeled(browser: Browser, page: Page, pane: PaneName): Promise<Panned> {
  const [x, y] = await middleOf(page, pane);
  await page.mouse.move(x, y);
  return watchFrames(browser, page, (one, turn) =>
    one.mouse.wheel(0, turn % TURN_MOVES < TURN_MOVES / 2 ? 20 : -20),
  );
}

/** What design.md asks of panning, as lines of the table. */
export function panLines(part: string, what: string, panned: Panned): readonly Measured[] {
  const { scriptMs, intervalsMs, longTasksMs } = panned;
  const over = (limitMs: number) => intervalsMs.filter((one) => one > limitMs).length;
  const frames = `${intervalsMs.length} frames`;
  const line = (name: string, value: number, unit: string, budget: string, note: string) => ({
    part,
    what: `${what}: ${name}`,
    value,
    unit,
    decimals: 1,
    budget,
    note,
  });
  const usual = `median interval ${median(intervalsMs).toFixed(1)} ms`;
  const longest = `longest task ${Math.round(Math.max(0, ...longTasksMs))} ms`;
  return [
    line('script a frame, median', median(scriptMs), 'ms', 'at most 4', 'processor time'),
    line(
      'frames over 25 ms',
      (100 * over(25)) / intervalsMs.length,
      '%',
      'at most 5',
      `${frames}, ${usual}`,
    ),
    line('frames over 50 ms', over(50), '', 'none', `${frames}, ${longest}`),
  ];
}
