import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { expect, type Page, test } from 'playwright/test';
import {
  dialogOf,
  expectNoTroubles,
  findings,
  freshPage,
  LONG_MS,
  openStudy,
  pane,
  press,
  reviewAs,
  STEADY,
  settled,
} from './support';
import { downloadResults, downloadSession, unzipStored } from './support-results';

const ROOT = fileURLToPath(new URL('..', import.meta.url));
const run = promisify(execFile);

let page: Page;
let folder: string;
test.beforeAll(async ({ browser }) => {
  folder = await mkdtemp(join(tmpdir(), 'bicadence-e2e-'));
  page = await freshPage(browser);
  await openStudy(page, STEADY);
  await reviewAs(page);
});
test.afterAll(async () => {
  await page.context().close();
  await rm(folder, { recursive: true, force: true });
});
test.afterEach(() => expectNoTroubles(page));

test('what other methods say stands in the trust section and on a page of its own', async () => {
  const line = findings(page).getByRole('button', { name: 'DF by other methods' });
  await expect(line).toBeVisible({ timeout: LONG_MS });
  await expect(findings(page)).toContainText('Burg 100 %, multitaper 100 % of 2');
  await line.click();
  const dialog = dialogOf(page, 'Evidence');
  await expect(dialog.getByRole('img', { name: /Dominant frequency over time/ })).toBeVisible();
  const row = dialog.getByRole('row', { name: /^fasting|^whole/ }).first();
  await expect(row).toContainText('2 of 2, 100 %');
  await expect(row).toContainText('agree');
  await dialog.getByText('Every epoch').click();
  await expect(dialog.getByRole('row', { name: /^0:02:00/ })).toBeVisible();
  await dialog.getByRole('button', { name: 'Close' }).click();
});

test('the average heartbeat is taken out on the page as on the command line', async () => {
  await page.keyboard.press('Shift+S');
  const settings = dialogOf(page, 'Settings of the figures');
  await settings.getByLabel('Route').first().selectOption('beat-average');
  await settings.getByLabel('Beats averaged').fill('40');
  await settings.getByRole('button', { name: 'Use these settings' }).click();
  await settled(page);
  await expect(pane(page, 'Minutes')).toContainText('slow wave, beat-average');
  await press(page, '.');
  await press(page, 'v');
  const zip = await downloadResults(page);
  const session = join(folder, 'averaged.bicadence.json');
  await writeFile(session, (await downloadSession(page)).bytes);
  const out = join(folder, 'averaged');
  const words = ['workers/dist/analyse.mjs', STEADY, '--session', session, '--out', out];
  await run(process.execPath, words, { cwd: ROOT });
  for (const [name, bytes] of unzipStored(zip.bytes))
    expect(bytes.toString('utf8'), name).toBe(await readFile(join(out, name), 'utf8'));
  const written = JSON.parse(await readFile(join(out, 'findings.json'), 'utf8'));
  expect(written).toMatchObject({
    settings: { slow_route: 'beat-average', beat_average: { beats: 40 } },
    evidence: { opinions: { same_within_cpm: 0.25 } },
  });
});
