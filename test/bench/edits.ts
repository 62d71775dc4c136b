import type { Page } from 'playwright';

const EDITS = 15;
/** The first edits, whose code is still cold. */
export const NOT_COUNTED = 3;
const POLL_MS = 20;

async function reviewAs(page: Page, name: string): Promise<void> {
  await page.getByRole('button', { name: /^Reviewer: / }).click();
  const dialog = page.getByRole('dialog', { name: 'Who reviews?' });
  await dialog.getByLabel('Name or initials of the reviewer').fill(name);
  await dialog.getByRole('button', { name: 'Go on' }).click();
  await dialog.waitFor({ state: 'hidden' });
}

/**
 * Classes one beat ventricular and normal by turns, which takes its intervals out of the figures and puts them back; ms from
 * the key to the first frame with the figures of that edit.
 */
export async function editBeats(page: Page): Promise<readonly number[]> {
  await reviewAs(page, 'bench');
  await page.keyboard.press('.');
  const times: number[] = [];
  for (let edit = 0; edit < EDITS + NOT_COUNTED; edit += 1) {
    await page.keyboard.press(edit % 2 === 0 ? 'v' : 'n');
    const settled = () => window.watched.settledMs > 0;
    await page.waitForFunction(settled, null, { polling: POLL_MS });
    times.push(await page.evaluate(() => window.watched.editFiguresMs - window.watched.editMs));
  }
  const last = (await page.locator('#findings .findings-head [role="status"]').textContent()) ?? '';
  if (!last.includes(`edit ${EDITS + NOT_COUNTED}`))
    throw new Error(`the figures are ${last}, not of edit ${EDITS + NOT_COUNTED}`);
  return times.slice(NOT_COUNTED);
}
