import { expect, type Locator, type Page, test } from 'playwright/test';
import {
  agree,
  allFigures,
  chooseFile,
  dialogOf,
  editNumber,
  expectNoTroubles,
  figure,
  figureButton,
  freshPage,
  goTo,
  openStudy,
  pane,
  press,
  reviewAs,
  STEADY,
  settled,
  told,
  words,
} from './support';
import { downloadSession, type Offered } from './support-results';

const given = ({ name, bytes }: Offered) => ({ name, mimeType: 'application/json', buffer: bytes });

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

test('a figure tells what the edits of this sitting made of it, and of a session from a file too', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  await openStudy(page, STEADY);
  await reviewAs(page, 'A. Tech');
  await goTo(page, '0:31');
  const found = await figure(page, 'rmssd_ms');
  await press(page, '.');
  await press(page, 'Delete');
  const deleted = await figure(page, 'rmssd_ms');
  await press(page, '.');
  await press(page, 'v');
  const classed = await figure(page, 'rmssd_ms');
  await reviewAs(page, 'B. Tech');
  await press(page, 'Control+z');
  expect(new Set([found, deleted, classed]).size).toBe(3);
  const wanted = [
    [/^—as the program found it/, found],
    [/^1A\. Techdelete beat at 0:00:3/, deleted],
    [/^2A\. Techclass beat at 0:00:3\d\.\d as V/, classed],
    [/^3B\. Techundo of edit 2: class beat/, deleted],
  ] as const;
  const expectHistory = async () => {
    const history = dialogOf(page, 'RMSSD').getByRole('region', { name: 'History' });
    await expect(history).toContainText(`${found} → ${deleted} ms after 3 edits`);
    const lines = history.locator('tbody tr');
    await expect(lines).toHaveCount(wanted.length);
    for (const [i, [what, value]] of wanted.entries()) {
      await expect(lines.nth(i)).toHaveText(what);
      await expect(lines.nth(i).locator('td').last()).toHaveText(value);
    }
  };
  await figureButton(page, 'rmssd_ms').click();
  await expectHistory();
  await press(page, 'Escape');

  const session = await downloadSession(page);
  const other = await freshPage(browser);
  await chooseFile(other, given(session));
  await other.getByRole('button', { name: 'Choose the file…' }).waitFor();
  await chooseFile(other, STEADY);
  await agree(other);
  const figures = await allFigures(other);
  await figureButton(other, 'rmssd_ms').click();
  const history = dialogOf(other, 'RMSSD').getByRole('region', { name: 'History' });
  await history.getByRole('button', { name: 'Show what the edits changed' }).click();
  await expect(history).toContainText(`${found} → ${deleted} ms after 3 edits`);
  await settled(other);
  await press(other, 'Escape');
  expect(await allFigures(other)).toEqual(figures);
  expectNoTroubles(page);
  expectNoTroubles(other);
  await other.context().close();
  await page.context().close();
});

test.describe('two sessions of one study', () => {
  let page: Page;
  let there: Offered;
  let thereRmssd: string;
  test.beforeAll(async ({ browser }) => {
    const other = await freshPage(browser);
    await openStudy(other, STEADY);
    await reviewAs(other, 'B. Tech');
    await goTo(other, '0:31');
    await press(other, '.');
    await press(other, 'v');
    await press(other, '.');
    await press(other, 'Delete');
    thereRmssd = await figure(other, 'rmssd_ms');
    there = await downloadSession(other);
    await other.context().close();
    page = await freshPage(browser);
    await openStudy(page, STEADY);
    await reviewAs(page, 'A. Tech');
    await goTo(page, '3:00');
    await press(page, 'Control+e');
    await goTo(page, '0:31');
    await press(page, 'Escape');
    await press(page, '.');
    await press(page, 's');
    await press(page, 'Escape');
  });
  test.afterAll(() => page.context().close());
  test.afterEach(() => expectNoTroubles(page));

  const openCompare = async (): Promise<Locator> => {
    await press(page, 'Shift+C');
    const dialog = dialogOf(page, 'Compare with another session');
    await expect(dialog).toBeVisible();
    await settled(page);
    return dialog;
  };
  const choose = async (dialog: Locator, file: ReturnType<typeof given>) => {
    await dialog.getByLabel('Session to compare with').setInputFiles(file);
    await settled(page);
  };

  test('a session of another recording is refused with words', async () => {
    const dialog = await openCompare();
    const document = JSON.parse(there.bytes.toString('utf8'));
    for (const state of [document, document.start])
      state.study = { ...state.study, sha256: '0'.repeat(64), code: 'OTHER-1' };
    const bytes = Buffer.from(JSON.stringify(document));
    await choose(dialog, given({ ...there, bytes }));
    await expect(dialog).toContainText('That session is of another recording (OTHER-1)');
    await choose(dialog, given({ ...there, bytes: Buffer.from('no session') }));
    await expect(dialog).toContainText('This session is damaged');
    await expect(dialog.getByRole('table')).toHaveCount(0);
    await press(page, 'Escape');
  });

  test('the planted differences are found, with agreement and both figures', async () => {
    const edit = await editNumber(page);
    const figures = await allFigures(page);
    const dialog = await openCompare();
    await choose(dialog, given(there));
    await expect(dialog).toContainText('Here: 2 edits by A. Tech.');
    await expect(dialog).toContainText('2 edits by B. Tech.');
    const rows = (
      await dialog.getByRole('table', { name: 'Agreement' }).locator('tr').allTextContents()
    ).map(words);
    // As many beats as went in (test/fixtures/steady/study.ts): one is gone there, one has another class.
    expect(rows).toContain('beats37137037099.7 %');
    expect(rows).toContain('beats of the same class36999.5 %');
    const places = dialog.getByRole('region', { name: 'Places that differ' }).locator('tbody tr');
    await expect(places).toHaveCount(3);
    await expect(places.nth(0)).toHaveText(/beat of another classclass Sclass V$/);
    await expect(places.nth(1)).toHaveText(/beat only hereclass N at 0:00:3\d\.\d{3}none$/);
    await expect(places.nth(2)).toHaveText(
      /^0:02:55stretch excluded by one onlyexcluded for stomach .*, heart .*, cause othercounts$/,
    );
    await expect(dialog).toContainText('Leads, settings, phases, events and words are the same.');
    const rmssd = dialog
      .getByRole('region', { name: 'Figures' })
      .locator('tr', { hasText: 'RMSSD, ms' });
    await expect(rmssd).toHaveText(
      `RMSSD, msfasting${await figure(page, 'rmssd_ms')}${thereRmssd}`,
    );
    await press(page, 'Escape');
    expect(await editNumber(page)).toBe(edit);
    expect(await allFigures(page)).toEqual(figures);
  });

  test('a difference is a click away in the panes, and the others a key', async () => {
    await goTo(page, '4:30');
    const dialog = await openCompare();
    await dialog.getByRole('button', { name: /beat only here$/ }).click();
    await expect(dialog).toBeHidden();
    expect(await told(page, 'Seconds')).toMatch(/from 0:00:2\d to 0:00:3\d/);
    const status = page.locator('.foot-status');
    await expect(status).toHaveText(
      /^Difference 2 of 3: beat: here class N at 0:00:3\d\.\d{3}, there none$/,
    );
    const chosen = pane(page, 'Seconds').locator('button.pin[aria-pressed="true"]');
    await expect(chosen).toHaveCount(1);
    await press(page, 'Shift+J');
    await expect(status).toHaveText(/^Difference 3 of 3: 0:02:55–0:03:05/);
    expect(await told(page, 'Seconds')).toContain('0:02:5');
    await press(page, 'Shift+J');
    await expect(status).toHaveText(
      /^Difference 1 of 3: beat at 0:00:3.*here class S, there class V$/,
    );
    await press(page, 'Shift+U');
    await expect(status).toHaveText(/^Difference 3 of 3/);
  });
});
