import { expect, type Locator, type Page, test } from 'playwright/test';
import {
  allFigures,
  dialogOf,
  expectNoTroubles,
  freshPage,
  goTo,
  openStudy,
  pane,
  press,
  RECORD,
  reviewAs,
  settled,
  told,
  undoName,
} from './support';
import { type Row, tables } from './support-results';

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await openStudy(page, RECORD);
  await reviewAs(page);
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const dialog = (): Locator => dialogOf(page, 'Find the beats of a stretch again');
const outcome = (): Locator => dialog().getByRole('status');
const take = (): Locator => dialog().getByRole('button', { name: 'Take the change' });
const beatsNow = async (): Promise<readonly Row[]> => (await tables(page)).beats;
const timesOf = (beats: readonly Row[]) => beats.map(({ time_s }) => Number(time_s));

/** Opens the dialog over a typed stretch. */
async function look(from: string, to: string): Promise<void> {
  await press(page, 'Shift+W');
  await dialog().getByLabel('From').fill(from);
  await dialog().getByLabel('To').fill(to);
  await settled(page);
}

test('beats that were deleted are found again: previewed, counted, taken as one step, undone', async () => {
  await goTo(page, '0:31');
  const figures = await allFigures(page);
  const before = await beatsNow();
  await press(page, '.');
  await press(page, '>');
  await press(page, 'Delete');
  const fewer = await beatsNow();
  expect(fewer.length).toBe(before.length - 2);
  await look('0:25', '0:38');
  await expect(outcome()).toHaveText('2 beats gained');
  const places = dialog().getByRole('list', { name: 'What would change' }).getByRole('button');
  await expect(places).toHaveCount(2);
  expect(await undoName(page), 'nothing has changed before it is taken').toMatch(/^delete 2 beats/);
  await take().click();
  await settled(page);
  await expect(dialog()).toBeHidden();
  expect(await undoName(page)).toBe('find beats again 0:00:25.0-0:00:38.0 +2 -0');
  const after = timesOf(await beatsNow());
  for (const [i, atS] of timesOf(before).entries())
    expect(Math.abs(after[i] - atS), `beat ${i}`).toBeLessThan(0.03);
  await press(page, 'Control+z');
  expect(await beatsNow()).toEqual(fewer);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(figures);
});

test('the other polarity moves the beats of the stretch, and only those', async () => {
  const before = await beatsNow();
  await look('1:00', '1:10');
  await dialog().getByLabel('R peaks are').selectOption('inverted');
  await expect(outcome()).toContainText(/\d+ beats moved/);
  await take().click();
  await settled(page);
  expect(await undoName(page)).toMatch(/^find beats again 0:01:00\.0-0:01:10\.0 inverted,/);
  const after = await beatsNow();
  const outside = (rows: readonly Row[]) =>
    rows
      .filter(({ time_s }) => Number(time_s) < 59.8 || Number(time_s) > 70.2)
      .map(({ time_s, class: beatClass }) => `${time_s} ${beatClass}`);
  expect(outside(after)).toEqual(outside(before));
  expect(after).not.toEqual(before);
  await press(page, 'Control+z');
  expect(await beatsNow()).toEqual(before);
});

test('another lead is looked in, and more eagerly; the name of the step says so', async () => {
  await goTo(page, '0:31');
  await press(page, '.');
  await press(page, 'Delete');
  await look('0:25', '0:38');
  const leads = await dialog().getByLabel('Look in').locator('option').allTextContents();
  const other = leads.find((one) => !one.includes('heart lead') && !one.includes('−'));
  await dialog()
    .getByLabel('Look in')
    .selectOption({ label: other ?? '' });
  await dialog().getByLabel('Look', { exact: true }).selectOption('more');
  await expect(outcome()).toContainText('gained');
  await take().click();
  await settled(page);
  expect(await undoName(page)).toMatch(new RegExp(`in ${other}, more eagerly, \\+\\d+ -\\d+$`));
  await press(page, 'Control+z');
  await press(page, 'Control+z');
});

test('leaving it changes nothing and looks where one looked before', async () => {
  await goTo(page, '0:31');
  const [before, place] = [await beatsNow(), await told(page, 'Seconds')];
  await look('2:00', '2:30');
  await dialog().getByLabel('R peaks are').selectOption('inverted');
  await settled(page);
  await page.keyboard.press('Escape');
  await expect(dialog()).toBeHidden();
  expect(await told(page, 'Seconds')).toBe(place);
  expect(await beatsNow()).toEqual(before);
});

test('the stretch is that of the selected beats, and what is typed wrong is said', async () => {
  await goTo(page, '0:31');
  await press(page, '.');
  for (let step = 0; step < 4; step += 1) await press(page, '>');
  const bar = pane(page, 'Seconds').getByRole('group', { name: /^5 beats from / });
  const place = /from (\S+) to (\S+)/.exec((await bar.getAttribute('aria-label')) ?? '');
  await bar.getByRole('button', { name: 'Find again…' }).click();
  const seconds = (text: string) =>
    text.split(':').reduce((sum, part) => sum * 60 + Number(part), 0);
  const from = seconds(await dialog().getByLabel('From').inputValue());
  const to = seconds(await dialog().getByLabel('To').inputValue());
  expect(Math.abs(from - seconds(place?.[1] ?? ''))).toBeLessThan(0.11);
  expect(Math.abs(to - seconds(place?.[2] ?? ''))).toBeLessThan(0.11);
  await dialog().getByLabel('To').fill('1:00:00');
  await expect(dialog().getByLabel('To')).toHaveAttribute('aria-invalid', 'true');
  await expect(take()).toBeDisabled();
  await page.keyboard.press('Escape');
  await press(page, 'Escape');
});
