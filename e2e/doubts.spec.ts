import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from 'playwright/test';
import {
  agree,
  allFigures,
  chooseFile,
  dialogOf,
  editNumber,
  expectNoTroubles,
  freshPage,
  keptHere,
  LONG_MS,
  openStudy,
  press,
  reviewAs,
  STEADY,
  settled,
  told,
  undoName,
  words,
} from './support';
import { doubtCard, doubtsPane, placeInFront, plantErrors } from './support-doubts';
import { windowOf } from './support-drawing';
import { downloadSession, type Row, tables } from './support-results';

/** The invented fixture's own rate. */
const RATE_HZ = 360;
/** A doubt about an error stands no farther from it. */
const NEAR_S = 1.5;
const TEN = [
  [20, 'missed'],
  [50, 'false'],
  [80, 'missed'],
  [110, 'class', 'V'],
  [140, 'missed'],
  [170, 'false'],
  [200, 'class', 'V'],
  [230, 'missed'],
  [260, 'false'],
  [290, 'class', 'S'],
] as const;

let page: Page;
/** Figures and beats as they are before errors are planted. */
let truth: { readonly figures: readonly string[]; readonly beats: readonly Row[] };
let planted: ReturnType<typeof plantErrors>;

const openCount = async (): Promise<number> => {
  await settled(page);
  const place = words(await doubtCard(page).getByRole('heading').textContent());
  return Number(/(\d+) of (\d+)$/.exec(place)?.[2] ?? 0);
};

async function openSpoiled(): Promise<void> {
  await chooseFile(page, {
    name: 'spoiled.bicadence.json',
    mimeType: 'application/json',
    buffer: planted.bytes,
  });
  await expect.poll(() => allFigures(page), { timeout: LONG_MS }).not.toEqual(truth.figures);
}

/** WCAG 2.2 A and AA and axe's best practices find nothing in a part of the page, in either theme. */
async function expectClean(part: string): Promise<void> {
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    await settled(page);
    const { violations } = await new AxeBuilder({ page }).setLegacyMode().include(part).analyze();
    expect(violations.map(({ id, nodes }) => [colorScheme, id, nodes[0]?.html])).toEqual([]);
  }
}

test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser);
  await openStudy(page, STEADY);
  truth = { figures: await allFigures(page), beats: (await tables(page)).beats };
  planted = plantErrors((await downloadSession(page)).bytes, RATE_HZ, TEN);
  await reviewAs(page);
  await openSpoiled();
});
/** The panes are at the doubt in front. */
test.beforeEach(async () => {
  await settled(page);
  if (await doubtCard(page).getByRole('button', { name: 'Go there' }).isVisible())
    await press(page, 'd');
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

/** How many keys it took and how many doubts they settled. */
interface Tally {
  keys: number;
  doubts: number;
  mended: number;
}

const inFrontMendable = async (): Promise<boolean> =>
  (await doubtCard(page)
    .getByRole('button', { name: /^(Insert|Remove|Class|Move)/ })
    .count()) > 0;

/**
 * Does as a person who knows the truth: mends where an error was planted, keeps what else is doubted. The key that brought
 * the panes to the first doubt is counted.
 */
async function settleAll(most: number): Promise<Tally> {
  const wrong = new Set(planted.planted);
  const tally = { keys: 1, doubts: 0, mended: 0 };
  for (; tally.doubts < most; tally.doubts += 1) {
    const atS = await placeInFront(page);
    if (atS === null) break;
    const error = [...wrong].find((one) => Math.abs(one.atS - atS) < NEAR_S);
    const mends = error !== undefined && (await inFrontMendable());
    if (mends) wrong.delete(error);
    tally.keys += 1;
    tally.mended += mends ? 1 : 0;
    await press(page, mends ? 'm' : 'k');
  }
  return tally;
}

const sessionNow = async () =>
  JSON.parse((await downloadSession(page)).bytes.toString('utf8')) as {
    readonly doubts: readonly { readonly ending: string }[];
    readonly log: readonly { readonly reviewer: string; readonly act: { readonly kind: string } }[];
  };

test('a doubt in front says where, why, and what keeping and mending would make of a figure', async () => {
  const card = doubtCard(page);
  await expect(card.getByRole('heading')).toHaveText(/^\d:\d\d:\d\d\.\d · .*\?/);
  await expect(card).toContainText('missed beat?');
  await expect(card).toContainText(/interval of \d+ ms is about twice its neighbours/);
  const mend = card.getByRole('button', { name: /^Insert a beat at \d:\d\d:\d\d\.\d{3} / });
  const moved = /^(\d+) → (\d+)$/.exec(words(await mend.locator('strong').textContent()));
  expect(moved).not.toBeNull();
  const keep = card.getByRole('button', { name: /^Keep as it is/ });
  await expect(keep).toContainText(`${moved?.[1]} stays`);
  const [fromS, toS] = windowOf(await told(page, 'Seconds'));
  const atS = (await placeInFront(page)) ?? Number.NaN;
  expect(atS).toBeGreaterThan(fromS);
  expect(atS).toBeLessThan(toS);
  await expect(page.locator('[data-part="spoken"]')).toHaveText(/^Doubt 1 of \d+, .*missed beat\?/);
});

test('a held key settles one doubt and no more', async () => {
  const open = await openCount();
  await page.keyboard.down('k');
  for (let i = 0; i < 5; i += 1) await page.keyboard.down('k');
  await page.keyboard.up('k');
  expect(await openCount()).toBe(open - 1);
  await press(page, 'Control+z');
  expect(await openCount()).toBe(open);
});

test('undo opens a mended doubt again, in front, and the outcome has a button for it', async () => {
  const place = await placeInFront(page);
  const open = await openCount();
  await press(page, 'm');
  await expect(doubtsPane(page).getByRole('status').first()).toHaveText(
    /^Mended: insert beat, .* to \d+ ms²$/,
  );
  expect(await undoName(page)).toBe('insert beat');
  expect(await placeInFront(page)).not.toBe(place);
  await doubtsPane(page).getByRole('button', { name: /^Undo/ }).click();
  await settled(page);
  expect(await placeInFront(page)).toBe(place);
  expect(await openCount()).toBe(open);
  await expect(doubtsPane(page).getByRole('status').first()).toBeEmpty();
});

test('no doubt is settled while the panes look elsewhere: the key goes there first', async () => {
  const open = await openCount();
  const place = await told(page, 'Seconds');
  await press(page, 'Home');
  await press(page, 'm');
  expect(await openCount()).toBe(open);
  expect(await told(page, 'Seconds')).toBe(place);
});

test('look-alikes are drawn together and settled as one step, but for those left out', async () => {
  const open = await openCount();
  for (let i = 0; i < open; i += 1) {
    if (/odd shape/.test((await doubtCard(page).textContent()) ?? '')) break;
    await press(page, 'd');
  }
  await press(page, 'u');
  const dialog = dialogOf(page, 'Look-alikes');
  const boxes = dialog.getByRole('checkbox');
  await expect(boxes.first()).toBeVisible();
  const chosen = dialog.getByRole('checkbox', { checked: true });
  const found = await chosen.count();
  expect(found).toBeGreaterThanOrEqual(2);
  await chosen.last().uncheck();
  await expect(dialog.locator('.alike-overlay path:not(.alike-average)')).toHaveCount(found - 1);
  await expectClean('dialog');
  const edit = await editNumber(page);
  await dialog.getByRole('button', { name: /^Keep / }).click();
  await keptHere(page, edit + 1);
  expect(await openCount()).toBe(open - (found - 1));
  await press(page, 'Control+z');
  expect(await openCount()).toBe(open);
});

test('the pane is clean in both themes', async () => {
  await expectClean('.doubts');
});

test('ten errors of the detector are mended by keys alone, and log and figures are right after', async () => {
  test.setTimeout(300_000);
  expect(await allFigures(page)).not.toEqual(truth.figures);
  const before = (await sessionNow()).log.length;
  const doubts = await openCount();
  const { keys, doubts: done, mended } = await settleAll(3 * doubts);
  console.log(`${keys} keys for ${done} doubts, ${mended} of them errors`);
  expect(mended).toBe(TEN.length);
  expect(keys / done).toBeLessThanOrEqual(1.3);
  await expect(doubtsPane(page)).toContainText('No open doubts');
  const { beats } = await tables(page);
  expect(beats.map((one) => one.class)).toEqual(truth.beats.map((one) => one.class));
  const apartS = beats.map((one, i) => Number(one.time_s) - Number(truth.beats[i].time_s));
  expect(Math.max(...apartS.map(Math.abs))).toBeLessThan(0.001);
  expect(await allFigures(page)).toEqual(truth.figures);
  const { log, doubts: ends } = await sessionNow();
  const lines = log.slice(before);
  expect(lines).toHaveLength(done);
  expect(lines.every(({ act, reviewer }) => act.kind === 'edit' && reviewer !== '')).toBe(true);
  expect(ends.filter(({ ending }) => ending === 'mended')).toHaveLength(TEN.length);
});

test('what is settled stays so when the study is closed and opened in a new page', async () => {
  const { doubts } = await sessionNow();
  await press(page, 'Shift+Q');
  await page.reload();
  await expect(page.getByRole('heading', { name: 'Open a recording' })).toBeVisible();
  await chooseFile(page, STEADY);
  await agree(page);
  await expect(doubtsPane(page)).toContainText(/No open doubts/);
  await expect(doubtsPane(page)).toContainText(`${TEN.length} mended`);
  expect((await sessionNow()).doubts).toEqual(doubts);
});
