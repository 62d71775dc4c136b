import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from 'playwright/test';
import { agree, dialogOf, expectNoTroubles, freshPage, settled } from './support';

/** All parts of the evidence of the demo study on a machine that does other things too. */
const EVIDENCE_MS = 240_000;

let page: Page;
test.beforeAll(async ({ browser }) => {
  test.setTimeout(EVIDENCE_MS + 60_000);
  page = await freshPage(browser);
  await page.getByRole('main').getByRole('button', { name: 'Try the demo study' }).click();
  await agree(page);
  await expect(trustLine('Both rhythms, fed')).toBeVisible({ timeout: EVIDENCE_MS });
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const trustLine = (name: string) => page.getByRole('button', { name, exact: true });
const evidence = () => dialogOf(page, 'Evidence');

/** WCAG 2.2 A and AA and axe's best practices find nothing in the dialog, in either theme. */
async function expectClean(): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    await settled(page);
    const { violations } = await new AxeBuilder({ page })
      .setLegacyMode()
      .include('dialog')
      .analyze();
    expect(violations.map(({ id, nodes }) => [colorScheme, id, nodes[0]?.html])).toEqual([]);
  }
}

test('a line of two leads opens their page: coupling, which is earlier, the strip and its numbers', async () => {
  await trustLine('EGG 1 and EGG 2').click();
  const dialog = evidence();
  await expect(dialog.getByRole('heading', { name: 'EGG 1 and EGG 2' })).toBeVisible();
  const fed = dialog.getByRole('row', { name: /^fed / }).first();
  await expect(fed).toContainText('EGG 1 earlier by 1.6 s (95 % by chance');
  await expect(fed).toContainText(/\d+ % \(95 % by chance \d+–\d+\)/);
  await expect(dialog.getByText('a common reference cannot be excluded').first()).toBeVisible();
  await expect(dialog).toContainText('says nothing of a wave that travels');
  await expect(dialog.getByRole('img', { name: /^Lag of EGG 2 behind EGG 1/ })).toBeVisible();
  await dialog.getByText('The strip in numbers').first().click();
  await expect(dialog.getByRole('columnheader', { name: 'lag, s' }).first()).toBeVisible();
  await expectClean();
  await page.keyboard.press('Escape');
});

test('a line of both rhythms opens their page: the same minutes, RR by phase, and what else could explain it', async () => {
  await trustLine('Both rhythms, fed').click();
  const dialog = evidence();
  await expect(dialog).toContainText('exploratory, no reference values');
  await expect(dialog).toContainText('does not compare with the HF of Findings');
  const medians = dialog.getByRole('table', { name: 'Medians by phase' });
  await expect(medians.getByRole('row')).toHaveCount(4);
  await expect(dialog.getByRole('img', { name: /^DF, DP, heart rate, HF/ })).toBeVisible();
  await expect(dialog.getByRole('img', { name: /^RR by the phase/ })).toHaveCount(2);
  await expect(dialog).toContainText('Not tested: the meal is shown and not analysed.');
  const others = dialog.getByRole('table', { name: 'Other explanations' });
  await expect(others).toHaveCount(2);
  for (const name of ['Breathing', '0.1 Hz waves', 'Leakage of the heartbeat'])
    await expect(others.first().getByRole('rowheader', { name })).toBeVisible();
  await expectClean();
  await page.keyboard.press('Escape');
});
