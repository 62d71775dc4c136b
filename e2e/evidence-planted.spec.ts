import { expect, test } from 'playwright/test';
import {
  agree,
  chooseFile,
  dialogOf,
  expectNoTroubles,
  freshPage,
  LONG_MS,
  RECORD,
} from './support';

test('the planted check says what came back of known waves and how small a one could be shown', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  await chooseFile(page, RECORD);
  await agree(page);
  const line = page.getByRole('button', { name: 'Smallest wave' });
  await expect(line).toBeVisible({ timeout: LONG_MS });
  await line.click();
  const dialog = dialogOf(page, 'Evidence');
  await expect(dialog.getByText('Smallest wave this recording could show')).toBeVisible();
  const picture = dialog.getByRole('img', { name: /planted wave, dashed/ });
  await expect(picture).toBeVisible();
  const drawn = await picture.locator('.planted-wave').getAttribute('d');
  await dialog.getByLabel('Wave', { exact: true }).selectOption({ index: 4 });
  await expect(picture.locator('.planted-wave')).not.toHaveAttribute('d', drawn ?? '');
  const waves = dialog.getByRole('table', { name: /all planted waves/ });
  await expect(waves.getByRole('row')).toHaveCount(9);
  const beats = dialog.getByRole('table', { name: /planted beats/ });
  await expect(beats.getByRole('row', { name: /own/ })).toContainText('(');
  expectNoTroubles(page);
});

test('how large a wave would have been found stands beside "no rhythm"', async ({ browser }) => {
  const page = await freshPage(browser);
  await chooseFile(page, RECORD);
  await agree(page);
  await expect(page.getByRole('button', { name: 'Smallest wave' })).toBeVisible({
    timeout: LONG_MS,
  });
  await page.getByRole('button', { name: 'No rhythm' }).first().click();
  await expect(page.getByText('would have been found in 95 % of epochs')).toBeVisible();
  expectNoTroubles(page);
});
