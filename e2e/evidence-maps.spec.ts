import AxeBuilder from '@axe-core/playwright';
import { expect, type Locator, type Page, test } from 'playwright/test';
import {
  dialogOf,
  expectNoTroubles,
  freshPage,
  LONG_MS,
  openStudy,
  reviewAs,
  STEADY,
  settled,
  undoName,
} from './support';

/** The map of an organ on the page "Which settings", once it is there. */
async function mapOf(page: Page, organ: 'Slow wave' | 'Heartbeat'): Promise<Locator> {
  const dialog = dialogOf(page, 'Evidence');
  await dialog.getByRole('button', { name: 'Which settings' }).click();
  const part = dialog.getByRole('region', { name: organ, exact: true });
  await expect(part.getByText('Best of this map')).toBeVisible({ timeout: LONG_MS });
  return part;
}

test('a map shows each cell’s figure by mouse and by keys, and a cell is taken into use as one edit', async ({
  browser,
}) => {
  test.setTimeout(3 * LONG_MS);
  const page = await freshPage(browser);
  await openStudy(page, STEADY);
  await reviewAs(page);
  await page.keyboard.press('Shift+O');
  const heart = await mapOf(page, 'Heartbeat');
  const cells = heart.getByRole('button', { name: /^order .* dB/ });
  await expect(cells).toHaveCount(21 * 20);

  const cell = heart.getByRole('button', { name: /^order 0\.5, window 30 ms: / });
  await cell.click();
  await page.keyboard.press('ArrowUp');
  await page.keyboard.press('ArrowRight');
  const next = heart.getByRole('button', { name: /^order 0\.55, window 40 ms: / });
  await expect(next).toBeFocused();
  const use = heart.getByRole('button', { name: 'Use fractional, order 0.55, window 40 ms' });
  await expect(use).toBeVisible();
  const figure = /: (.*? dB)/.exec((await next.getAttribute('aria-label')) ?? '')?.[1] ?? 'none';
  await expect(heart.locator('.map-figure')).toContainText(figure);

  await dialogOf(page, 'Evidence').getByLabel('Add white noise').check();
  await expect(next).not.toHaveAttribute('aria-label', new RegExp(`: ${figure}$`));

  const found = await new AxeBuilder({ page }).include('dialog').analyze();
  expect(found.violations.map(({ id }) => id)).toEqual([]);

  await next.focus();
  await page.keyboard.press('Enter');
  await expect(heart.getByText(/what is in use \(fractional, order 0\.55/)).toBeVisible({
    timeout: LONG_MS,
  });
  await page.keyboard.press('Escape');
  await settled(page);
  expect(await undoName(page)).toMatch(/settings/);
  await page.keyboard.press('Control+z');
  await settled(page);
  await page.keyboard.press('Shift+O');
  const again = await mapOf(page, 'Heartbeat');
  await expect(again.getByText(/what is in use \(band/)).toBeVisible();
  expectNoTroubles(page);
});

test('the slow wave has its map, all figures as a table, and routes beside it', async ({
  browser,
}) => {
  test.setTimeout(3 * LONG_MS);
  const page = await freshPage(browser);
  await openStudy(page, STEADY);
  await page.keyboard.press('Shift+O');
  const slow = await mapOf(page, 'Slow wave');
  await expect(slow.getByRole('row', { name: /^route band/ })).toBeVisible();
  const dialog = dialogOf(page, 'Evidence');
  await dialog.getByText('Slow wave: all figures of the map').click();
  const table = dialog.getByRole('table', { name: /score in dB by order and window/ });
  await expect(table.getByRole('row')).toHaveCount(22);
  await expect(slow.getByText(/this study’s own median/)).toBeVisible();
  expectNoTroubles(page);
});
