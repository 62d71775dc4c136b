import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { expect, type Page, test } from 'playwright/test';
import {
  bar,
  dialogOf,
  expectNoTroubles,
  freshPage,
  goTo,
  keptHere,
  LONG_MS,
  openStudy,
  press,
  reviewAs,
  settled,
} from './support';
import { namedRecord } from './support-files';
import { downloadResults, downloadSession } from './support-results';

/** What the header of `namedRecord` tells of its invented person. */
const IDENTITY = ['Avila', 'Example', '1961', 'visit-7'];
const CODE = 'ZZ-0077';

/** Another server than the page's own, which lets anybody in and writes down what is asked. */
let other: Server;
let otherUrl: string;
let asked: string[] = [];
test.beforeAll(async () => {
  other = createServer((request, response) => {
    asked.push(request.url ?? '');
    response.writeHead(200, { 'access-control-allow-origin': '*', 'content-type': 'text/html' });
    response.end('<!doctype html><title>elsewhere</title>');
  });
  await new Promise<void>((done) => other.listen(0, '127.0.0.1', done));
  otherUrl = `http://127.0.0.1:${(other.address() as AddressInfo).port}/`;
});
test.afterAll(() => new Promise((done) => other.close(done)));
test.beforeEach(() => {
  asked = [];
});

/** Addresses of all requests of a context, of its workers too; `page.on` would miss those of a service worker. */
function watchRequests(page: Page): readonly string[] {
  const seen: string[] = [];
  page.context().on('request', (request) => seen.push(request.url()));
  return seen;
}

const isLocal = (url: string, origin: string): boolean =>
  url.startsWith(origin) || url.startsWith('blob:') || url.startsWith('data:');

test('a whole review asks nothing of the network but the page’s own files', async ({
  browser,
  baseURL,
}) => {
  const page = await freshPage(browser);
  const seen = watchRequests(page);
  await page.reload();
  await openStudy(page, namedRecord());
  await reviewAs(page);
  await goTo(page, '0:31');
  await press(page, '.');
  await press(page, 'v');
  await press(page, 'Control+e');
  await page.keyboard.press('Shift+S');
  await dialogOf(page, 'Settings of the figures')
    .getByRole('button', { name: /^Leave/ })
    .click();
  await downloadResults(page);
  await downloadSession(page);
  await press(page, 'Shift+R');
  await expect(page.getByRole('article', { name: 'Report' })).toBeVisible({ timeout: LONG_MS });
  await settled(page);
  await press(page, 'Shift+R');
  expect(seen.filter((url) => !isLocal(url, baseURL ?? ''))).toEqual([]);
  expect(
    seen.some((url) => /worker.*\.js$/.test(url)),
    'the workers’ files were seen',
  ).toBe(true);
  expectNoTroubles(page);
  await page.context().close();
});

test('the watch sees a request where one is made: a page without the policy', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  const seen = watchRequests(page);
  await page.goto(otherUrl);
  await page.evaluate((url) => fetch(`${url}from-page`).then(() => undefined), otherUrl);
  await page.evaluate(async (url) => {
    const code = `fetch('${url}from-worker').then(() => postMessage('came'))`;
    const worker = new Worker(URL.createObjectURL(new Blob([code])));
    await new Promise((done) => worker.addEventListener('message', done));
  }, otherUrl);
  expect(asked).toContain('/from-page');
  expect(asked).toContain('/from-worker');
  expect(seen).toContain(`${otherUrl}from-page`);
  expect(seen).toContain(`${otherUrl}from-worker`);
  await page.context().close();
});

test.describe('the policy of the page', () => {
  let page: Page;
  test.beforeAll(async ({ browser }) => {
    page = await freshPage(browser);
    await openStudy(page, namedRecord());
  });
  test.afterAll(() => page.context().close());

  const outcome = (work: Promise<unknown>): Promise<string> =>
    work.then(
      () => 'went through',
      () => 'refused',
    );

  test('stops a request from the page', async () => {
    const fetched = page.evaluate((url) => fetch(url).then(() => undefined), otherUrl);
    expect(await outcome(fetched)).toBe('refused');
    const picture = page.evaluate(
      (url) =>
        new Promise<void>((done, fail) => {
          const image = new Image();
          image.addEventListener('load', () => done());
          image.addEventListener('error', () => fail(new Error('refused')));
          image.src = url;
        }),
      `${otherUrl}picture.png`,
    );
    expect(await outcome(picture)).toBe('refused');
    await page.evaluate((url) => navigator.sendBeacon(url, 'x'), otherUrl).catch(() => undefined);
    const socket = page.evaluate(
      (url) =>
        new Promise<void>((done, fail) => {
          const line = new WebSocket(url);
          line.addEventListener('open', () => done());
          line.addEventListener('error', () => fail(new Error('refused')));
        }),
      otherUrl.replace('http', 'ws'),
    );
    expect(await outcome(socket)).toBe('refused');
    expect(asked).toEqual([]);
  });

  test('stops a request from its own workers', async () => {
    const workers = page.workers();
    expect(workers.length).toBeGreaterThan(0);
    for (const worker of workers) {
      const fetched = worker.evaluate((url) => fetch(url).then(() => undefined), otherUrl);
      expect(await outcome(fetched), worker.url()).toBe('refused');
    }
    expect(asked).toEqual([]);
  });

  test('stops a request from a worker that is started from a blob', async () => {
    const answer = await page.evaluate(
      (url) =>
        new Promise<string>((done) => {
          const code = `fetch('${url}').then(() => postMessage('went through'), () => postMessage('refused'))`;
          const worker = new Worker(URL.createObjectURL(new Blob([code])));
          worker.addEventListener('message', (event) => done(String(event.data)));
          worker.addEventListener('error', () => done('refused'));
        }),
      otherUrl,
    );
    expect(answer).toBe('refused');
    expect(asked).toEqual([]);
  });
});

test('no identity is in title, address or the browser’s stores', async ({ browser }) => {
  const page = await freshPage(browser);
  await openStudy(page, namedRecord());
  await expect(bar(page)).toContainText('Avila Example');
  await reviewAs(page);
  await goTo(page, '0:31');
  await press(page, 'Control+e');
  await keptHere(page, 1);
  await press(page, 'Shift+R');
  await expect(page.getByRole('article', { name: 'Report' })).toBeVisible({ timeout: LONG_MS });
  const where = [await page.title(), page.url()];
  await press(page, 'Shift+R');
  const stored = await page.evaluate(readStores);
  expect(stored.keys.length).toBeGreaterThan(0);
  expect(stored.values).toContain(CODE);
  for (const word of [...IDENTITY, CODE])
    for (const text of [...where, ...stored.keys]) expect(text).not.toContain(word);
  for (const word of IDENTITY) expect(stored.values).not.toContain(word);
  const session = (await downloadSession(page)).bytes.toString('utf8');
  for (const word of IDENTITY) expect(session).not.toContain(word);
  await page.context().close();
});

/** Everything that the page keeps in this browser: names and keys, and all values as one text. Runs in the page. */
async function readStores(): Promise<{
  readonly keys: readonly string[];
  readonly values: string;
}> {
  const settle = <T>(request: IDBRequest<T>): Promise<T> =>
    new Promise((done, fail) => {
      request.onsuccess = () => done(request.result);
      request.onerror = () => fail(request.error ?? new Error('not read'));
    });
  const keys: string[] = [];
  const values: unknown[] = [];
  for (const storage of [localStorage, sessionStorage])
    for (const [key, value] of Object.entries(storage)) {
      keys.push(key);
      values.push(value);
    }
  for (const { name } of await indexedDB.databases()) {
    keys.push(name ?? '');
    const database = await settle(indexedDB.open(name ?? ''));
    for (const store of database.objectStoreNames) {
      const rows = database.transaction(store).objectStore(store);
      keys.push(store, ...(await settle(rows.getAllKeys())).map((key) => JSON.stringify(key)));
      values.push(await settle(database.transaction(store).objectStore(store).getAll()));
    }
    database.close();
  }
  keys.push(...(await caches.keys()));
  return { keys, values: JSON.stringify(values) };
}
