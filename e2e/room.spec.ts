import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from 'playwright/test';
import {
  allFigures,
  dialogOf,
  editNumber,
  expectNoTroubles,
  figure,
  freshPage,
  goTo,
  keptHere,
  LONG_MS,
  openStudy,
  pane,
  press,
  reviewAs,
  settled,
  told,
  undoName,
  words,
} from './support';
import { namedThroughout } from './support-files';
import { downloadSession } from './support-results';

/** What the header of the file, its name and the bar tell of the invented person and of who reviews. */
const IDENTITY =
  /avila|example|1961|zz-?0077|adm-99|prober|rig_7|visit|2024|14[.-]05|\bmay\b|\b09:00|lens|\.edf|#report/i;

let page: Page;
test.beforeAll(async ({ browser }) => {
  page = await freshPage(browser, { viewport: { width: 1920, height: 1080 } });
  await openStudy(page, namedThroughout());
  await reviewAs(page, 'Q. Lens');
});
test.afterAll(() => page.context().close());
test.afterEach(() => expectNoTroubles(page));

const room = () => page.locator('.room');
const says = async () => words(await room().getByRole('status').textContent());

async function enter(): Promise<void> {
  await page.keyboard.press('F9');
  await expect(page.getByRole('heading', { name: 'Room view' })).toBeVisible({ timeout: LONG_MS });
  await settled(page);
}

async function leave(): Promise<void> {
  await press(page, 'F9');
  await expect(room()).toHaveCount(0);
  await expect(pane(page, 'Minutes')).toBeVisible();
  await expect(page.getByRole('button', { name: 'Room view' })).toBeFocused();
}

async function bookmark(time: string, note: string): Promise<void> {
  await goTo(page, time);
  await page.keyboard.press('Control+b');
  const dialog = dialogOf(page, 'Bookmark this place');
  await dialog.getByLabel('Note').fill(note);
  await page.keyboard.press('Enter');
  await expect(dialog).toBeHidden();
  await settled(page);
}

/** Keys of everything this browser holds for the page. */
const storageKeys = () =>
  page.evaluate(async () => {
    const keys = [...Object.keys(localStorage), ...Object.keys(sessionStorage)];
    for (const { name, version } of await indexedDB.databases()) {
      const opened = indexedDB.open(name ?? '', version);
      await new Promise((done) => opened.addEventListener('success', done));
      const db = opened.result;
      for (const store of db.objectStoreNames) {
        const asked = db.transaction(store).objectStore(store).getAllKeys();
        await new Promise((done) => asked.addEventListener('success', done));
        keys.push(...asked.result.map((key) => `${name} ${store} ${JSON.stringify(key)}`));
      }
      db.close();
    }
    return keys.sort();
  });

/** Everything a person or a program could read off the page: its text, attributes, title, address. */
const everythingReadable = () =>
  page.evaluate(() => {
    const typed = [...document.querySelectorAll('input, textarea, select')].map(
      (one) => (one as HTMLInputElement).value,
    );
    const { title, documentElement } = document;
    return [title, window.location.hash, documentElement.outerHTML, ...typed].join('\n');
  });

test.describe('bookmarks', () => {
  test('are kept with a note and flagged in Whole study, an undo step each', async () => {
    await bookmark('4:00', 'late');
    await bookmark('0:31', 'where Avila talks');
    await bookmark('2:00', 'calm');
    await keptHere(page, 3);
    expect(await undoName(page)).toBe('add bookmark 0:02:00.0');
    expect(await told(page, 'Whole study')).toContain('Bookmark 1 of 3, 0:00:31.0: where Avila');
    await press(page, 'Control+z');
    expect(await told(page, 'Whole study')).toContain('Bookmark 2 of 2, 0:04:00.0: late');
    await press(page, 'Control+y');
    expect(await told(page, 'Whole study')).toContain('Bookmark 2 of 3, 0:02:00.0: calm');
  });

  test('are stepped through by one key, with their widths', async () => {
    await goTo(page, '2:00');
    for (let i = 0; i < 3; i += 1) await press(page, '+');
    const near = await told(page, 'Seconds');
    await bookmark('2:00', 'near');
    await press(page, 'w');
    await goTo(page, '1:00');
    await press(page, 'b');
    await press(page, 'b');
    expect(await told(page, 'Seconds')).toBe(near);
    await press(page, 'b');
    expect(await told(page, 'Seconds')).toContain('from 0:03:55 to 0:04:05');
    await press(page, 'Shift+B');
    expect(await told(page, 'Seconds')).toBe(near);
  });

  test('are gone to, renamed and removed in their list', async () => {
    await press(page, 'Alt+b');
    const dialog = dialogOf(page, 'Bookmarks');
    await dialog.getByRole('textbox', { name: 'Note at 0:04:00.0' }).fill('end of it');
    await dialog.getByRole('button', { name: 'Keep the note at 0:04:00.0' }).click();
    await dialog.getByRole('button', { name: 'Remove the bookmark at 0:02:00.0' }).first().click();
    await dialog.getByRole('button', { name: 'Go to the bookmark at 0:04:00.0' }).click();
    await expect(dialog).toBeHidden();
    await settled(page);
    expect(await told(page, 'Seconds')).toContain('from 0:03:55 to 0:04:05');
    expect(await told(page, 'Whole study')).toContain('Bookmark 3 of 3, 0:04:00.0: end of it');
    expect(await undoName(page)).toBe('remove bookmark 0:02:00.0');
  });
});

test.describe('the room view', () => {
  test.beforeAll(async () => {
    await bookmark('1:10', 'early');
    await bookmark('3:10', 'where Avila coughs');
  });

  test('says nowhere whose study it is, whichever row is brought forward', async () => {
    expect(await everythingReadable(), 'the review does say it').toMatch(IDENTITY);
    const before = await storageKeys();
    await enter();
    await expect(page.getByRole('heading', { name: 'Room view' })).toBeFocused();
    await expect(room()).toContainText('Shown, not saved');
    const rows = new Set<string>();
    for (let i = 0; i < 12; i += 1) {
      expect(await everythingReadable()).not.toMatch(IDENTITY);
      await press(page, i % 3 === 2 ? 'b' : 'ArrowDown');
      rows.add(await says());
    }
    await press(page, '.');
    await press(page, 'v');
    expect(await everythingReadable()).not.toMatch(IDENTITY);
    for (const row of ['slow wave', 'Spectrogram', 'Heart rate', 'heartbeat'])
      expect([...rows].join(' ')).toContain(row);
    expect(before).toEqual(expect.arrayContaining(await storageKeys()));
    await leave();
    expect(before).toEqual(expect.arrayContaining(await storageKeys()));
  });

  test('shows what an edit does to the figures, and leaves the review as it was', async () => {
    await goTo(page, '2:00');
    const kept = async () => ({
      figures: await allFigures(page),
      edit: await editNumber(page),
      undo: await undoName(page),
      beats: await told(page, 'Seconds'),
      session: JSON.parse((await downloadSession(page)).bytes.toString('utf8')),
    });
    const before = await kept();
    const rmssd = await figure(page, 'rmssd_ms');
    await enter();
    await press(page, '.');
    await press(page, 'Delete');
    await press(page, 'v');
    await expect(room().getByRole('table')).toContainText(`was ${rmssd}`);
    await press(page, 'Control+z');
    await press(page, 'Control+z');
    await expect(room().getByRole('table')).not.toContainText('was');
    await press(page, 'Control+y');
    await expect(room().getByRole('table')).toContainText('was');
    await leave();
    expect(await kept()).toEqual(before);
  });

  test('opens, prints, reloads, saves and signs nothing, and says so', async () => {
    await enter();
    let came = '';
    const note = (what: string) => () => {
      came = what;
    };
    page.on('download', note('download'));
    page.on('filechooser', note('file chooser'));
    await page.evaluate(() => {
      window.print = () => document.body.append('printed');
    });
    const keys = ['Control+o', 'Control+Shift+o', 'Control+s', 'Control+Shift+s', 'Control+p'];
    for (const key of [...keys, 'F5', 'Shift+M', 'Shift+R', 'Shift+F', 'Control+g', 'Shift+N']) {
      await press(page, 'ArrowDown');
      await press(page, key);
      expect(await says(), key).toMatch(/Off in the room view/);
      await expect(page.getByRole('dialog')).toHaveCount(0);
    }
    expect(came).toBe('');
    await expect(room()).toBeVisible();
    await expect(page.getByLabel('File to open')).toHaveCount(0);
    await press(page, 'ArrowDown');
    await page.evaluate(() => {
      const held = new DataTransfer();
      held.items.add(new File(['x'], 'other.edf'));
      window.dispatchEvent(new DragEvent('drop', { dataTransfer: held, cancelable: true }));
    });
    expect(await says()).toMatch(/Files: Off in the room view/);
    page.removeAllListeners('download');
    page.removeAllListeners('filechooser');
    await leave();
  });

  test('prints a page of refusal, whoever asks the browser to', async () => {
    await enter();
    await page.emulateMedia({ media: 'print' });
    const seen = await page.evaluate(() =>
      [...document.querySelectorAll('body *')]
        .filter((one) => one.childElementCount === 0 && one.checkVisibility())
        .map((one) => one.textContent),
    );
    expect(seen).toEqual([
      'The room view is not printed. Leave it and print the report from the review.',
    ]);
    await page.emulateMedia({ media: 'screen' });
    await leave();
  });

  test('has text of at least 32 px and figures of 64 px at 1920x1080', async () => {
    await enter();
    const sizes = await page.evaluate(() => {
      const seen: { text: string; px: number }[] = [];
      const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
      for (let node = walker.nextNode(); node; node = walker.nextNode()) {
        const parent = node.parentElement;
        const text = node.textContent?.trim() ?? '';
        if (
          !parent ||
          text === '' ||
          !parent.checkVisibility() ||
          parent.closest('.visually-hidden')
        )
          continue;
        const inside = parent.closest<HTMLElement>('.room-small-inside');
        const scale = inside ? inside.getBoundingClientRect().width / inside.offsetWidth : 1;
        seen.push({ text, px: Number.parseFloat(getComputedStyle(parent).fontSize) * scale });
      }
      return seen;
    });
    expect(sizes.length).toBeGreaterThan(20);
    expect(sizes.filter(({ px }) => px < 31.9)).toEqual([]);
    const figures = await room().locator('table strong').all();
    expect(figures.length).toBeGreaterThan(3);
    for (const one of figures)
      expect(
        await one.evaluate((element) => Number.parseFloat(getComputedStyle(element).fontSize)),
      ).toBeGreaterThanOrEqual(63.9);
    const drawn = await room()
      .locator('.room-trace .room-small-inside')
      .evaluate((one) => one.getBoundingClientRect().width / (one as HTMLElement).offsetWidth);
    expect(11 * drawn, 'text on canvas is 11 px before it is enlarged').toBeGreaterThanOrEqual(
      31.9,
    );
    await leave();
  });

  test('steps through the bookmarks by one key and shows the note large, without the name in it', async () => {
    await enter();
    await press(page, 'b');
    const seen = new Set<string>();
    for (let i = 0; i < 6; i += 1) {
      await press(page, 'b');
      const place = words(await room().locator('.room-place').textContent());
      seen.add(place.replace(/Bookmark \d of \d/, 'Bookmark'));
    }
    expect(seen).toContain('early Bookmark, 0:01:10.0');
    expect(seen).toContain('where … coughs Bookmark, 0:03:10.0');
    const note = room().locator('.room-place strong');
    expect(
      await note.evaluate((one) => Number.parseFloat(getComputedStyle(one).fontSize)),
    ).toBeGreaterThanOrEqual(32);
    await leave();
  });

  test('has a ring that follows the mouse, and a pen for mouse and keys whose marks fade', async () => {
    await enter();
    await page.mouse.move(700, 500);
    const ring = room().locator('.room-ring');
    const place = await ring.boundingBox();
    expect((place?.x ?? 0) + (place?.width ?? 0) / 2).toBeCloseTo(700, 0);
    expect((place?.y ?? 0) + (place?.height ?? 0) / 2).toBeCloseTo(500, 0);
    const marks = room().locator('.mark');
    await press(page, 'd');
    await press(page, 'Space');
    for (let i = 0; i < 4; i += 1) await press(page, 'ArrowRight');
    await press(page, 'Space');
    await expect(marks).toHaveCount(1);
    await page.mouse.move(400, 300);
    await page.mouse.down();
    await page.mouse.move(480, 340, { steps: 4 });
    await page.mouse.up();
    await expect(marks).toHaveCount(2);
    await expect(marks.last().locator('.mark-line')).toHaveAttribute(
      'points',
      /^400,300 .*480,340$/,
    );
    await press(page, 'Escape');
    await expect(room()).toBeVisible();
    await expect(marks).toHaveCount(0);
    const keys = room().getByRole('navigation');
    await press(page, '?');
    await expect(keys).toHaveCount(0);
    await press(page, 'F1');
    await expect(keys).toBeVisible();
    await press(page, 'Escape');
    await expect(room()).toHaveCount(0);
  });

  for (const theme of ['light', 'dark'] as const)
    test(`is clean by axe in the ${theme} theme`, async () => {
      await page.emulateMedia({ colorScheme: theme });
      await enter();
      await press(page, 'b');
      const { violations } = await new AxeBuilder({ page }).setLegacyMode().analyze();
      expect(violations.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
      await press(page, 'd');
      const { violations: withPen } = await new AxeBuilder({ page }).setLegacyMode().analyze();
      expect(withPen.map(({ id, nodes }) => [id, nodes.map(({ html }) => html)])).toEqual([]);
      await press(page, 'd');
      await leave();
    });
});
