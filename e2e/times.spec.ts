import { expect, type Locator, type Page, test } from 'playwright/test';
import {
  allFigures,
  dialogOf,
  expectNoTroubles,
  figureNumber,
  freshPage,
  goTo,
  LONG_MS,
  openStudy,
  pane,
  press,
  reviewAs,
  STEADY,
  settled,
  told,
  undoName,
  words,
} from './support';
import { drag, stageBox, xOfTime } from './support-drawing';
import { downloadSession, tables } from './support-results';

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await openStudy(page, STEADY);
  await reviewAs(page);
  await typePhases('120', '180');
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const WHOLE = [0, 300] as const;

const openDialog = async (key: string, title: string): Promise<Locator> => {
  await page.keyboard.press(key);
  const dialog = dialogOf(page, title);
  await expect(dialog).toBeVisible();
  return dialog;
};

/** Fasting from the start, then a meal, by their typed ends. */
async function typePhases(fasting: string, meal: string): Promise<void> {
  const dialog = await openDialog('Shift+P', 'Phases');
  const to = dialog.getByLabel('to', { exact: true });
  await to.first().fill(fasting);
  if ((await to.count()) === 1) await dialog.getByRole('button', { name: 'Add a phase' }).click();
  await to.nth(1).fill(meal);
  await page.keyboard.press('Enter');
  await expect(dialog).toBeHidden();
  await settled(page);
}

/** The state of the session as the page writes it. */
const session = async () => JSON.parse((await downloadSession(page)).bytes.toString('utf8'));

/** Takes the last edit back and does it again; each time figures and session are what they were. */
async function backAndForth(before: readonly string[]): Promise<void> {
  const after = await session();
  const figures = await allFigures(page);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(before);
  await press(page, 'Control+Shift+z');
  expect(await allFigures(page)).toEqual(figures);
  const again = await session();
  for (const part of ['phases', 'spans', 'events', 'symptoms'] as const)
    expect(again[part]).toEqual(after[part]);
}

/** The rows of the report's table of events and symptoms. */
const printedEvents = async (): Promise<readonly string[]> => {
  await press(page, 'Shift+R');
  const report = page.getByRole('article', { name: 'Report' });
  await expect(report).toBeVisible({ timeout: LONG_MS });
  const rows = await report.locator('.report-events tbody tr').allInnerTexts();
  await press(page, 'Shift+R');
  return rows.map(words);
};

test('phases are typed as clock times; what is no time is told with what can be typed', async () => {
  const before = await allFigures(page);
  const { study } = await session();
  const [hour, minute] = study.start.slice(11, 16).split(':').map(Number);
  const clock = (plus: number) =>
    `@${hour + Math.floor((minute + plus) / 60)}:${String((minute + plus) % 60).padStart(2, '0')}`;
  const dialog = await openDialog('Shift+P', 'Phases');
  const to = dialog.getByLabel('to', { exact: true });
  await to.first().fill('@25:00');
  await page.keyboard.press('Enter');
  await expect(to.first()).toHaveAttribute('aria-invalid', 'true');
  await expect(dialog.getByText('“@25:00” is no time. Type seconds (754)')).toBeVisible();
  await to.first().fill(clock(1));
  await expect(dialog.getByText('= 0:01:00 in the study')).toBeVisible();
  await page.keyboard.press('Escape');
  await typePhases(clock(1), clock(4));
  expect((await session()).phases).toEqual([
    { name: 'fasting', fromS: 0, toS: 60 },
    { name: 'meal', fromS: 120, toS: 240 },
  ]);
  await backAndForth(before);
  await press(page, 'Control+z');
});

test('a border of a phase is moved by the arrow keys, and says the minutes that are left', async () => {
  const before = await allFigures(page);
  await goTo(page, '2:00');
  await page.keyboard.press('Shift+G');
  const border = page.getByRole('slider', { name: 'end of fasting, start of meal' });
  await expect(border).toBeFocused();
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('ArrowLeft');
  await expect(border).toHaveAttribute(
    'aria-valuetext',
    '0:02:30; fasting 2.5 min, left for the stomach 2.5, for the heart 2.5; meal 0.5 min, left for the stomach 0.5, for the heart 0.5',
  );
  await expect(page.locator('.moving')).toContainText('fasting2.52.52.5');
  await page.keyboard.press('Escape');
  await expect(border).toHaveAttribute('aria-valuetext', '0:02:00');
  expect(await undoName(page)).toBe('change phases');
  await page.keyboard.press('Shift+ArrowLeft');
  await press(page, 'Enter');
  expect(await undoName(page)).toBe('move border of a phase');
  expect((await session()).phases[0].toS).toBe(110);
  expect(await figureNumber(page, 'heart_kept_min')).toBeCloseTo(110 / 60, 1);
  await press(page, 'Escape');
  await expect(border).toBeHidden();
  await backAndForth(before);
  await press(page, 'Control+z');
});

test('a span is typed, changed and taken away without the mouse, each as one step', async () => {
  const before = await allFigures(page);
  const dialog = await openDialog('Shift+Z', 'Spoiled spans');
  const [from, to] = ['from', 'to'].map((end) => dialog.getByLabel(end, { exact: true }));
  await expect(from).toBeFocused();
  await page.keyboard.type('0:30');
  await to.focus();
  await page.keyboard.type('20');
  await page.keyboard.press('Enter');
  await expect(dialog.getByText('The end must come after the start.')).toBeVisible();
  await expect(to).toBeFocused();
  await to.fill('45.5');
  await dialog.getByLabel('cause').selectOption('cough');
  await dialog.getByLabel('note').fill('coughed twice');
  await page.keyboard.press('Enter');
  await expect(dialog.getByRole('status')).toHaveText('Done: exclude 0:00:30.0-0:00:45.5');
  await expect(from).toBeFocused();
  await expect(from).toHaveValue('');
  await settled(page);
  await dialog
    .getByRole('button', { name: 'Change the span 0:00:30.0 to 0:00:45.5' })
    .press('Enter');
  await expect(from).toBeFocused();
  await expect(from).toHaveValue('0:00:30');
  await to.fill('0:50');
  await dialog.getByLabel('excluded for').selectOption('heart');
  await dialog.getByRole('button', { name: 'Change it' }).press('Enter');
  await expect(dialog.getByRole('status')).toHaveText('Done: change excluded 0:00:30-0:00:50');
  await page.keyboard.press('Escape');
  await settled(page);
  expect((await tables(page)).spans).toMatchObject([
    { from_s: '30.000000', to_s: '50.000000', for: 'heart', cause: 'cough', note: 'coughed twice' },
  ]);
  await press(page, 'Control+z');
  await backAndForth(before);
  await openDialog('Shift+Z', 'Spoiled spans');
  await dialog
    .getByRole('button', { name: 'Remove the span 0:00:30.0 to 0:00:45.5' })
    .press('Enter');
  await expect(dialog.getByText('Nothing is excluded.')).toBeVisible();
  await page.keyboard.press('Escape');
  await settled(page);
  expect(await allFigures(page)).toEqual(before);
});

test('an end of the selected span is typed beside it, or moved by keys with the minutes that are left', async () => {
  await goTo(page, '1:00');
  await press(page, 'Control+e');
  const to = page.getByRole('spinbutton', { name: 'to' });
  await to.focus();
  await page.keyboard.press('Shift+ArrowUp');
  await page.keyboard.press('ArrowDown');
  await expect(to).toHaveValue('0:01:14');
  await expect(to).toHaveAttribute(
    'aria-valuetext',
    '0:01:14; fasting 2.0 min, left for the stomach 1.7, for the heart 1.7',
  );
  await press(page, 'Enter');
  expect(await undoName(page)).toBe('change excluded 0:00:55-0:01:14');
  await to.fill('0:30');
  await expect(page.getByRole('alert')).toHaveText(
    'The span begins at 0:00:55: type a time after that.',
  );
  await to.fill('70');
  await press(page, 'Enter');
  expect(await undoName(page)).toBe('change excluded 0:00:55-0:01:10');
  await press(page, 'Escape');
  for (let i = 0; i < 3; i += 1) await press(page, 'Control+z');
  expect((await session()).spans).toEqual([]);
});

/** Writes an event at a typed time. */
async function writeEvent(at: string, text: string): Promise<void> {
  const dialog = await openDialog('Shift+E', 'Events and symptoms');
  await dialog.getByLabel('at', { exact: true }).fill(at);
  await dialog.getByLabel('what happened').fill(text);
  await page.keyboard.press('Enter');
  await expect(dialog.getByRole('status')).toContainText(text);
  await page.keyboard.press('Escape');
  await expect(dialog).toBeHidden();
  await settled(page);
}

test('an event and a symptom are written where one is, by keys alone, and printed by phase', async () => {
  await goTo(page, '2:30');
  const event = await openDialog('t', 'Events and symptoms');
  await expect(event.getByLabel('what happened')).toBeFocused();
  await expect(event.getByLabel('at', { exact: true })).toHaveValue('0:02:30');
  await page.keyboard.type('drank 200 ml');
  await page.keyboard.press('Enter');
  await expect(event).toBeHidden();
  await settled(page);
  expect(await undoName(page)).toBe('write event 0:02:30 drank 200 ml');
  await goTo(page, '1:00');
  const symptom = await openDialog('y', 'Events and symptoms');
  await expect(symptom.getByLabel('what is felt')).toBeFocused();
  await page.keyboard.type('nausea');
  await page.keyboard.press('Enter');
  await expect(symptom.getByText('Type a whole number from 0 to 10.')).toBeVisible();
  await expect(symptom.getByLabel('score, 0 to 10')).toBeFocused();
  await page.keyboard.type('6');
  await page.keyboard.press('Enter');
  await expect(symptom).toBeHidden();
  await settled(page);
  expect(await undoName(page)).toBe('write symptom 0:01:00 nausea 6/10');
  expect(await told(page, 'Minutes')).toContain(
    'Noted: 0:01:00 nausea 6/10; 0:02:30 drank 200 ml.',
  );
  await backAndForth(await allFigures(page));
  expect(await printedEvents()).toEqual([
    '0:01:00 fasting nausea 6 of 10',
    '0:02:30 meal drank 200 ml –',
  ]);
  await press(page, 'Control+z');
  await press(page, 'Control+z');
});

test('who reviews is asked before the first event is written, which then stands', async ({
  browser,
}) => {
  const fresh = await freshPage(browser);
  await openStudy(fresh, STEADY);
  await fresh.keyboard.press('t');
  const dialog = dialogOf(fresh, 'Events and symptoms');
  await expect(dialog.getByLabel('what happened')).toBeFocused();
  await fresh.keyboard.type('coughed');
  await fresh.keyboard.press('Enter');
  const who = dialogOf(fresh, 'Who reviews?');
  await who.getByLabel('Name or initials of the reviewer').fill('T. Technician');
  await fresh.keyboard.press('Enter');
  await expect(who).toBeHidden();
  await expect(dialog).toBeHidden();
  await settled(fresh);
  expect(await undoName(fresh)).toBe('write event 0:02:30 coughed');
  await fresh.context().close();
});

test('what is written is changed and taken out in one dialog', async () => {
  await writeEvent('3:15', 'turned over');
  const dialog = await openDialog('Shift+E', 'Events and symptoms');
  await dialog.getByRole('button', { name: 'Change event at 0:03:15' }).press('Enter');
  await expect(dialog.getByLabel('at', { exact: true })).toBeFocused();
  await dialog.getByLabel('what happened').fill('sat up');
  await page.keyboard.press('Enter');
  await expect(dialog.getByRole('status')).toHaveText('Done: change event 0:03:15 sat up');
  await dialog.getByRole('button', { name: 'Remove event at 0:03:15' }).press('Enter');
  await expect(dialog.getByRole('status')).toHaveText('Done: remove event 0:03:15 sat up');
  await page.keyboard.press('Escape');
  await settled(page);
  expect((await session()).events).toEqual([]);
  await press(page, 'Control+z');
  expect((await session()).events).toMatchObject([{ atS: 195, text: 'sat up' }]);
  await press(page, 'Control+z');
  await press(page, 'Control+z');
});

test('a dragged border snaps to an event within 6 px, unless Shift is held', async () => {
  await writeEvent('2:30', 'drank 200 ml');
  const box = await stageBox(page, 'Whole study');
  const at = (atS: number, offPx = 0) => [xOfTime(box, WHOLE, atS) + offPx, box.y + 14] as const;
  await page.mouse.move(...at(120));
  await page.mouse.down();
  await page.mouse.move(...at(140), { steps: 4 });
  await page.mouse.move(...at(150, 5), { steps: 2 });
  const told = pane(page, 'Whole study').locator('.moving');
  await expect(told).toContainText('0:02:30 at “drank 200 ml” · Alt or Shift: no snapping');
  await expect(told).toContainText('fasting2.52.52.5');
  await page.mouse.up();
  await settled(page);
  expect((await session()).phases[0].toS).toBe(150);
  await press(page, 'Control+z');
  await page.keyboard.down('Shift');
  await drag(page, at(120), at(150, 5));
  await page.keyboard.up('Shift');
  expect((await session()).phases[0].toS).toBe(151);
  await press(page, 'Control+z');
  await press(page, 'Control+z');
});
