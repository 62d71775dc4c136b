import { expect, type Locator, type Page, test } from 'playwright/test';
import {
  allFigures,
  expectNoTroubles,
  figureNumber,
  findings,
  freshPage,
  goTo,
  openStudy,
  press,
  putMessagesAway,
  RECORD_SECONDS,
  reviewAs,
  STEADY,
  settled,
  told,
  undoName,
} from './support';
import { type Box, drag, picture, stageBox, xOfTime } from './support-drawing';
import { intervalsByHand, type Row, rmssdByHand, roundedTo, tables } from './support-results';

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await openStudy(page, STEADY);
  await reviewAs(page);
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const WHOLE = [0, RECORD_SECONDS] as const;
const spanBar = (): Locator => page.getByRole('group', { name: /^Spoiled span / });

const secondsOfSpan = (span: Row): number => Number(span.to_s) - Number(span.from_s);

/** The places of a stretch in the three panes, where Seconds shows the middle of it. */
async function placesOf(fromS: number, toS: number): Promise<readonly Box[]> {
  const strip = await stageBox(page, 'Whole study');
  const minutes = await stageBox(page, 'Minutes');
  const inner = (box: Box): Box => {
    const left = xOfTime(box, WHOLE, fromS + 0.2 * (toS - fromS));
    const right = xOfTime(box, WHOLE, fromS + 0.4 * (toS - fromS));
    return { ...box, x: left, width: right - left };
  };
  return [inner(strip), inner(minutes), await stageBox(page, 'Seconds')];
}

const pictures = async (places: readonly Box[]): Promise<readonly string[]> => {
  const taken: string[] = [];
  await putMessagesAway(page);
  await page.mouse.move(2, 2);
  for (const place of places) taken.push(await picture(page, place));
  return taken;
};

/** Kept minutes and RMSSD in Findings are what the downloaded spans and beats give by hand. */
async function expectCounted(kept: { readonly stomach: number; readonly heart: number }) {
  const off = (shown: number, value: number) => Math.abs(shown - value);
  expect(off(await figureNumber(page, 'heart_kept_min'), kept.heart)).toBeLessThan(roundedTo(1));
  expect(off(await figureNumber(page, 'stomach_kept_min'), kept.stomach)).toBeLessThan(
    roundedTo(1),
  );
  const { beats, spans } = await tables(page);
  const intervals = intervalsByHand(beats, spans, '#1');
  expect(beats.slice(1).map((beat) => beat.nn === '1')).toEqual(intervals.map(({ nn }) => nn));
  const byHand = rmssdByHand(intervals);
  expect(off(await figureNumber(page, 'rmssd_ms'), byHand)).toBeLessThan(roundedTo(1));
}

test('a stretch is excluded by dragging with the exclude tool: hatched, counted, taken back', async () => {
  await goTo(page, '2:05');
  await page.mouse.move(2, 2);
  const before = await allFigures(page);
  const places = await placesOf(90, 150);
  const plain = await pictures(places);
  await press(page, 'e');
  const minutes = await stageBox(page, 'Minutes');
  const y = minutes.y + 0.4 * minutes.height;
  const at = (atS: number) => [xOfTime(minutes, WHOLE, atS), y] as const;
  await drag(page, at(90), at(150));
  await press(page, 'e');
  await press(page, 'Escape');
  await page.mouse.move(2, 2);
  const [span] = (await tables(page)).spans;
  expect(span).toMatchObject({ for: 'both', origin: 'drawn', lead: '' });
  expect(Math.abs(Number(span.from_s) - 90)).toBeLessThan(1);
  expect(Math.abs(Number(span.to_s) - 150)).toBeLessThan(1);
  expect(await undoName(page)).toMatch(/^exclude 0:01:(29|30|31)(\.\d)?-0:02:(29|30|31)(\.\d)?$/);
  expect(await told(page, 'Whole study')).toContain('1 spoiled span');
  const hatched = await pictures(places);
  for (const [i, one] of hatched.entries()) expect(one === plain[i], `pane ${i}`).toBe(false);
  const kept = 5 - secondsOfSpan(span) / 60;
  await expectCounted({ stomach: kept, heart: kept });
  const excluded = await allFigures(page);
  expect(excluded).not.toEqual(before);
  await press(page, 'Control+z');
  expect(await allFigures(page)).toEqual(before);
  const after = await pictures(places);
  for (const [i, one] of after.entries()) expect(one === plain[i], `pane ${i}`).toBe(true);
  await press(page, 'Control+Shift+z');
  expect(await allFigures(page)).toEqual(excluded);
  await press(page, 'Control+z');
});

test('the drawn slow wave follows a span at once: it stands as when it is drawn anew', async () => {
  await goTo(page, '2:05');
  const minutes = await stageBox(page, 'Minutes');
  const y = minutes.y + 0.4 * minutes.height;
  /** Without the last pixels, where the frame of the pane stands. */
  const inside = { ...minutes, width: minutes.width - 20 };
  const at = (atS: number) => [xOfTime(minutes, WHOLE, atS), y] as const;
  await press(page, 'e');
  await drag(page, at(120), at(135));
  await press(page, 'e');
  await press(page, 'Escape');
  const anew = async () => {
    await press(page, 'Shift+R');
    await press(page, 'Shift+R');
    await settled(page);
  };
  for (const act of [async () => undefined, () => press(page, 'Control+z')]) {
    await act();
    await settled(page);
    await page.waitForTimeout(400);
    const [followed] = await pictures([inside]);
    await anew();
    await expect
      .poll(async () => (await pictures([inside]))[0] === followed, {
        message: 'Minutes is the same after a visit to the report',
      })
      .toBe(true);
  }
});

test('a stretch is excluded by a drag with Alt held, in Seconds too', async () => {
  await goTo(page, '0:30');
  await putMessagesAway(page);
  const seconds = await stageBox(page, 'Seconds');
  const y = seconds.y + 0.6 * seconds.height;
  const at = (atS: number) => [xOfTime(seconds, [25, 35], atS), y] as const;
  await page.keyboard.down('Alt');
  await drag(page, at(28), at(31));
  await page.keyboard.up('Alt');
  const [span] = (await tables(page)).spans;
  expect(Math.abs(Number(span.from_s) - 28)).toBeLessThan(0.11);
  expect(Math.abs(Number(span.to_s) - 31)).toBeLessThan(0.11);
  await press(page, 'Control+z');
});

test('what Seconds shows is excluded by a key; whom it is for and why are keys and fields', async () => {
  await goTo(page, '0:30');
  const before = await allFigures(page);
  await press(page, 'Control+e');
  const whole = 5 - 10 / 60;
  await expectCounted({ stomach: whole, heart: whole });
  await press(page, '2');
  expect(await undoName(page)).toBe('change excluded 0:00:25-0:00:35');
  await expectCounted({ stomach: 5, heart: whole });
  await press(page, '1');
  await expectCounted({ stomach: whole, heart: 5 });
  await press(page, '3');
  await expectCounted({ stomach: whole, heart: whole });
  await spanBar().getByLabel('cause').selectOption('cough');
  await settled(page);
  await spanBar().getByLabel('excluded for').selectOption('heart');
  await settled(page);
  const note = findings(page).getByLabel('note');
  await note.fill('coughed, then still');
  await note.press('Enter');
  await settled(page);
  const [span] = (await tables(page)).spans;
  expect(span).toMatchObject({ for: 'heart', cause: 'cough', origin: 'drawn' });
  await page.locator('body').click({ position: { x: 4, y: 4 } });
  await press(page, 'Delete');
  expect(await undoName(page)).toBe('include 0:00:25-0:00:35 again');
  expect(await allFigures(page)).toEqual(before);
  for (let step = 0; step < 8; step += 1) await press(page, 'Control+z');
  expect(await undoName(page)).toBe('');
  expect(await allFigures(page)).toEqual(before);
});

test('an end of the selected span is dragged', async () => {
  await goTo(page, '2:05');
  await press(page, 'Control+e');
  const minutes = await stageBox(page, 'Minutes');
  const y = minutes.y + 0.4 * minutes.height;
  const at = (atS: number) => [xOfTime(minutes, WHOLE, atS), y] as const;
  await drag(page, at(130), at(170));
  const [span] = (await tables(page)).spans;
  expect(Number(span.from_s)).toBe(120);
  expect(Math.abs(Number(span.to_s) - 170)).toBeLessThan(1);
  expect(await undoName(page)).toMatch(/^change excluded 0:02:00(\.0)?-0:02:(49|50)/);
  await expectCounted({
    stomach: 5 - secondsOfSpan(span) / 60,
    heart: 5 - secondsOfSpan(span) / 60,
  });
  await press(page, 'Control+z');
  await press(page, 'Control+z');
});

test('no act on beats makes an interval NN across a spoiled span', async () => {
  await goTo(page, '0:30');
  await press(page, 'Control+e');
  await press(page, 'Escape');
  await press(page, 'Control+a');
  await press(page, 'Delete');
  const { beats } = await tables(page);
  const across = beats.find((beat) => Number(beat.rr_ms) > 9000);
  expect(across).toMatchObject({ nn: '0', class: 'N' });
  const kept = 5 - 10 / 60;
  await expectCounted({ stomach: kept, heart: kept });
  await press(page, 'Control+z');
  await press(page, 'Control+z');
});
