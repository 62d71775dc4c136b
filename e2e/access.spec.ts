import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from 'playwright/test';
import {
  chooseFile,
  dialogOf,
  expectNoTroubles,
  figureButton,
  findings,
  freshPage,
  goTo,
  IDENTITY,
  LONG_MS,
  openStudy,
  press,
  RECORD,
  REFUSED,
  reviewAs,
  settled,
} from './support';
import { packed, textOf } from './support-files';
import { downloadSession } from './support-results';

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

/**
 * WCAG 2.2 A and AA and axe's best practices find nothing in the light theme, and the contrast holds in the dark one too. A
 * part of the page is enough where a dialog makes the rest of it inert.
 */
async function expectClean(part = 'body'): Promise<void> {
  for (const theme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme: theme });
    await settled(page);
    const axe = new AxeBuilder({ page }).setLegacyMode().include(part);
    if (theme === 'dark') axe.withRules(['color-contrast']);
    const { violations } = await axe.analyze();
    const found = violations.map(({ id, help, nodes }) => ({
      theme,
      id,
      help,
      where: nodes.slice(0, 4).map(({ target, any, all, none }) => ({
        target: target.join(' '),
        why: [...any, ...all, ...none].map(({ message }) => message).join(' '),
      })),
    }));
    expect(found).toEqual([]);
  }
}

test('the start screen', async () => {
  await expect(page.getByRole('heading', { name: 'Open a recording' })).toBeVisible();
  await expectClean();
});

test('the dialog that says why a file is refused', async () => {
  await chooseFile(page, packed());
  await expect(dialogOf(page, REFUSED)).toBeVisible({ timeout: LONG_MS });
  await expectClean('dialog');
  await page.keyboard.press('Escape');
});

test('the dialog that asks how a text file is to be read', async () => {
  const rows = Array.from({ length: 2000 }, (_, i) => String(i % 50));
  await chooseFile(page, textOf('belly.csv', 'E1 (uV)', rows));
  const dialog = dialogOf(page, 'How is this text file to be read?');
  await expect(dialog).toBeVisible({ timeout: LONG_MS });
  await dialog.getByRole('button', { name: 'Open again' }).click();
  await expectClean('dialog');
  await page.keyboard.press('Escape');
});

test('the dialog of who it is', async () => {
  await chooseFile(page, RECORD);
  await expect(dialogOf(page, IDENTITY)).toBeVisible({ timeout: LONG_MS });
  await expectClean('dialog');
  await page.keyboard.press('Escape');
});

test.describe('a study is open', () => {
  test.beforeAll(async () => {
    await openStudy(page);
  });

  test('the panes', () => expectClean());

  test('the dialog that asks who reviews', async () => {
    await goTo(page, '0:31');
    await press(page, 'Control+e');
    await expect(dialogOf(page, 'Who reviews?')).toBeVisible();
    await expectClean('dialog');
    await page.keyboard.press('Escape');
  });

  test('the panes with a chosen span and all that opens in Findings', async () => {
    await reviewAs(page);
    await goTo(page, '0:31');
    await press(page, 'Control+e');
    await findings(page).getByRole('button', { name: 'All figures' }).click();
    for (const table of await page.locator('details.twin > summary').all())
      await table.press('Enter');
    await expectClean();
    for (const table of await page.locator('details.twin > summary').all())
      await table.press('Enter');
    await findings(page).getByRole('button', { name: 'Main figures only' }).click();
  });

  test('the panes with a chosen beat and a menu open', async () => {
    await goTo(page, '0:31');
    await press(page, 'Escape');
    await press(page, '.');
    await page.getByRole('button', { name: /^Study/ }).click();
    await expectClean();
    await page.keyboard.press('Escape');
    await press(page, 'Escape');
  });

  const dialogs: readonly (readonly [string, string])[] = [
    ['Shift+L', 'Leads and their roles'],
    ['Shift+P', 'Phases'],
    ['Shift+Z', 'Spoiled spans'],
    ['Shift+E', 'Events and symptoms'],
    ['Shift+K', 'Meal and protocol'],
    ['Shift+S', 'Settings of the figures'],
    ['Control+g', 'Go to a time'],
    ['?', 'Keys'],
    ['Shift+V', 'Select beats from one time to another'],
    ['Shift+W', 'Find the beats of a stretch again'],
    ['Shift+F', 'Sign'],
    ['Shift+H', 'Log'],
    ['Shift+C', 'Compare with another session'],
  ];
  for (const [key, title] of dialogs)
    test(`the dialog "${title}"`, async () => {
      await press(page, key);
      await expect(dialogOf(page, title)).toBeVisible();
      await expectClean('dialog');
      await page.keyboard.press('Escape');
      await expect(page.getByRole('dialog')).toBeHidden();
    });

  test('the keys page while keys are changed, one refused', async () => {
    await press(page, 'F1');
    const dialog = dialogOf(page, 'Keys');
    await dialog.getByRole('button', { name: 'Change keys' }).click();
    await dialog.getByRole('button', { name: /key of “Next beat”/ }).click();
    await page.keyboard.press('v');
    await expect(dialog.getByRole('alert')).toBeVisible();
    await expectClean('dialog');
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
    await expect(dialog).toBeHidden();
  });

  test('the dialog that finds beats again, with a change to take', async () => {
    await press(page, 'Shift+W');
    const dialog = dialogOf(page, 'Find the beats of a stretch again');
    await dialog.getByLabel('From').fill('2:00');
    await dialog.getByLabel('To').fill('2:10');
    await dialog.getByLabel('R peaks are').selectOption('inverted');
    await expect(dialog.getByRole('status')).toContainText('moved');
    await expectClean('dialog');
    await page.keyboard.press('Escape');
  });

  test('the dialog about the program', async () => {
    await press(page, 'Shift+A');
    await expect(page.getByRole('dialog')).toBeVisible();
    await expectClean('dialog');
    await page.keyboard.press('Escape');
  });

  test('the dialog of a figure', async () => {
    await figureButton(page, 'rmssd_ms').first().click();
    await expect(page.getByRole('dialog')).toBeVisible();
    await expectClean('dialog');
    await page.keyboard.press('Escape');
  });

  test('two sessions side by side', async () => {
    await reviewAs(page);
    const { bytes } = await downloadSession(page);
    await goTo(page, '0:31');
    await press(page, '.');
    await press(page, 'v');
    await press(page, 'Shift+C');
    await page.getByLabel('Session to compare with').setInputFiles({
      name: 'other.bicadence.json',
      mimeType: 'application/json',
      buffer: bytes,
    });
    const dialog = dialogOf(page, 'Compare with another session');
    await expect(dialog.getByRole('region', { name: 'Figures' })).toBeVisible();
    await expectClean('dialog');
    await page.keyboard.press('Escape');
  });

  test('the report', async () => {
    await press(page, 'Shift+R');
    await expect(page.getByRole('article', { name: 'Report' })).toBeVisible({ timeout: LONG_MS });
    await expectClean();
    await press(page, 'Shift+R');
  });

  test('the start screen with kept sessions, and the dialog that asks for the same file', async () => {
    const { bytes } = await downloadSession(page);
    await press(page, 'Shift+Q');
    await expect(page.getByRole('main')).toContainText('edit');
    await expectClean();
    await chooseFile(page, {
      name: 'kept.bicadence.json',
      mimeType: 'application/json',
      buffer: bytes,
    });
    await expect(dialogOf(page, /same file/i)).toBeVisible();
    await expectClean('dialog');
    await page.keyboard.press('Escape');
  });
});
