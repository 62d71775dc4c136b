import type { Browser, CDPSession, Page } from 'playwright';
import { rendererOf, startBrowser } from './browser';
import { editBeats, NOT_COUNTED } from './edits';
import { inventedStudy, writeStudy } from './invented-study';
import { type Bench, type Measured, median, type Part } from './measured';
import { watchPage } from './page-watch';
import { dragged, panLines, wheeled } from './panning';
import { servePage } from './served-page';

const PART = 'opening';
const RUNS = 3;
const LONG_MS = 600_000;
/** How often the page is asked whether it is there; the times themselves are noted inside the page. */
const POLL_MS = 100;

/** One way from a file to all of its figures, in ms. */
interface Walk {
  readonly toDialog: number;
  readonly toTraces: number;
  readonly toAllRows: number;
  readonly toFigures: number;
  /** Processor time, from the file to the figures. */
  readonly pageMs: number;
  readonly workerMs: number;
  readonly allMs: number;
  /** How long threads waited for a core that other work held. */
  readonly pageWaitMs: number;
  readonly workerWaitMs: number;
  readonly longTasksMs: readonly number[];
}

/** A page in a profile of its own. */
async function freshPage(browser: Browser, address: string): Promise<Page> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 720 } });
  const page = await context.newPage();
  await page.addInitScript(watchPage);
  await page.goto(address);
  return page;
}

async function chooseAndAgree(page: Page, path: string): Promise<void> {
  await page.getByLabel('File to open').setInputFiles(path);
  await page
    .getByRole('button', { name: 'This is the study, open it' })
    .click({ timeout: LONG_MS });
}

const there = (page: Page, what: 'tracesMs' | 'figuresMs') =>
  page.waitForFunction((key) => window.watched[key] > 0, what, {
    timeout: LONG_MS,
    polling: POLL_MS,
  });

async function walk(page: Page, session: CDPSession, path: string): Promise<Walk> {
  const before = await rendererOf(session);
  await chooseAndAgree(page, path);
  await there(page, 'figuresMs');
  const seen = await page.evaluate(() => window.watched);
  const after = await rendererOf(session);
  const person = seen.agreedMs - seen.dialogMs;
  const since = (atMs: number) => atMs - seen.chosenMs - person;
  return {
    toDialog: seen.dialogMs - seen.chosenMs,
    toTraces: since(seen.tracesMs),
    toAllRows: since(seen.allRowsMs),
    toFigures: since(seen.figuresMs),
    pageMs: after.pageMs - before.pageMs,
    workerMs: after.workerMs - before.workerMs,
    allMs: after.allMs - before.allMs,
    pageWaitMs: after.pageWaitMs - before.pageWaitMs,
    workerWaitMs: after.workerWaitMs - before.workerWaitMs,
    longTasksMs: seen.longTasks
      .filter(({ atMs }) => atMs >= seen.chosenMs && atMs <= seen.figuresMs)
      .map(({ ms }) => ms),
  };
}

type Line = (
  what: string,
  value: number,
  unit: string,
  budget: string,
  note: string,
  decimals?: number,
) => Measured;

const line: Line = (what, value, unit, budget, note, decimals = 0) => ({
  part: PART,
  what,
  value,
  unit,
  decimals,
  budget,
  note,
});

function walkLines(walks: readonly Walk[]): readonly Measured[] {
  const middle = (of: (one: Walk) => number) => median(walks.map(of));
  const range = (of: (one: Walk) => number) => {
    const all = walks.map(of);
    return `${Math.round(Math.min(...all))} to ${Math.round(Math.max(...all))} in ${walks.length} runs`;
  };
  const clock = (what: string, of: (one: Walk) => number, budget = '') =>
    line(what, middle(of), 'ms', budget, `by the clock; ${range(of)}`);
  const processor = (what: string, of: (one: Walk) => number, waited?: (one: Walk) => number) => {
    const more = waited ? `; waited ${Math.round(middle(waited))} ms for a core` : '';
    return line(what, middle(of), 'ms', '', `processor time; ${range(of)}${more}`);
  };
  return [
    clock('file chosen to identity dialog', (one) => one.toDialog),
    clock("to first traces, without the person's time", (one) => one.toTraces, 'at most 700'),
    clock('to every signal row', (one) => one.toAllRows),
    clock('to all figures', (one) => one.toFigures, 'at most 3000'),
    processor(
      'of that the worker',
      (one) => one.workerMs,
      (one) => one.workerWaitMs,
    ),
    processor(
      'of that the main thread',
      (one) => one.pageMs,
      (one) => one.pageWaitMs,
    ),
    processor('of that all threads of the page process', (one) => one.allMs),
    line(
      'tasks over 50 ms on the main thread',
      middle((one) => one.longTasksMs.length),
      '',
      '',
      `longest ${Math.round(Math.max(0, ...walks.flatMap((one) => one.longTasksMs)))} ms`,
    ),
  ];
}

/** Panning while the worker reads the file, on a page of its own. */
async function busyPan(browser: Browser, address: string, path: string) {
  const page = await freshPage(browser, address);
  await chooseAndAgree(page, path);
  await there(page, 'tracesMs');
  const lines = panLines(
    PART,
    'Minutes dragged while the file is read',
    await dragged(browser, page, 'Minutes'),
  );
  await page.context().close();
  return lines;
}

/** What a person does next on a page with its figures. */
async function review(
  browser: Browser,
  session: CDPSession,
  page: Page,
): Promise<readonly Measured[]> {
  const before = await rendererOf(session);
  const edits = await editBeats(page);
  const after = await rendererOf(session);
  const usedMs = after.pageMs + after.workerMs - before.pageMs - before.workerMs;
  const longest = `by the clock, longest ${Math.round(Math.max(...edits))} ms of ${edits.length}; ${Math.round(usedMs / (edits.length + NOT_COUNTED))} ms of processor time, page and worker`;
  return [
    line('a beat classed otherwise, to its figures', median(edits), 'ms', 'at most 100', longest),
    ...panLines(PART, 'Minutes dragged', await dragged(browser, page, 'Minutes')),
    ...panLines(PART, 'Seconds dragged', await dragged(browser, page, 'Seconds')),
    ...panLines(PART, 'Minutes zoomed by wheel', await wheeled(browser, page, 'Minutes')),
  ];
}

/** In a browser: from a file to its figures, edits, panning, and the memory all of it took. */
export const opening: Part = async ({ minutes, folder, say }: Bench) => {
  const browser = await startBrowser(say);
  if (!browser) return [];
  const served = await servePage();
  try {
    say(`Chromium ${browser.version()}`);
    const path = await writeStudy(inventedStudy(minutes), folder);
    const session = await browser.newBrowserCDPSession();
    const walks: Walk[] = [];
    let page = await freshPage(browser, served.address);
    for (let run = 1; run <= RUNS; run += 1) {
      walks.push(await walk(page, session, path));
      if (run === RUNS) break;
      await page.context().close();
      page = await freshPage(browser, served.address);
    }
    const opened = await rendererOf(session);
    const lines = await review(browser, session, page);
    const { peakMB } = await rendererOf(session);
    await page.context().close();
    const memory = `${Math.round(opened.peakMB)} MB when the figures were there`;
    return [
      ...walkLines(walks),
      ...lines,
      ...(await busyPan(browser, served.address, path)),
      line('peak resident memory of the page process', peakMB, 'MB', 'at most 500', memory),
    ];
  } finally {
    served.stop();
    await browser.close();
  }
};
