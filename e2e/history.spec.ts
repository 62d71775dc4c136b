import { expect, type Locator, type Page, test } from 'playwright/test';
import {
  dialogOf,
  expectNoTroubles,
  freshPage,
  goTo,
  openStudy,
  press,
  reviewAs,
  STEADY,
  settled,
  told,
  words,
} from './support';

/** Puts a text into the log's field for words and waits for the lines that hold it. */
async function seek(dialog: Locator, text: string): Promise<void> {
  await dialog.getByLabel('With the words').fill(text);
  await settled(dialog.page());
}

const openLog = async (page: Page): Promise<Locator> => {
  await press(page, 'Shift+H');
  const dialog = dialogOf(page, 'Log');
  await expect(dialog).toBeVisible();
  await settled(page);
  return dialog;
};

const linesOf = async (dialog: Locator): Promise<readonly string[]> =>
  (await dialog.locator('tbody tr').allTextContents()).map(words);

test.describe('the log of two reviewers', () => {
  let page: Page;
  test.beforeAll(async ({ browser }) => {
    page = await freshPage(browser);
    await openStudy(page, STEADY);
    await reviewAs(page, 'A. Tech');
    await goTo(page, '0:31');
    await press(page, '.');
    await press(page, 'v');
    await press(page, '.');
    await press(page, 'Delete');
    await reviewAs(page, 'B. Tech');
    await press(page, 'Control+z');
    await goTo(page, '3:00');
    await press(page, 'Control+e');
  });
  test.afterAll(() => page.context().close());
  test.afterEach(() => expectNoTroubles(page));

  test('says who did what, from what to what, newest first', async () => {
    const dialog = await openLog(page);
    const lines = await linesOf(dialog);
    expect(lines.length).toBe(4);
    expect(lines[0]).toMatch(
      /^4.*B\. Tech.*span added: 0:02:55–0:03:05 for both, cause other, all leads/,
    );
    expect(lines[1]).toMatch(
      /^3.*B\. Tech.*undo of edit 2: delete beat at 0:00:3.*beat N at 0:00:3\d\.\d{3} added/,
    );
    expect(lines[2]).toMatch(/^2.*A\. Tech.*beat N at 0:00:3\d\.\d{3} removed/);
    expect(lines[3]).toMatch(/^1.*A\. Tech.*beat at 0:00:3\d\.\d{3}: class N → class V/);
    for (const line of lines) expect(line).toMatch(/\d{4}-\d\d-\d\d \d\d:\d\d:\d\d/);
    await press(page, 'Escape');
  });

  test('is narrowed to a kind, a reviewer, and words', async () => {
    const dialog = await openLog(page);
    await dialog.getByLabel('About').selectOption('spoiled spans');
    await settled(page);
    expect(await linesOf(dialog)).toHaveLength(1);
    await dialog.getByLabel('About').selectOption('everything');
    await dialog.getByLabel('By').selectOption('A. Tech');
    await settled(page);
    expect((await linesOf(dialog)).map((line) => line[0])).toEqual(['2', '1']);
    await seek(dialog, 'class v');
    expect((await linesOf(dialog)).map((line) => line[0])).toEqual(['1']);
    await seek(dialog, 'nowhere');
    await expect(dialog).toContainText('No line fits.');
    await press(page, 'Escape');
  });

  test('takes the panes to the place of a line', async () => {
    await goTo(page, '4:30');
    const dialog = await openLog(page);
    await dialog.getByRole('button', { name: 'Go to the place of edit 4, 0:02:55' }).click();
    await expect(dialog).toBeHidden();
    expect(await told(page, 'Seconds')).toContain('0:02:5');
  });
});
