import type { Page } from 'playwright';

const EDITS = 15;
/** The first edits also load code that later ones find ready. */
const NOT_COUNTED = 3;

async function reviewAs(page: Page, name: string): Promise<void> {
  await page.getByRole('button', { name: /^Reviewer: / }).click();
  const dialog = page.getByRole('dialog', { name: 'Who reviews?' });
  await dialog.getByLabel('Name or initials of the reviewer').fill(name);
  await dialog.getByRole('button', { name: 'Go on' }).click();
  await dialog.waitFor({ state: 'hidden' });
}

/** Takes away beat after beat by its key; ms from the key to the first frame with the figures of that edit. */
export async function editBeats(page: Page): Promise<readonly number[]> {
  await reviewAs(page, 'bench');
  await page.keyboard.press('.');
  const times: number[] = [];
  for (let edit = 0; edit < EDITS + NOT_COUNTED; edit += 1) {
    await page.keyboard.press('Delete');
    await page.waitForFunction(() => window.watched.settledMs > 0, null, { polling: 'raf' });
    times.push(await page.evaluate(() => window.watched.settledMs - window.watched.editMs));
  }
  const numbered = (await page.locator('#findings [role="status"]').textContent()) ?? '';
  if (!numbered.includes(`edit ${EDITS + NOT_COUNTED}`))
    throw new Error(`figures are ${numbered} after ${EDITS + NOT_COUNTED} beats were taken away`);
  return times.slice(NOT_COUNTED);
}
