import { fileURLToPath } from 'node:url';
import {
  type Browser,
  type BrowserContext,
  expect,
  type Locator,
  type Page,
} from 'playwright/test';
import { FIGURES } from '../src/recording/figure-catalogue';

/** Folder of the open data fixture, record 208; its origin and licence are beside it. */
export const RECORD_FOLDER = fileURLToPath(new URL('../test/fixtures/record208/', import.meta.url));
/** Five minutes, E1-E3 in uV at 360 Hz, one phase `fasting` over its whole length. */
export const RECORD = `${RECORD_FOLDER}record208-abdomen.edf`;
/** Five invented minutes in sinus rhythm: variability figures stand on them. */
export const STEADY = `${RECORD_FOLDER.replace('record208', 'steady')}steady.edf`;
export const RECORD_CODE = 'MITDB-208';
export const RECORD_SECONDS = 300;

/** Opening a study and making all of its figures, on a machine that does other things too. */
export const LONG_MS = 90_000;

const troubles = new WeakMap<BrowserContext, string[]>();

/** Notes whatever the pages of a context complain of; `expectNoTroubles` asks for it. */
export function listenForTroubles(context: BrowserContext): void {
  const heard: string[] = [];
  troubles.set(context, heard);
  context.on('weberror', (one) => heard.push(`error: ${one.error().message}`));
  context.on('console', (one) => {
    if (one.type() === 'error' || one.type() === 'warning')
      heard.push(`${one.type()}: ${one.text()}`);
  });
}

/** Nothing was thrown and nothing was written to the console as an error or a warning. */
export function expectNoTroubles(page: Page): void {
  expect(troubles.get(page.context()) ?? []).toEqual([]);
}

/** A fresh profile with the start screen open. */
export async function freshPage(
  browser: Browser,
  options: Parameters<Browser['newContext']>[0] = {},
): Promise<Page> {
  const context = await browser.newContext(options);
  listenForTroubles(context);
  const page = await context.newPage();
  await page.goto('./');
  return page;
}

/** Waits until the page says that it is idle and its figures belong to the last edit. */
export async function settled(page: Page): Promise<void> {
  await page.waitForFunction(
    () =>
      document.documentElement.dataset.idle === 'true' &&
      document.querySelector('[aria-busy="true"]') === null,
    null,
    { timeout: LONG_MS },
  );
}

/** The open dialog of a title. */
export const dialogOf = (page: Page, title: string | RegExp): Locator =>
  page.getByRole('dialog', { name: title });

export const IDENTITY = 'Is this the right study?';
export const REFUSED = 'This did not work';

/** Gives the page a file as its file chooser would; ends with a dialog: whose study it is, or why it cannot be opened. */
export async function chooseFile(
  page: Page,
  file: Parameters<Locator['setInputFiles']>[0],
): Promise<void> {
  await page.getByLabel('File to open').setInputFiles(file);
}

/** Agrees that the study is the right one and waits for its figures. */
export async function agree(page: Page, code?: string): Promise<void> {
  const dialog = dialogOf(page, IDENTITY);
  await expect(dialog).toBeVisible({ timeout: LONG_MS });
  if (code !== undefined) await dialog.getByLabel('Code the study is kept under').fill(code);
  await dialog.getByRole('button', { name: 'This is the study, open it' }).click();
  await expect(dialog).toBeHidden();
  await figuresThere(page);
}

/** Waits until figures stand in Findings and nothing is under way. */
export async function figuresThere(page: Page): Promise<void> {
  await expect(findings(page).getByRole('table').first()).toBeVisible({ timeout: LONG_MS });
  await settled(page);
}

/** Opens a file and waits for its figures. */
export async function openStudy(
  page: Page,
  file: Parameters<Locator['setInputFiles']>[0] = RECORD,
  code?: string,
): Promise<void> {
  await chooseFile(page, file);
  await agree(page, code);
}

/** Says who reviews, so that edits are not stopped by the question. */
export async function reviewAs(page: Page, name = 'T. Technician'): Promise<void> {
  await page.getByRole('button', { name: /^Reviewer: / }).click();
  const dialog = dialogOf(page, 'Who reviews?');
  await dialog.getByLabel('Name or initials of the reviewer').fill(name);
  await dialog.getByRole('button', { name: 'Go on' }).click();
  await expect(page.getByRole('button', { name: `Reviewer: ${name}` })).toBeVisible();
}

/** Presses a key on the page as a whole and waits for what it did. */
export async function press(page: Page, key: string): Promise<void> {
  await page.keyboard.press(key);
  await settled(page);
}

/** Puts away all messages to the person, which lie over the panes. */
export async function putMessagesAway(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Put away' }).evaluateAll((buttons) => {
    for (const button of buttons) if (button instanceof HTMLElement) button.click();
  });
}

/** Goes to a time by the dialog; the middle of Seconds stands there. */
export async function goTo(page: Page, time: string): Promise<void> {
  await page.keyboard.press('Control+g');
  const dialog = dialogOf(page, 'Go to a time');
  await dialog.getByLabel('Time', { exact: true }).fill(time);
  await page.keyboard.press('Enter');
  await expect(dialog).toBeHidden();
  await settled(page);
}

/** Text as it is read: runs of blanks as one. */
export const words = (text: string | null): string => (text ?? '').replaceAll(/\s+/g, ' ').trim();

/** The bar over everything; a dialog has a header too. */
export const bar = (page: Page): Locator => page.locator('.top-bar');
export const findings = (page: Page): Locator => page.getByRole('region', { name: 'Findings' });
export const pane = (page: Page, name: 'Whole study' | 'Minutes' | 'Seconds'): Locator =>
  page.getByRole('region', { name, exact: true });

/** The words beside a pane's drawing: window, rows, values. */
export async function told(page: Page, name: 'Whole study' | 'Minutes' | 'Seconds') {
  await settled(page);
  return (await pane(page, name).locator('[data-part="summary"]').textContent()) ?? '';
}

/** Shows the rows of all slow-wave leads, where a low page shows the reported one alone. */
export async function showAllLeads(page: Page): Promise<void> {
  const button = page.getByRole('button', { name: /^Show all \d+ leads$/ });
  if (await button.isVisible()) await button.click();
  await settled(page);
}

/** What the Undo button would take back, '' where nothing. */
export async function undoName(page: Page): Promise<string> {
  const button = bar(page).getByRole('button', { name: /^Undo/ });
  return words(await button.textContent()).replace(/^Undo ?/, '');
}

/** The number of the last edit, as the bar says where it is kept. */
export async function editNumber(page: Page): Promise<number> {
  const kept = words(await bar(page).locator('.kept').textContent());
  return Number(/edit (\d+)/.exec(kept)?.[1] ?? Number.NaN);
}

/** Waits until the bar says that an edit is kept in this browser. */
export async function keptHere(page: Page, edit: number): Promise<void> {
  await expect(bar(page)).toContainText(`in this browser only, edit ${edit}`);
}

/** The button of a figure in Findings, by its key in the catalogue (the keys are stable, the labels may be bettered). */
export function figureButton(page: Page, key: string, phase = 'fasting'): Locator {
  const definition = FIGURES.find((one) => one.key === key);
  if (!definition) throw new Error(`no figure ${key}`);
  const { label, organ } = definition;
  return findings(page).locator(`.organ-${organ} button.figure`, {
    has: page.locator('.unseen', { hasText: `${label}, ${phase}: ` }),
  });
}

/** The large part of a figure in Findings: a number, a count, or a dash. */
export async function figure(page: Page, key: string, phase = 'fasting'): Promise<string> {
  await settled(page);
  const large = figureButton(page, key, phase).first().locator('.figure-large');
  return words(await large.textContent()).replace('−', '-');
}

/** A figure as a number. */
export const figureNumber = async (page: Page, key: string, phase = 'fasting'): Promise<number> =>
  Number(await figure(page, key, phase));

/** All figures in sight with what each stands on, to compare a whole column at once; what the evidence says of them follows later. */
export async function allFigures(page: Page): Promise<readonly string[]> {
  await settled(page);
  const titles = await findings(page)
    .locator('button.figure')
    .evaluateAll((buttons) => buttons.map((button) => button.getAttribute('title') ?? ''));
  return titles.map((title) => {
    const [figure, ...small] = title.split('\n');
    const basis = small.filter((line) => /^\d/.test(line) && !line.includes(' by chance, '));
    return [figure, ...basis].join('; ');
  });
}
