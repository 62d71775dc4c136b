import { expect, type Page, test } from 'playwright/test';
import {
  allFigures,
  dialogOf,
  editNumber,
  expectNoTroubles,
  figure,
  findings,
  freshPage,
  LONG_MS,
  openStudy,
  pane,
  press,
  reviewAs,
  settled,
  told,
  undoName,
} from './support';
import { windowOf } from './support-drawing';
import { downloadSession } from './support-results';

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await openStudy(page);
  await reviewAs(page);
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const openDialog = async (key: string, title: string) => {
  await page.keyboard.press(key);
  const dialog = dialogOf(page, title);
  await expect(dialog).toBeVisible();
  return dialog;
};

const reportText = async (): Promise<string> => {
  await press(page, 'Shift+R');
  const report = page.getByRole('article', { name: 'Report' });
  await expect(report).toBeVisible({ timeout: LONG_MS });
  const text = (await report.textContent()) ?? '';
  await press(page, 'Shift+R');
  return text;
};

test('phases are typed: wrong ones are told beside the field, good ones are one step', async () => {
  const before = await allFigures(page);
  const dialog = await openDialog('Shift+P', 'Phases');
  const [from, to] = [
    dialog.getByLabel('from', { exact: true }),
    dialog.getByLabel('to', { exact: true }),
  ];
  await expect(from.first()).toHaveValue('0:00:00');
  await to.first().fill('9:00');
  await dialog.getByRole('button', { name: 'Use these phases' }).click();
  await expect(to.first()).toHaveAttribute('aria-invalid', 'true');
  await to.first().fill('1:30');
  await dialog.getByRole('button', { name: 'Add a phase' }).click();
  await to.nth(1).fill('2:00');
  await dialog.getByRole('button', { name: /^fed from 0:04:00, 2 min after/ }).click();
  await expect(from.nth(2)).toHaveValue('0:04:00');
  await dialog.getByRole('button', { name: 'Use these phases' }).click();
  await expect(dialog).toBeHidden();
  expect(await told(page, 'Whole study')).toContain(
    'fasting 0:00:00 to 0:01:30, meal 0:01:30 to 0:02:00, fed 0:04:00 to 0:05:00',
  );
  expect(await undoName(page)).toBe('change phases');
  expect(await figure(page, 'heart_rate_bpm', 'fed')).toMatch(/^\d+\.\d$/);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(before);
});

test('a time is taken from the file’s annotations', async () => {
  const dialog = await openDialog('Shift+P', 'Phases');
  await dialog.getByLabel('to', { exact: true }).first().focus();
  await dialog.getByRole('button', { name: /water 20 °C/ }).click();
  await expect(dialog.getByLabel('to', { exact: true }).first()).toHaveValue('0:02:00.5');
  await dialog.getByRole('button', { name: 'Leave as it was' }).click();
});

test('an event is noted and printed', async () => {
  const dialog = await openDialog('Shift+E', 'Events and symptoms');
  await dialog.getByLabel('at', { exact: true }).fill('3:15');
  await dialog.getByLabel('what happened').fill('turned over');
  await dialog.getByRole('button', { name: 'Write it' }).click();
  await expect(dialog.getByRole('status')).toHaveText('Done: write event 0:03:15 turned over');
  await dialog.getByRole('button', { name: 'Close' }).click();
  await settled(page);
  expect(await undoName(page)).toBe('write event 0:03:15 turned over');
  expect(await reportText()).toMatch(/0:03:15.*turned over/);
  await press(page, 'Control+z');
});

test('the protocol stands in session and report, and is one step', async () => {
  const edit = await editNumber(page);
  const dialog = await openDialog('Shift+K', 'Meal and protocol');
  const typed = {
    'Test meal': 'pancake with jam',
    Energy: '427',
    Volume: '300',
    'Time to eat': '9',
    'Part eaten': '85',
    'Fasted before': '10.5',
    Posture: 'reclined chair',
    Medicines: 'none that act',
    Implants: 'none',
  };
  for (const [label, value] of Object.entries(typed))
    await dialog.getByLabel(label, { exact: true }).fill(value);
  await dialog.getByRole('button', { name: 'Use this' }).click();
  await settled(page);
  expect(await editNumber(page)).toBe(edit + 1);
  expect(await undoName(page)).toBe('change protocol');
  const text = await reportText();
  for (const value of Object.values(typed)) expect(text).toContain(value);
  const session = JSON.parse((await downloadSession(page)).bytes.toString('utf8'));
  expect(session.protocol).toMatchObject({ meal: 'pancake with jam', kcal: 427, fastHours: 10.5 });
  await press(page, 'Control+z');
});

test('another reported lead wants a reason, which is kept', async () => {
  const dialog = await openDialog('Shift+L', 'Leads and their roles');
  await dialog.getByRole('radio', { checked: false }).first().check();
  await dialog.getByRole('button', { name: 'Use these leads' }).click();
  const reason = dialog.getByLabel('Reason for reporting another lead');
  await expect(reason).toHaveAttribute('aria-invalid', 'true');
  await reason.fill('the other electrode lifted at the end');
  await dialog.getByRole('button', { name: 'Use these leads' }).click();
  await expect(dialog).toBeHidden();
  await settled(page);
  expect(await undoName(page)).toBe('change leads');
  const session = JSON.parse((await downloadSession(page)).bytes.toString('utf8'));
  expect(session.leadChoice).toBe('the other electrode lifted at the end');
  expect(await reportText()).toContain('the other electrode lifted at the end');
  await press(page, 'Control+z');
});

test('what was seen in passing leads to its place, and is called no diagnosis', async () => {
  const seen = findings(page).getByRole('region', { name: 'Seen in passing' });
  await expect(seen).toContainText('Not a diagnosis');
  const first = seen.getByRole('listitem').first();
  const place = /^(\d):(\d\d):(\d\d)/.exec((await first.textContent()) ?? '') ?? [];
  const atS = 3600 * Number(place[1]) + 60 * Number(place[2]) + Number(place[3]);
  await first.getByRole('button').click();
  const [fromS, toS] = windowOf(await told(page, 'Seconds'));
  expect(fromS).toBeLessThanOrEqual(atS);
  expect(toS).toBeGreaterThanOrEqual(atS);
});

test('the beats, epochs and spans of the drawings stand in tables too', async () => {
  await press(page, 'Home');
  const beats = pane(page, 'Seconds').getByText('Beats in Seconds as a table');
  await beats.press('Enter');
  const rows = pane(page, 'Seconds').getByRole('row');
  await expect(rows).toHaveCount(1 + (await pane(page, 'Seconds').locator('button.pin').count()));
  await pane(page, 'Seconds')
    .getByRole('button', { name: /^select the beat at/ })
    .first()
    .click();
  await expect(pane(page, 'Seconds').locator('button.pin[aria-pressed="true"]')).toHaveCount(1);
  await beats.press('Enter');
  const epochs = pane(page, 'Minutes').getByText('Epochs in Minutes as a table');
  await epochs.press('Enter');
  await expect(pane(page, 'Minutes').getByRole('cell', { name: 'normo' }).first()).toBeVisible();
  await epochs.press('Enter');
});
