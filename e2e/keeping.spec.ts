import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, type Page, test } from 'playwright/test';
import {
  agree,
  allFigures,
  bar,
  chooseFile,
  dialogOf,
  editNumber,
  expectNoTroubles,
  figuresThere,
  freshPage,
  goTo,
  IDENTITY,
  keptHere,
  LONG_MS,
  openStudy,
  press,
  RECORD,
  RECORD_CODE,
  RECORD_FOLDER,
  reviewAs,
  STEADY,
  settled,
  undoName,
} from './support';
import { startOwnBrowser } from './support-browser';
import { downloadSession, type Offered, tables } from './support-results';

const OTHER = `${RECORD_FOLDER}record208-rates.edf`;
const ANOTHER = /(not the|another|a different|of other) (file|study|one|recording)/i;
const SAME_FILE = /choose the same file to go on/i;

const given = ({ name, bytes }: Offered) => ({ name, mimeType: 'application/json', buffer: bytes });

/** Three edits of different kinds: a class, a deleted beat, a spoiled span. Returns the figures after them. */
async function someWork(page: Page): Promise<readonly string[]> {
  await goTo(page, '0:31');
  await press(page, '.');
  await press(page, 'v');
  await press(page, 'Delete');
  await goTo(page, '3:00');
  await press(page, 'Control+e');
  await keptHere(page, 3);
  return allFigures(page);
}

test('an edit is found again after the browser was killed right after it', async ({ baseURL }) => {
  const profile = await mkdtemp(join(tmpdir(), 'bicadence-e2e-'));
  try {
    const first = await startOwnBrowser(profile, baseURL ?? '');
    await openStudy(first.page);
    await reviewAs(first.page);
    const figures = await someWork(first.page);
    await first.page.keyboard.press('Control+a');
    await first.page.keyboard.press('q');
    await keptHere(first.page, 4);
    await first.kill();

    const second = await startOwnBrowser(profile, baseURL ?? '');
    try {
      await expect(second.page.getByRole('main')).toContainText(RECORD_CODE);
      await expect(second.page.getByRole('main')).toContainText('4 edits');
      await chooseFile(second.page, RECORD);
      await expect(dialogOf(second.page, IDENTITY)).toContainText('4 edits will be there again');
      await agree(second.page);
      expect(await undoName(second.page)).toMatch(/^class \d+ beats .* as Q$/);
      expect(await editNumber(second.page)).toBe(4);
      await reviewAs(second.page);
      await press(second.page, 'Control+z');
      expect(await allFigures(second.page)).toEqual(figures);
    } finally {
      await second.kill();
    }
  } finally {
    await rm(profile, { recursive: true, force: true, maxRetries: 5 });
  }
});

test.describe('work on one study', () => {
  let page: Page;
  let figures: readonly string[];
  let session: Offered;
  test.beforeAll(async ({ browser }) => {
    page = await freshPage(browser);
    await openStudy(page);
    await reviewAs(page);
    figures = await someWork(page);
    session = await downloadSession(page);
  });
  test.afterAll(() => page.context().close());
  test.afterEach(() => expectNoTroubles(page));

  test('the session is a file named by the code, and the bar says which edit it holds', async () => {
    expect(session.name).toBe(`${RECORD_CODE}.bicadence.json`);
    await expect(bar(page)).toContainText('in file, edit 3');
    const document = JSON.parse(session.bytes.toString('utf8'));
    expect(document).toMatchObject({ format: 'bicadence-session', study: { code: RECORD_CODE } });
    expect(document.log.length).toBe(3);
    expect(document.study.sha256).toMatch(/^[0-9a-f]{64}$/);
  });

  test('a reload asks for the same file, and goes on where the work was left', async () => {
    await page.reload();
    await expect(page.getByText(SAME_FILE).first()).toBeVisible();
    await chooseFile(page, RECORD);
    await agree(page);
    expect(await allFigures(page)).toEqual(figures);
    expect(await undoName(page)).toMatch(/^exclude 0:02:55/);
    await reviewAs(page);
    await press(page, 'Control+z');
    await keptHere(page, 4);
    await press(page, 'Control+Shift+z');
    await keptHere(page, 5);
    expect(await allFigures(page)).toEqual(figures);
  });

  test('leaving with work that is in no file asks; with all of it in a file it does not', async () => {
    await press(page, 'Control+z');
    const asked = page.waitForEvent('dialog');
    await page.close({ runBeforeUnload: true });
    const dialog = await asked;
    expect(dialog.type()).toBe('beforeunload');
    await dialog.dismiss();
    await expect(bar(page)).toContainText(RECORD_CODE);
    await press(page, 'Control+Shift+z');
    await downloadSession(page);
    await expect(bar(page)).toContainText('in file, edit');
    const closed = page.waitForEvent('close');
    await page.close({ runBeforeUnload: true });
    await closed;
  });

  test('in a fresh profile the session and the same file give the same figures', async ({
    browser,
  }) => {
    const other = await freshPage(browser);
    await chooseFile(other, given(session));
    await expect(dialogOf(other, SAME_FILE)).toContainText(RECORD_CODE);
    const chooser = other.waitForEvent('filechooser');
    await dialogOf(other, SAME_FILE).getByRole('button', { name: 'Choose the file…' }).click();
    await (await chooser).setFiles(RECORD);
    await agree(other);
    expect(await allFigures(other)).toEqual(figures);
    expect(await undoName(other)).toMatch(/^exclude 0:02:55/);
    expect((await downloadSession(other)).bytes.equals(session.bytes)).toBe(true);
    expectNoTroubles(other);
    await other.context().close();
  });

  test('a session of another study is refused, and nothing of it reaches the open one', async ({
    browser,
  }) => {
    const other = await freshPage(browser);
    await openStudy(other, OTHER, 'OTHER-1');
    const before = await allFigures(other);
    await chooseFile(other, given(session));
    await expect(other.getByRole('dialog')).toContainText(ANOTHER);
    await expect(other.getByRole('dialog')).toContainText(RECORD_CODE);
    await other.keyboard.press('Escape');
    await expect(bar(other)).toContainText('OTHER-1');
    expect(await allFigures(other)).toEqual(before);
    expect((await tables(other)).spans.filter(({ origin }) => origin === 'drawn')).toEqual([]);
    await other.context().close();
  });

  test('a file that is not the one of the session is said to be another', async ({ browser }) => {
    const other = await freshPage(browser);
    await chooseFile(other, given(session));
    const chooser = other.waitForEvent('filechooser');
    await dialogOf(other, SAME_FILE).getByRole('button', { name: 'Choose the file…' }).click();
    await (await chooser).setFiles(OTHER);
    await expect(other.getByRole('dialog')).toContainText(ANOTHER);
    await other.context().close();
  });

  test('a damaged or foreign session file is refused in words', async ({ browser }) => {
    const other = await freshPage(browser);
    const whole = JSON.parse(session.bytes.toString('utf8'));
    const broken: readonly (readonly [string, string])[] = [
      ['no JSON', '{ not json'],
      ['something else', '{"format":"something-else"}'],
      ['of a newer program', JSON.stringify({ ...whole, version: 999 })],
      ['a log that does not lead to it', JSON.stringify({ ...whole, log: whole.log.slice(0, -1) })],
      [
        'a span that ends before it starts',
        JSON.stringify({ ...whole, spans: [{ ...whole.spans[0], toS: -1 }] }),
      ],
    ];
    for (const [what, text] of broken) {
      await chooseFile(other, given({ name: 'bad.json', bytes: Buffer.from(text) }));
      const dialog = dialogOf(other, 'This did not work');
      await expect(dialog.locator('.failure-what'), what).not.toHaveText('');
      await dialog.getByRole('button', { name: 'Close' }).click();
    }
    expectNoTroubles(other);
    await other.context().close();
  });
});

test('a reload asks for the file of an invented study that is not the demo, instead of making the demo', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  await openStudy(page, STEADY);
  await expect(page.getByText('invented data', { exact: true }).first()).toBeVisible();
  await page.reload();
  await expect(page.getByText(SAME_FILE).first()).toBeVisible({ timeout: LONG_MS });
  await chooseFile(page, STEADY);
  await agree(page);
  await expect(page.getByText('invented data', { exact: true }).first()).toBeVisible();
  await page.context().close();
});

test('a second tab on the same study loses nothing and says so', async ({ browser }) => {
  const page = await freshPage(browser);
  await openStudy(page);
  await reviewAs(page);
  await goTo(page, '0:31');
  await press(page, '.');
  await press(page, 'v');
  await keptHere(page, 1);
  const second = await page.context().newPage();
  await second.goto('./');
  await openStudy(second);
  expect(await editNumber(second)).toBe(1);
  await reviewAs(second);
  await press(second, 'Control+z');
  await keptHere(second, 2);
  await press(page, 'Control+z');
  await settled(page);
  await expect(bar(page)).toContainText('not kept');
  await second.reload();
  await chooseFile(second, RECORD);
  await agree(second);
  await figuresThere(second);
  expect(await editNumber(second)).toBe(2);
  await page.context().close();
});
