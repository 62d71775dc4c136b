import { expect, type Page, test } from 'playwright/test';
import {
  agree,
  allFigures,
  bar,
  chooseFile,
  dialogOf,
  expectNoTroubles,
  figureNumber,
  figuresThere,
  freshPage,
  IDENTITY,
  LONG_MS,
  openStudy,
  pane,
  press,
  RECORD,
  RECORD_CODE,
  REFUSED,
  reviewAs,
  settled,
  showAllLeads,
  told,
  undoName,
  words,
} from './support';
import { expectDrawn } from './support-drawing';
import {
  cutHeader,
  dropFile,
  type GivenFile,
  namedRecord,
  noDuration,
  packed,
  recordFile,
} from './support-files';

test('by the file chooser: who it is comes first, and nothing of it is drawn before', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  const chooser = page.waitForEvent('filechooser');
  await page.getByRole('main').getByRole('button', { name: 'Open a file…' }).click();
  await (await chooser).setFiles(RECORD);
  const dialog = dialogOf(page, IDENTITY);
  await expect(dialog).toBeVisible({ timeout: LONG_MS });
  await expect(dialog).toContainText('From the file header, not verified.');
  for (const fact of ['Name', 'Code', 'Born', 'Start', 'Length'])
    await expect(dialog.getByText(fact, { exact: true })).toBeVisible();
  await expect(dialog).toContainText('2020-03-01, 09:00');
  await expect(dialog).toContainText('0:05:00');
  await expect(dialog).toContainText('record208-abdomen.edf');
  await expect(dialog.getByLabel('Code the study is kept under')).toHaveValue(RECORD_CODE);
  await expect(page.locator('canvas')).toHaveCount(0);
  await expect(bar(page)).toContainText('no study open');
  await agree(page);
  await expect(bar(page)).toContainText(RECORD_CODE);
  await expect(bar(page)).toContainText('0:05:00 · 3 channels · 360 Hz');
  expectNoTroubles(page);
  await page.context().close();
});

test('by dropping it on the page', async ({ browser }) => {
  const page = await freshPage(browser);
  await dropFile(page, recordFile());
  const dialog = dialogOf(page, IDENTITY);
  await expect(dialog).toContainText('record208-abdomen.edf', { timeout: LONG_MS });
  await agree(page);
  expectNoTroubles(page);
  await page.context().close();
});

test.describe('with a recording open', () => {
  let page: Page;
  test.beforeAll(async ({ browser }) => {
    page = await freshPage(browser);
    await openStudy(page);
    await reviewAs(page);
  });
  test.afterAll(() => page.context().close());
  test.afterEach(() => expectNoTroubles(page));

  test('the leads are parted and every row is drawn', async () => {
    await showAllLeads(page);
    await expectDrawn(page, 'Minutes');
    await expectDrawn(page, 'Seconds');
    const minutes = await told(page, 'Minutes');
    for (const lead of ['E1', 'E2', 'E3']) {
      expect(minutes).toMatch(new RegExp(`${lead}, recorded: -?\\d+ to \\d+ uV`));
      expect(minutes).toMatch(new RegExp(`${lead}, slow wave: -?\\d+ to \\d+ uV`));
    }
    expect(minutes).toMatch(/Spectrogram 1 to 9 cpm/);
    expect(await told(page, 'Seconds')).toMatch(/E\d, heartbeat: -?\d+ to \d+ uV/);
    // 3.1 cpm is what the fixture's maker put in (truth.json).
    expect(await figureNumber(page, 'df_median_cpm')).toBeCloseTo(3.1, 1);
  });

  test('the roles come with a reason each and are changed in one dialog, as one undo step', async () => {
    const before = await allFigures(page);
    await page.keyboard.press('Shift+L');
    const dialog = dialogOf(page, 'Leads and their roles');
    const reasons = dialog.locator('.lead-row p');
    await expect(dialog.locator('.lead-row')).toHaveCount(5);
    expect((await reasons.allInnerTexts()).filter((text) => text.trim() !== '').length).toBe(5);
    await expect(dialog).toContainText(/Why this lead is reported: \S+/);
    await dialog.getByLabel('Heart lead').selectOption({ label: '#3 E3, 360 Hz' });
    await dialog.getByRole('button', { name: 'Use these leads' }).click();
    await expect(dialog).toBeHidden();
    await settled(page);
    await expect(
      pane(page, 'Seconds').getByRole('button', { name: 'E3 heartbeat', exact: true }),
    ).toBeVisible();
    expect(await undoName(page)).toBe('change leads');
    await press(page, 'Control+z');
    expect(await allFigures(page)).toEqual(before);
  });

  test('a lead may be the difference of two channels', async () => {
    await page.keyboard.press('Shift+L');
    const dialog = dialogOf(page, 'Leads and their roles');
    const first = dialog.locator('.lead-row').first();
    await first.getByLabel('minus').selectOption({ label: '#3 E3, 360 Hz' });
    const reason = dialog.getByLabel('Reason for reporting another lead');
    if (await reason.isVisible()) await reason.fill('a difference was wanted');
    await dialog.getByRole('button', { name: 'Use these leads' }).click();
    await showAllLeads(page);
    await expectDrawn(page, 'Minutes');
    expect(await told(page, 'Minutes')).toMatch(/E1 − E3, slow wave: -?\d+ to \d+ uV/);
    await press(page, 'Control+z');
  });

  const broken: readonly (readonly [string, () => GivenFile, RegExp])[] = [
    ['cut off inside its header', cutHeader, /ends inside its header: 500 of \d+ bytes/],
    ['with records of no length', noDuration, /duration of a record/],
    ['that is packed', packed, /gzip/],
  ];
  for (const [what, file, says] of broken)
    test(`a file ${what} is refused by place and remedy; the open study stays`, async () => {
      const before = await allFigures(page);
      const { name, buffer } = file();
      await chooseFile(page, { name, mimeType: 'application/octet-stream', buffer });
      const dialog = page.getByRole('dialog');
      await expect(dialog.getByRole('heading', { level: 2 })).toHaveText(REFUSED);
      await expect(dialog.locator('.failure-what')).toContainText(`${name}: `);
      await expect(dialog.locator('.failure-what')).toContainText(says);
      await expect(dialog).toContainText(/Where: .*byte \d+/);
      const remedy = words(await dialog.locator('.dialog-body p').last().textContent());
      expect(remedy).toMatch(/^[A-Z].{10,}\.$/);
      await dialog.getByRole('button', { name: 'Close' }).click();
      await expect(bar(page)).toContainText(RECORD_CODE);
      expect(await allFigures(page)).toEqual(before);
      await expectDrawn(page, 'Seconds');
    });

  test('another study hides the one before until it is agreed to; leaving it brings that back', async () => {
    const before = await allFigures(page);
    await chooseFile(page, namedRecord());
    const dialog = dialogOf(page, IDENTITY);
    await expect(dialog).toContainText('Avila Example');
    await expect(dialog).toContainText('1961');
    await expect(page.locator('canvas')).toHaveCount(0);
    await expect(bar(page)).not.toContainText(RECORD_CODE);
    await dialog.getByRole('button', { name: 'Do not open' }).click();
    await expect(bar(page)).toContainText(RECORD_CODE);
    expect(await allFigures(page)).toEqual(before);
    await chooseFile(page, namedRecord());
    await expect(dialog).toBeVisible();
    await page.keyboard.press('Escape');
    await expect(dialog).toBeHidden();
    expect(await allFigures(page)).toEqual(before);
    await expectDrawn(page, 'Seconds');
  });
});

test('the demo study says that it is invented wherever it is seen', async ({ browser }) => {
  const page = await freshPage(browser);
  await page.getByRole('main').getByRole('button', { name: 'Try the demo study' }).click();
  const dialog = dialogOf(page, IDENTITY);
  await expect(dialog).toContainText(/invented/i, { timeout: LONG_MS });
  await agree(page);
  await expect(bar(page)).toContainText('invented data');
  await expectDrawn(page, 'Minutes');
  await press(page, 'Shift+R');
  await expect(page.getByRole('article', { name: 'Report' })).toContainText(/invented/i);
  await press(page, 'Shift+R');
  await press(page, 'Shift+I');
  await expect(bar(page)).toContainText('invented data');
  await press(page, 'Shift+Q');
  const kept = page.getByRole('listitem').filter({ hasText: 'edit' });
  await expect(kept).toContainText('invented data');
  await kept.getByRole('button').first().click();
  await agree(page);
  await figuresThere(page);
  expectNoTroubles(page);
  await page.context().close();
});
