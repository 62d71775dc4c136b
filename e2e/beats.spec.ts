import { expect, type Locator, type Page, test } from 'playwright/test';
import { FIGURES } from '../src/recording/figure-catalogue';
import {
  allFigures,
  editNumber,
  expectNoTroubles,
  figure,
  figureNumber,
  freshPage,
  goTo,
  keptHere,
  openStudy,
  pane,
  press,
  reviewAs,
  STEADY,
  settled,
  undoName,
} from './support';
import { boxOf, centreOf, drag, secondsOf, stageBox } from './support-drawing';
import { intervalsByHand, type Row, rmssdByHand, roundedTo, tables } from './support-results';

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await openStudy(page, STEADY);
  await reviewAs(page);
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const seconds = (): Locator => pane(page, 'Seconds');
const beatBar = (): Locator => page.getByRole('group', { name: /^(Beat at|\d+ beats from) / });

/** A beat in the middle of a run of N beats: all its intervals, and those beside them, are NN. */
interface SteadyBeat {
  readonly pin: Locator;
  readonly atS: number;
  readonly time: string;
}

const byTime = (time: string): Locator =>
  seconds().getByRole('button', { name: new RegExp(`^beat [NSVFQ] at ${time}`) });

async function steadyBeat(): Promise<SteadyBeat> {
  await settled(page);
  await expect.poll(async () => (await steadyTimes()).length).toBeGreaterThan(0);
  const [time] = await steadyTimes();
  return { pin: byTime(time), atS: secondsOf(time), time };
}

/** Beats are read out in the order of time, whatever was edited. Times of those in Seconds with three N beats on either side, those nearest to the middle first. */
async function steadyTimes(): Promise<readonly string[]> {
  const all = await seconds()
    .getByRole('button', { name: /^beat / })
    .evaluateAll((buttons) => buttons.map((one) => one.getAttribute('aria-label') ?? ''));
  const beats = all.map((name) => /^beat (\w) at ([\d:.]+)/.exec(name) ?? ['', '', '']);
  const times = beats.map(([, , time]) => secondsOf(time));
  expect(times).toEqual([...times].sort((a, b) => a - b));
  const middle = (beats.length - 1) / 2;
  return beats
    .map(([, , time], i) => ({ time, i, run: beats.slice(Math.max(0, i - 3), i + 4) }))
    .filter(({ run }) => run.length === 7 && run.every(([, beatClass]) => beatClass === 'N'))
    .sort((a, b) => Math.abs(a.i - middle) - Math.abs(b.i - middle))
    .map(({ time }) => time);
}

/** RMSSD, NN share and count in Findings are what the downloaded beats give by hand; returns RMSSD as shown. */
async function expectByHand(): Promise<number> {
  const { beats, spans } = await tables(page);
  const intervals = intervalsByHand(beats, spans, '#1');
  const byHand = rmssdByHand(intervals);
  const shown = await figureNumber(page, 'rmssd_ms');
  expect(Math.abs(shown - byHand), `${shown} shown, ${byHand} by hand`).toBeLessThan(roundedTo(1));
  const share = (100 * intervals.filter(({ nn }) => nn).length) / intervals.length;
  expect(Math.abs((await figureNumber(page, 'nn_share_pct')) - share)).toBeLessThanOrEqual(1);
  return shown;
}

const beatsNow = async (): Promise<readonly Row[]> => (await tables(page)).beats;

/**
 * One act is one named step: the figures follow it and are those by hand; undo and redo lead to the same figures again.
 * Returns RMSSD before and after.
 */
async function expectOneStep(
  name: RegExp,
  act: () => Promise<unknown>,
): Promise<readonly [number, number]> {
  const figuresBefore = await allFigures(page);
  const edit = await editNumber(page);
  const before = await expectByHand();
  await act();
  await settled(page);
  await keptHere(page, edit + 1);
  expect(await undoName(page)).toMatch(name);
  const after = await expectByHand();
  const figuresAfter = await allFigures(page);
  expect(figuresAfter, 'the figures follow the edit').not.toEqual(figuresBefore);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(figuresBefore);
  await press(page, 'Control+Shift+z');
  expect(await allFigures(page)).toEqual(figuresAfter);
  expect(await undoName(page)).toMatch(name);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(figuresBefore);
  return [before, after];
}

/** The same for an act that is large enough to be seen in RMSSD. */
async function expectSeen(name: RegExp, act: () => Promise<unknown>): Promise<void> {
  const [before, after] = await expectOneStep(name, act);
  expect(after, 'RMSSD follows the edit').not.toBe(before);
}

test('the figures of the beats as they were found are those by hand', async () => {
  expect(await expectByHand()).toBeGreaterThan(0);
  const found = await beatsNow();
  // As many as went in (test/fixtures/steady/study.ts).
  expect(found.length).toBe(371);
});

test.describe('by mouse', () => {
  test.beforeEach(() => goTo(page, '0:31'));

  test('a beat is deleted', async () => {
    const { pin } = await steadyBeat();
    await expectSeen(/^delete beat at 0:00:/, async () => {
      await pin.click();
      await beatBar().getByRole('button', { name: 'Delete' }).click();
    });
  });

  test('a beat is put in a class', async () => {
    const { pin } = await steadyBeat();
    await expectOneStep(/^class beat at 0:00:.* as V$/, async () => {
      await pin.click();
      await beatBar()
        .getByRole('button', { name: /^Class V/ })
        .click();
    });
  });

  test('a beat is moved', async () => {
    const { pin } = await steadyBeat();
    const { x, y } = centreOf(await boxOf(pin));
    await expectSeen(/^move beat at 0:00:/, () => drag(page, [x, y], [x + 9, y]));
  });

  test('a missing beat is added by a double click, at its R peak', async () => {
    const { pin, atS } = await steadyBeat();
    const { x } = centreOf(await boxOf(pin));
    await pin.click();
    await press(page, 'Delete');
    const stage = await stageBox(page, 'Seconds');
    const add = () => page.mouse.dblclick(x + 2, stage.y + 0.6 * stage.height);
    await expectSeen(/^add beat at 0:00:/, add);
    await press(page, 'Control+Shift+z');
    const added = (await beatsNow()).filter(({ origin }) => origin === 'added');
    expect(added.map(({ class: one }) => one)).toEqual(['N']);
    expect(Math.abs(Number(added[0].time_s) - atS), 'within 10 ms of the R peak').toBeLessThan(
      0.01,
    );
    await press(page, 'Control+z');
    await press(page, 'Control+z');
  });

  test('a beat put where no R peak is visible is placed, and its intervals are not NN', async () => {
    const { pin, atS } = await steadyBeat();
    const before = await beatsNow();
    const index = before.findIndex(({ time_s }) => Math.abs(Number(time_s) - atS) < 0.002);
    const gapS = Number(before[index + 1].time_s) - Number(before[index].time_s);
    const stage = await stageBox(page, 'Seconds');
    const x = centreOf(await boxOf(pin)).x + (0.5 * gapS * stage.width) / 10;
    await expectOneStep(/^place beat at 0:00:/, () =>
      page.mouse.dblclick(x, stage.y + 0.6 * stage.height),
    );
    await press(page, 'Control+Shift+z');
    const after = await beatsNow();
    expect(after[index + 1]).toMatchObject({ origin: 'placed', class: 'N', nn: '0' });
    expect(after[index + 2]).toMatchObject({ nn: '0' });
    await press(page, 'Control+z');
  });

  test('several beats are chosen from one to another and classed as one step', async () => {
    const { pin } = await steadyBeat();
    const all = seconds().getByRole('button', { name: /^beat / });
    await expectSeen(/^class \d+ beats 0:00:.* as Q$/, async () => {
      await all.nth(3).click();
      await pin.click({ modifiers: ['Shift'] });
      await beatBar()
        .getByRole('button', { name: /^Class Q/ })
        .click();
    });
  });
});

test.describe('many at once', () => {
  test.beforeEach(async () => {
    await page.mouse.move(2, 2);
    await goTo(page, '0:31');
    await press(page, 'Escape');
  });
  const many = () => page.getByRole('group', { name: /^\d+ beats from / });
  const bandAt = async (yShare: number, hold: boolean) => {
    const { x, y, width, height } = await stageBox(page, 'Seconds');
    if (hold) await page.keyboard.down('Shift');
    await drag(
      page,
      [x + 0.32 * width, y + yShare * height],
      [x + 0.71 * width, y + yShare * height],
    );
    if (hold) await page.keyboard.up('Shift');
    await settled(page);
  };

  test('a drag with Shift picks out the beats between, anywhere in Seconds', async () => {
    await bandAt(0.7, true);
    await expect(many()).toBeVisible();
    const chosen = seconds().locator('button.pin[aria-pressed="true"]');
    const { x, width } = await stageBox(page, 'Seconds');
    const places = await chosen.evaluateAll((all) =>
      all.map((one) => one.getBoundingClientRect().left + 12),
    );
    expect(places.length).toBeGreaterThan(2);
    expect(Math.min(...places)).toBeGreaterThanOrEqual(x + 0.32 * width - 1);
    expect(Math.max(...places)).toBeLessThanOrEqual(x + 0.71 * width + 1);
    await expectOneStep(/^class \d+ beats 0:00:.* as Q$/, () =>
      many()
        .getByRole('button', { name: /^Class Q/ })
        .click(),
    );
  });

  test('keys grow the selection and delete it in one step', async () => {
    await press(page, '.');
    for (let step = 0; step < 3; step += 1) await press(page, '>');
    await press(page, '<');
    await expect(page.getByRole('group', { name: /^3 beats from / })).toBeVisible();
    await expectSeen(/^delete 3 beats 0:00:/, () => press(page, 'Delete'));
  });

  test('typed times pick out all beats between them', async () => {
    const beats = await beatsNow();
    const between = beats.filter(({ time_s }) => Number(time_s) >= 60 && Number(time_s) <= 70);
    await press(page, 'Shift+V');
    const dialog = page.getByRole('dialog', { name: 'Select beats from one time to another' });
    await dialog.getByLabel('From').fill('2:00');
    await dialog.getByLabel('To').fill('1:00');
    await page.keyboard.press('Enter');
    await expect(dialog.getByText('The end must come after the beginning.')).toBeVisible();
    await dialog.getByLabel('From').fill('1:00');
    await dialog.getByLabel('To').fill('70');
    await expect(dialog.getByRole('status')).toContainText(`${between.length} beats from`);
    await page.keyboard.press('Enter');
    await expect(dialog).toBeHidden();
    await expectOneStep(new RegExp(`^class ${between.length} beats .* as V$`), () =>
      press(page, 'v'),
    );
  });

  test('the time of one beat is typed', async () => {
    const { pin, atS } = await steadyBeat();
    await pin.click();
    const time = beatBar().getByLabel('Beat at');
    await time.fill(`0:00:${(atS + 0.02).toFixed(3)}`);
    await time.press('Enter');
    await settled(page);
    expect(await undoName(page)).toMatch(/^move beat at 0:00:/);
    const moved = (await beatsNow()).filter(({ origin }) => origin === 'moved');
    expect(Math.abs(Number(moved[0].time_s) - atS - 0.02)).toBeLessThan(0.002);
    await page.keyboard.press('Escape');
    await press(page, 'Control+z');
  });
});

test.describe('by keyboard', () => {
  let beat: SteadyBeat;
  test.beforeEach(async () => {
    await page.mouse.move(2, 2);
    await goTo(page, '0:31');
    beat = await steadyBeat();
    await goTo(page, beat.time);
    await press(page, 'Escape');
    await press(page, ',');
    if (!(await isChosen())) await press(page, '.');
    expect(await isChosen()).toBe(true);
  });
  const isChosen = async () => (await beat.pin.getAttribute('aria-pressed')) === 'true';

  test('a beat is deleted', () => expectSeen(/^delete beat at 0:00:/, () => press(page, 'Delete')));

  test('a beat is put in each class in turn', async () => {
    await expectOneStep(/^class beat at 0:00:.* as S$/, () => press(page, 's'));
    for (const beatClass of ['S', 'V', 'F', 'Q', 'N']) {
      await press(page, beatClass.toLowerCase());
      await expect(beat.pin).toHaveAccessibleName(new RegExp(`^beat ${beatClass} `));
      expect(await undoName(page)).toMatch(new RegExp(`^class beat at 0:00:.* as ${beatClass}$`));
      await expectByHand();
    }
    for (let step = 0; step < 5; step += 1) await press(page, 'Control+z');
  });

  for (const [key, byMs] of [
    ['Control+ArrowRight', 1000 / 360],
    ['Control+Shift+ArrowLeft', -10],
  ] as const)
    test(`a beat is moved by ${byMs.toFixed(1)} ms`, async () => {
      await press(page, key);
      expect(await undoName(page)).toMatch(/^move beat at 0:00:/);
      await expectByHand();
      const moved = (await beatsNow()).filter(({ origin }) => origin === 'moved');
      expect(moved.length).toBe(1);
      const wasS = beat.atS + byMs / 1000;
      expect(Math.abs(Number(moved[0].time_s) - wasS)).toBeLessThan(0.0006);
      await press(page, 'Control+z');
    });

  test('a missing beat is added at the middle of Seconds', async () => {
    await press(page, 'Delete');
    await press(page, 'Escape');
    await expectSeen(/^add beat at 0:00:/, () => press(page, 'a'));
    await press(page, 'Control+z');
  });
});

test('an edit is told with what it did to the figures, and undo too', async () => {
  await goTo(page, '0:31');
  await press(page, '.');
  await press(page, 'Delete');
  const status = page.locator('.foot-status');
  const told = /^Done: delete beat at 0:00:3\d.*; (.+) fasting (.+) to ([\d.−]+)/;
  await expect(status).toHaveText(told);
  const [, label, before, after] = told.exec((await status.textContent()) ?? '') ?? [];
  const found = FIGURES.find((one) => one.label === label.replace(/,$/, ''));
  if (!found) throw new Error(`no figure ${label}`);
  expect(await figure(page, found.key)).toBe(after.replace('−', '-'));
  await press(page, 'Control+z');
  await expect(status).toHaveText(/^Undone: delete beat .* fasting .+ to /);
  expect(await figure(page, found.key)).toBe(before.replace('−', '-'));
});

test('undo and redo go through all steps, each by its name', async () => {
  await goTo(page, '0:31');
  const start = await allFigures(page);
  const names: string[] = [];
  const columns: (readonly string[])[] = [];
  for (const key of ['Delete', 'v', 'Control+Shift+ArrowRight', 'q']) {
    await press(page, '.');
    await press(page, key);
    names.push(await undoName(page));
    columns.push(await allFigures(page));
  }
  for (const name of names.toReversed()) {
    expect(await undoName(page)).toBe(name);
    await press(page, 'Control+z');
  }
  expect(await allFigures(page)).toEqual(start);
  for (const [i, name] of names.entries()) {
    await press(page, 'Control+Shift+z');
    expect(await undoName(page)).toBe(name);
    expect(await allFigures(page)).toEqual(columns[i]);
  }
  for (const _ of names) await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(start);
});

test('finding all beats again asks first where beats were mended by hand, and one undo brings them back', async () => {
  await goTo(page, '0:31');
  const start = await allFigures(page);
  await press(page, '.');
  await press(page, 'v');
  const mended = await allFigures(page);
  await press(page, 'Shift+D');
  const dialog = page.getByRole('dialog', { name: 'Find all beats again?' });
  await dialog.getByRole('button', { name: 'Leave them' }).click();
  expect(await allFigures(page)).toEqual(mended);
  await press(page, 'Shift+D');
  await dialog.getByRole('button', { name: 'Find all again' }).click();
  await settled(page);
  expect(await undoName(page)).toBe('detect beats again');
  expect(await allFigures(page)).toEqual(start);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(mended);
  await press(page, 'Control+z');
});
