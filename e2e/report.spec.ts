import { expect, type Page, test } from 'playwright/test';
import { FIGURES } from '../src/recording/figure-catalogue';
import {
  agree,
  dialogOf,
  expectNoTroubles,
  figure,
  freshPage,
  goTo,
  LONG_MS,
  openStudy,
  press,
  reviewAs,
  settled,
  undoName,
} from './support';
import { namedRecord } from './support-files';
import { needPdfTools, printed } from './support-pdf';

test.beforeAll(needPdfTools);

/** Points of A4 and Letter, which Chromium rounds a little. */
const SIZES = { A4: [595, 842], Letter: [612, 792] } as const;

async function openReport(page: Page): Promise<void> {
  if (!page.url().endsWith('#report')) await press(page, 'Shift+R');
  await expect(page.getByRole('article', { name: 'Report' })).toBeVisible({ timeout: LONG_MS });
  await settled(page);
}

async function closeReport(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Back to the review' }).click();
  await expect(page.getByRole('region', { name: 'Seconds', exact: true })).toBeVisible();
  await settled(page);
}

test.describe('the report of the demo study', () => {
  let page: Page;
  const shown = new Map<string, readonly [string, string]>();
  test.beforeAll(async ({ browser }) => {
    page = await freshPage(browser);
    await page.getByRole('main').getByRole('button', { name: 'Try the demo study' }).click();
    await agree(page);
    for (const { key } of FIGURES.filter(({ main }) => main))
      shown.set(key, [await figure(page, key, 'fasting'), await figure(page, key, 'fed')]);
    await openReport(page);
  });
  test.afterAll(() => page.context().close());
  test.afterEach(() => expectNoTroubles(page));

  for (const format of ['A4', 'Letter'] as const)
    test(`prints on ${format} with the figures of Findings and a draft mark on every page`, async () => {
      const print = await printed(page, format);
      for (const [i, points] of SIZES[format].entries())
        expect(Math.abs(print.size[i] - points)).toBeLessThan(2);
      expect(print.marks.length).toBeGreaterThan(1);
      expect(print.marks.length).toBeLessThan(7);
      for (const mark of print.marks) expect(mark).toBe('DRAFT');
      for (const { key, label } of FIGURES.filter(({ main }) => main)) {
        const values = (shown.get(key) ?? []).filter((value) => value !== '—');
        const rows = print.lines.filter((line) => line.startsWith(label));
        const inOrder = new RegExp(
          values.map((one) => `(?<= )${one.replaceAll('.', '\\.')}(?= )`).join('.*'),
        );
        expect(
          rows.some((row) => inOrder.test(`${row.replaceAll('−', '-')} `)),
          `${label}: ${values.join(', ')}`,
        ).toBe(true);
      }
    });

  test('says what it is of, how much could be used, how it was made, and the cautions', async () => {
    const { text } = await printed(page, 'A4');
    expect(text).toMatch(/invented/i);
    for (const phase of ['fasting', 'meal', 'fed']) expect(text).toContain(phase);
    expect(text).toMatch(/Bicadence \d+\.\d+\.\d+/);
    expect(text).toMatch(/[0-9a-f]{12}/);
    expect(text).toMatch(/240 s every 60 s/);
    expect(text).toMatch(/LF 0\.04.0\.15 Hz/);
    expect(text).toMatch(/0\.8.10 cpm/);
    expect(text).toMatch(/breathing/i);
    expect(text).toMatch(/movement/i);
    expect(text).toMatch(/Recordings from the skin show electrical rhythm/);
    expect(text).toMatch(/not a diagnosis|No finding is a diagnosis/);
    expect(text).toMatch(/A heartbeat trace can itself identify a person/);
    await expect(
      page.getByRole('article', { name: 'Report' }).getByRole('img').first(),
    ).toBeVisible();
  });
});

test.describe('the report of a named person', () => {
  let page: Page;
  test.beforeAll(async ({ browser }) => {
    page = await freshPage(browser);
    await openStudy(page, namedRecord());
    await reviewAs(page, 'R. Reader');
  });
  test.afterAll(() => page.context().close());
  test.afterEach(() => expectNoTroubles(page));

  test('tells who it is, not verified; hidden, it tells nobody', async () => {
    await openReport(page);
    const open = (await printed(page, 'A4')).text;
    for (const word of ['Avila Example', '1961', 'ZZ-0077', '2020-03-01', 'not verified'])
      expect(open).toContain(word);
    await press(page, 'Shift+I');
    const hidden = (await printed(page, 'A4')).text;
    for (const word of ['Avila', '1961', 'ZZ-0077', '2020-03-01', 'visit-7'])
      expect(hidden).not.toContain(word);
    expect(hidden).toMatch(/hidden/);
    await press(page, 'Shift+I');
    await closeReport(page);
  });

  test('signing asks which study it is and for a name', async () => {
    await press(page, 'Shift+F');
    const dialog = dialogOf(page, 'Sign');
    await dialog.getByRole('button', { name: 'Sign', exact: true }).click();
    await expect(dialog).toContainText('Confirm which study it is.');
    await expect(dialog.getByLabel('Name', { exact: true })).toHaveValue('R. Reader');
    await dialog.getByRole('button', { name: 'Not now' }).click();
    expect(await undoName(page)).toBe('');
  });

  test('signed as read it is final, with the words of the reader', async () => {
    await sign(page, { meaning: /^read/, conclusion: 'Slow wave near 3 a minute throughout.' });
    await openReport(page);
    const { text, marks } = await printed(page, 'Letter');
    for (const mark of marks) expect(mark).toBe('');
    expect(text).toMatch(/Final/);
    expect(text).toMatch(/R\. Reader/);
    expect(text).toMatch(/not authenticated/);
    expect(text).toContain('Slow wave near 3 a minute throughout.');
    await closeReport(page);
  });

  test('an edit after that makes it a draft again', async () => {
    await goTo(page, '0:31');
    await press(page, 'Control+e');
    await openReport(page);
    const { text, marks } = await printed(page, 'A4');
    for (const mark of marks) expect(mark).toBe('DRAFT');
    expect(text).toMatch(/changed since R\. Reader signed/);
    await closeReport(page);
  });

  test('then it can only be amended, with a reason, and the former stays on it', async () => {
    const signedRmssd = await figure(page, 'rmssd_ms');
    await press(page, 'Shift+F');
    const dialog = dialogOf(page, 'Sign');
    await expect(dialog.getByRole('radio')).toHaveCount(1);
    await dialog.getByRole('checkbox').check();
    await dialog.getByRole('button', { name: 'Sign', exact: true }).click();
    await expect(dialog).toContainText('Say why it is amended.');
    await dialog.getByRole('button', { name: 'Not now' }).click();
    await sign(page, { meaning: /^amended/, reason: 'A noisy stretch was left in.' });
    await openReport(page);
    const { text, marks } = await printed(page, 'A4');
    for (const mark of marks) expect(mark).toBe('');
    expect(text).toMatch(/Amended/i);
    expect(text).toContain('A noisy stretch was left in.');
    expect(text).toMatch(/Former/i);
    expect(text).toContain(signedRmssd);
    await closeReport(page);
  });
});

interface Signing {
  readonly meaning: RegExp;
  readonly conclusion?: string;
  readonly reason?: string;
}

async function sign(page: Page, { meaning, conclusion, reason }: Signing): Promise<void> {
  await settled(page);
  await page.keyboard.press('Shift+F');
  const dialog = dialogOf(page, 'Sign');
  await expect(dialog).toContainText('ZZ-0077');
  await dialog.getByRole('checkbox').check();
  await dialog.getByRole('radio', { name: meaning }).check();
  if (reason !== undefined) await dialog.getByLabel('Reason for the amendment').fill(reason);
  if (conclusion !== undefined) await dialog.getByLabel('Conclusion').fill(conclusion);
  await dialog.getByRole('button', { name: 'Sign', exact: true }).click();
  await expect(dialog).toBeHidden();
  await settled(page);
}
