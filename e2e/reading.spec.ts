import { expect, type Page, test } from 'playwright/test';
import {
  agree,
  allFigures,
  dialogOf,
  expectNoTroubles,
  figure,
  figureButton,
  findings,
  freshPage,
  goTo,
  pane,
  press,
  putMessagesAway,
  reviewAs,
  settled,
  told,
  undoName,
} from './support';
import { centreOf, drag, expectDrawn, stageBox, windowOf, xOfTime } from './support-drawing';

const STUDY = [0, 5400] as const;

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await page.getByRole('main').getByRole('button', { name: 'Try the demo study' }).click();
  await agree(page);
  await reviewAs(page);
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const minutes = async () => windowOf(await told(page, 'Minutes'));
const seconds = async () => windowOf(await told(page, 'Seconds'));
const widthOf = ([fromS, toS]: readonly [number, number]) => toS - fromS;
const middleOf = ([fromS, toS]: readonly [number, number]) => (fromS + toS) / 2;
const holds = (outer: readonly [number, number], inner: readonly [number, number]) =>
  outer[0] <= inner[0] && outer[1] >= inner[1];

test.describe('the panes are tied together', () => {
  test.beforeEach(async () => {
    await goTo(page, '0:10:00');
    await press(page, 'w');
  });

  test('a click in Whole study takes both panes there', async () => {
    const strip = await stageBox(page, 'Whole study');
    await page.mouse.click(xOfTime(strip, STUDY, 4500), strip.y + 0.7 * strip.height);
    expect(Math.abs(middleOf(await seconds()) - 4500)).toBeLessThan(6);
    expect(Math.abs(middleOf(await minutes()) - 4500)).toBeLessThan(6);
    await expectDrawn(page, 'Minutes');
    await expectDrawn(page, 'Seconds');
  });

  test('a click in Minutes takes Seconds there and leaves Minutes', async () => {
    const before = await minutes();
    const box = await stageBox(page, 'Minutes');
    const atS = before[0] + 0.8 * widthOf(before);
    await page.mouse.click(xOfTime(box, before, atS), box.y + 0.5 * box.height);
    expect(Math.abs(middleOf(await seconds()) - atS)).toBeLessThan(3);
    expect(await minutes()).toEqual(before);
  });

  test('dragging the frame of Minutes in Whole study moves Minutes, and Seconds with it', async () => {
    const before = await minutes();
    const strip = await stageBox(page, 'Whole study');
    const y = strip.y + 0.7 * strip.height;
    const from = xOfTime(strip, STUDY, before[0] + 0.25 * widthOf(before));
    await drag(page, [from, y], [from + strip.width / 2, y]);
    const after = await minutes();
    expect(Math.abs(after[0] - before[0] - 2700)).toBeLessThan(30);
    expect(widthOf(after)).toBe(widthOf(before));
    expect(holds(after, await seconds())).toBe(true);
  });

  test('dragging the frame of Seconds in Minutes moves Seconds', async () => {
    const slot = await pane(page, 'Minutes').locator('[data-part="slot"]').boundingBox();
    if (!slot) throw new Error('Minutes has no slot');
    const before = await minutes();
    const box = await stageBox(page, 'Minutes');
    const { x, y } = centreOf(slot);
    await drag(page, [x, y], [x + box.width / 4, y]);
    expect(await minutes()).toEqual(before);
    const moved = middleOf(await seconds()) - 600;
    expect(Math.abs(moved - widthOf(before) / 4)).toBeLessThan(4);
  });

  test('the wheel zooms about the pointer; with Shift it pans', async () => {
    const box = await stageBox(page, 'Seconds');
    const before = await seconds();
    await page.mouse.move(box.x + 0.25 * box.width, box.y + 0.6 * box.height);
    const underS = before[0] + 0.25 * widthOf(before);
    await page.mouse.wheel(0, 400);
    const wide = await seconds();
    expect(widthOf(wide)).toBeGreaterThan(widthOf(before));
    expect(Math.abs(wide[0] + 0.25 * widthOf(wide) - underS)).toBeLessThan(1.5);
    await page.mouse.wheel(0, -400);
    expect(Math.abs(widthOf(await seconds()) - widthOf(before))).toBeLessThan(1);
    await page.keyboard.down('Shift');
    await page.mouse.wheel(0, 200);
    await page.keyboard.up('Shift');
    const panned = await seconds();
    expect(panned[0]).toBeGreaterThan(before[0]);
    expect(Math.abs(widthOf(panned) - widthOf(before))).toBeLessThanOrEqual(1);
    await page.mouse.move(2, 2);
  });

  test('dragging the traces pans, and the keys pan and zoom', async () => {
    const box = await stageBox(page, 'Seconds');
    const y = box.y + 0.6 * box.height;
    const start = await seconds();
    await drag(page, [box.x + 0.8 * box.width, y], [box.x + 0.3 * box.width, y]);
    expect(Math.abs((await seconds())[0] - start[0] - 0.5 * widthOf(start))).toBeLessThan(1.1);
    await page.mouse.move(2, 2);
    await goTo(page, '0:10:00');
    const places = [await seconds()];
    for (const key of ['ArrowRight', 'PageDown', 'End', 'Home']) {
      await press(page, key);
      places.push(await seconds());
    }
    expect(places[1][0]).toBeGreaterThan(places[0][0]);
    expect(places[2][0]).toBeGreaterThan(places[1][0]);
    expect(places[3][1]).toBe(STUDY[1]);
    expect(places[4][0]).toBe(0);
    const width = widthOf(await minutes());
    await press(page, 'i');
    expect(widthOf(await minutes())).toBeLessThan(width);
    await press(page, 'o');
    await press(page, 'o');
    expect(widthOf(await minutes())).toBeGreaterThan(width);
  });

  test('the cursor stands at the same time in every pane', async () => {
    const box = await stageBox(page, 'Seconds');
    await page.mouse.move(box.x + 0.5 * box.width, box.y + 0.6 * box.height);
    await settled(page);
    const lines = ['Whole study', 'Minutes', 'Seconds'] as const;
    for (const name of lines)
      await expect(pane(page, name).locator('[data-part="cursor-line"]')).toBeVisible();
    const text = (name: 'Minutes' | 'Seconds') =>
      pane(page, name).locator('[data-part="cursor-text"]');
    await expect(text('Seconds')).toHaveText(/^0:(09:59\.\d|10:00)/);
    await expect(text('Minutes')).toHaveText(/^0:(09:59|10:00)/);
    await page.mouse.move(2, 2);
    await expect(text('Minutes')).toBeHidden();
  });
});

test('a gain is set by its buttons and keys, and the bar says its microvolts', async () => {
  const bars = pane(page, 'Seconds').locator('.uv-text');
  const before = await bars.allTextContents();
  expect(before.every((text) => /^\d+ µV$/.test(text))).toBe(true);
  await page.getByRole('button', { name: /^Larger trace: .* heartbeat$/ }).click();
  await settled(page);
  const larger = await bars.allTextContents();
  expect(Number.parseInt(larger[1], 10)).toBeLessThan(Number.parseInt(before[1], 10));
  expect(larger[0]).toBe(before[0]);
  await page.getByRole('button', { name: /^Smaller trace: .* heartbeat$/ }).click();
  await settled(page);
  expect(await bars.allTextContents()).toEqual(before);
});

test('a border of a phase is dragged in Whole study: one step, and the figures follow', async () => {
  const before = await allFigures(page);
  const strip = await stageBox(page, 'Whole study');
  const y = strip.y + 12;
  const at = (atS: number) => [xOfTime(strip, STUDY, atS), y] as const;
  await drag(page, at(1800), at(1500));
  expect(await told(page, 'Whole study')).toMatch(/fasting 0:00:00 to 0:(24:5\d|25:0\d)/);
  expect(await undoName(page)).toBe('move border of a phase');
  expect(await allFigures(page)).not.toEqual(before);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(before);
});

test('a figure opens on its meaning, source and settings, and leads to the data behind it', async () => {
  await figureButton(page, 'df_median_cpm', 'fed').first().click();
  const dialog = dialogOf(page, /^DF, median/);
  for (const term of ['Meaning', 'Source', 'Settings'])
    await expect(dialog.getByText(term, { exact: true })).toBeVisible();
  await expect(dialog).toContainText('240 s every 60 s');
  await dialog.getByRole('button', { name: /^Go to fed/ }).click();
  expect((await minutes())[1]).toBeGreaterThan(2400);
  expect(await figure(page, 'df_median_cpm', 'fed')).toMatch(/^\d\.\d\d$/);
});

test.describe('settings', () => {
  const open = async () => {
    await putMessagesAway(page);
    await page.keyboard.press('Shift+S');
    const dialog = dialogOf(page, 'Settings of the figures');
    await expect(dialog).toBeVisible();
    return dialog;
  };

  test('other band limits give other shares of time, and undo the former', async () => {
    const before = await allFigures(page);
    const normo = Number(await figure(page, 'time_normo_pct', 'fed'));
    const dialog = await open();
    const limits = dialog.getByLabel('Band limits: brady, normo, tachy');
    const own = await limits.inputValue();
    await dialog.getByLabel('tachy from').fill('6');
    await expect(limits).not.toHaveValue(own);
    await dialog.getByRole('button', { name: 'Use these settings' }).click();
    await settled(page);
    expect(Number(await figure(page, 'time_normo_pct', 'fed'))).toBeGreaterThan(normo);
    expect(await undoName(page)).toBe('change settings');
    await press(page, 'Control+z');
    expect(await allFigures(page)).toEqual(before);
  });

  test('the fractional route shows its progress and gives the figures of its own', async () => {
    const before = await told(page, 'Minutes');
    const dialog = await open();
    for (const route of await dialog.getByLabel('Route', { exact: true }).all())
      await route.selectOption('fractional');
    await dialog.getByRole('button', { name: 'Use these settings' }).click();
    const work = page.getByRole('region', { name: 'Work under way' });
    await work.waitFor();
    await expect(work.getByRole('progressbar')).toBeVisible();
    await expect(work).toContainText(/\d+ %/);
    await settled(page);
    await expect(work).toBeHidden();
    const drawn = await told(page, 'Minutes');
    expect(drawn).not.toBe(before);
    const gainOf = (words: string) => /slow wave.*?: \S+ to \S+ uV, (\d+) uV/.exec(words)?.[1];
    expect(gainOf(drawn)).toBeDefined();
    expect(gainOf(drawn)).not.toBe(gainOf(before));
    await expectDrawn(page, 'Minutes');
    await press(page, 'Control+z');
    expect(await told(page, 'Minutes')).toBe(before);
  });

  for (const way of ['button', 'key'] as const)
    test(`stopping the work by its ${way} leaves the study as it was and usable`, async () => {
      const before = await allFigures(page);
      const dialog = await open();
      for (const route of await dialog.getByLabel('Route', { exact: true }).all())
        await route.selectOption('fractional');
      await dialog.getByRole('button', { name: 'Use these settings' }).click();
      const work = page.getByRole('region', { name: 'Work under way' });
      await work.waitFor();
      if (way === 'key') await page.keyboard.press('Shift+X');
      else await work.getByRole('button', { name: 'Stop' }).click();
      await expect(page.getByRole('region', { name: 'Messages' })).toContainText('Stopped.');
      await expect(work).toBeHidden();
      await expect(findings(page).getByRole('status').first()).not.toContainText('updating');
      if ((await undoName(page)) === 'change settings') await press(page, 'Control+z');
      expect(await allFigures(page)).toEqual(before);
      await goTo(page, '0:20:00');
      await expectDrawn(page, 'Seconds');
      await press(page, '.');
      await press(page, 'v');
      expect(await undoName(page)).toMatch(/^class beat at 0:(19|20):/);
      await press(page, 'Control+z');
      expect(await allFigures(page)).toEqual(before);
    });
});
