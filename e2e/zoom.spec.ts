import { expect, type Page, test } from 'playwright/test';
import {
  expectNoTroubles,
  freshPage,
  LONG_MS,
  openStudy,
  press,
  RECORD,
  reviewAs,
  STEADY,
  settled,
} from './support';

/** A screen of 1280x720 and one of 1920x1080 at 200 % zoom: half as many CSS pixels, two device pixels to each. */
const SCREENS = [
  { width: 640, height: 360 },
  { width: 960, height: 540 },
] as const;

/** What reaches past the sides of the page, or is cut off without a way to read it. */
const clipped = (page: Page) =>
  page.evaluate(() => {
    const wide = document.documentElement.clientWidth;
    const scrolls = (element: Element): boolean => {
      const { overflowX } = getComputedStyle(element);
      return /auto|scroll/.test(overflowX) && element.scrollWidth > element.clientWidth + 1;
    };
    const withinScroller = (element: Element | null): boolean =>
      element !== null && (scrolls(element) || withinScroller(element.parentElement));
    const cut = (element: Element): boolean =>
      element.matches('button, label, th, td, h2, h3') &&
      getComputedStyle(element).overflowX !== 'visible' &&
      element.scrollWidth > element.clientWidth + 2 &&
      !element.hasAttribute('title');
    const inFront = document.querySelector('dialog[open]') ?? document.body;
    const found = [
      ...inFront.querySelectorAll('button, input, select, label, h1, h2, h3, p, th, td'),
    ]
      .filter((one) => one.checkVisibility({ visibilityProperty: true }))
      .filter((one) => !one.closest('.visually-hidden, .unseen'))
      .filter((one) => {
        const { left, right, width } = one.getBoundingClientRect();
        const outside = width > 2 && (left < -1 || right > wide + 1);
        return cut(one) || (outside && !withinScroller(one.parentElement));
      })
      .map((one) => one.outerHTML.slice(0, 120));
    const sideways = document.documentElement.scrollWidth > wide + 1 ? ['the page itself'] : [];
    return [...sideways, ...found];
  });

for (const viewport of SCREENS)
  test.describe(`at 200 % zoom, ${viewport.width}x${viewport.height}`, () => {
    let page: Page;
    let clippedAtStart: readonly string[];
    test.beforeAll(async ({ browser }) => {
      page = await freshPage(browser, { viewport, deviceScaleFactor: 2 });
      clippedAtStart = await clipped(page);
      await openStudy(page, STEADY);
      await reviewAs(page);
    });
    test.afterAll(() => page.context().close());
    test.afterEach(() => expectNoTroubles(page));

    test('the start screen and the review fit the width; the panes stack', async () => {
      expect(clippedAtStart).toEqual([]);
      expect(await clipped(page)).toEqual([]);
      const tops = await page
        .locator('.place-whole, .place-traces, .place-findings')
        .evaluateAll((places) => places.map((one) => one.getBoundingClientRect().top));
      expect(tops).toEqual([...tops].sort((a, b) => a - b));
      expect(new Set(tops).size).toBe(3);
    });

    test('every dialog fits the width and keeps its buttons in sight', async () => {
      for (const key of ['Shift+L', 'Shift+P', 'Shift+K', 'Shift+S', 'Shift+F', '?', 'Control+b']) {
        await press(page, key);
        const dialog = page.getByRole('dialog');
        await expect(dialog).toBeVisible({ timeout: LONG_MS });
        expect(await clipped(page), key).toEqual([]);
        await expect(dialog.locator('.dialog-foot button').last()).toBeInViewport();
        await page.keyboard.press('Escape');
        await expect(dialog).toBeHidden();
      }
    });

    test('the room view fits the width, and all of it can be reached', async () => {
      await page.keyboard.press('F9');
      await expect(page.getByRole('heading', { name: 'Room view' })).toBeVisible({
        timeout: LONG_MS,
      });
      await settled(page);
      expect(await clipped(page)).toEqual([]);
      const keys = page.getByRole('navigation', { name: 'Keys of the room view' });
      await keys.scrollIntoViewIfNeeded();
      await expect(keys).toBeInViewport();
      await press(page, 'F9');
    });
  });

for (const viewport of [
  { width: 1280, height: 720 },
  { width: 1920, height: 1080 },
])
  test(`at ${viewport.width}x${viewport.height} the review fills the window and nothing lies below it`, async ({
    browser,
  }) => {
    const page = await freshPage(browser, { viewport });
    await openStudy(page, RECORD);
    await expect(page.getByRole('region', { name: 'Doubts' })).toContainText('open');
    await settled(page);
    const { tall, wide } = await page.evaluate(() => ({
      tall: document.documentElement.scrollHeight,
      wide: document.documentElement.scrollWidth,
    }));
    expect([wide, tall]).toEqual([viewport.width, viewport.height]);
    expectNoTroubles(page);
    await page.context().close();
  });
