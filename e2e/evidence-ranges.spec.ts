import { expect, type Page, test } from 'playwright/test';
import {
  agree,
  dialogOf,
  expectNoTroubles,
  figureButton,
  findings,
  freshPage,
  LONG_MS,
  words,
} from './support';

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await page.getByRole('main').getByRole('button', { name: 'Try the demo study' }).click();
  await agree(page);
  await expect(findings(page).getByText('Small: 95 % range by chance')).toBeVisible({
    timeout: LONG_MS,
  });
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

/** The ends of the first range in some words. */
function endsOf(text: string | null): readonly [number, number] {
  const found = /(−?[\d.]+)(?:–| to |…)(−?[\d.]+)/.exec(words(text));
  if (!found) throw new Error(`no range in: ${text}`);
  const [low, high] = found.slice(1).map((end) => Number(end.replace('−', '-')));
  return [low, high];
}

test('a range stands beneath its figure, says which it is to whoever listens, and holds the figure', async () => {
  for (const key of ['df_median_cpm', 'time_normo_pct', 'rmssd_ms']) {
    const cell = figureButton(page, key, 'fasting').first();
    const value = Number(await cell.locator('.figure-large').textContent());
    const [low, high] = endsOf(await cell.locator('.figure-range').textContent());
    expect(low, key).toBeLessThanOrEqual(value);
    expect(high, key).toBeGreaterThanOrEqual(value);
    await expect(cell).toHaveAccessibleName(/by chance/);
  }
});

test('the page of a figure lists its ranges, each with what it is', async () => {
  await figureButton(page, 'time_normo_pct', 'fed').first().click();
  const ranges = dialogOf(page, 'Normogastria').getByLabel('Ranges');
  await expect(ranges).toContainText('By chance');
  await expect(ranges).toContainText('nominal 95 %');
  await expect(ranges).toContainText('By limits');
  await page.keyboard.press('Escape');
});

test('the line under Trust opens the page with every kind of range, by phase', async () => {
  await findings(page).getByRole('button', { name: 'By limits' }).click();
  const dialog = dialogOf(page, 'Evidence');
  const table = dialog.getByRole('table', { name: 'Ranges, fasting' });
  await expect(table.getByRole('row', { name: /^DF, median/ })).toBeVisible();
  await dialog.getByLabel('Phase').selectOption('fed');
  const power = dialog
    .getByRole('table', { name: /^Change from fasting to fed/ })
    .getByRole('row', { name: /^Power, DP/ });
  const [low, high] = endsOf(await power.getByRole('cell').nth(0).textContent());
  expect(low).toBeLessThan(high);
  await expect(power).toContainText('×');
  await page.keyboard.press('Escape');
});
