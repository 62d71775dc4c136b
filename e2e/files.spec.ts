import { execFile } from 'node:child_process';
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { expect, type Page, test } from 'playwright/test';
import {
  expectNoTroubles,
  freshPage,
  goTo,
  LONG_MS,
  openStudy,
  press,
  RECORD,
  RECORD_CODE,
  RECORD_FOLDER,
  reviewAs,
} from './support';
import { downloaded, downloadResults, downloadSession, unzipStored } from './support-results';

const ROOT = fileURLToPath(new URL('..', import.meta.url));
const NAMES = [
  ...['beats.csv', 'epochs.csv', 'minutes.csv', 'spans.csv', 'findings.json', 'report.html'],
  ...['spectrogram.svg', 'slow-waves.svg', 'trend.svg', 'separated.edf', 'annotations.edf'],
];
const run = promisify(execFile);
const analyse = (...words: readonly string[]) =>
  run(process.execPath, ['workers/dist/analyse.mjs', ...words], { cwd: ROOT });

let page: Page;
let folder: string;
test.beforeAll(async ({ browser }) => {
  folder = await mkdtemp(join(tmpdir(), 'bicadence-e2e-'));
  page = await freshPage(browser);
  await openStudy(page);
  await reviewAs(page);
});
test.afterAll(async () => {
  await page.context().close();
  await rm(folder, { recursive: true, force: true });
});
test.afterEach(() => expectNoTroubles(page));

/** The page's zip holds, byte for byte, what the command line wrote into a folder. */
async function expectSameBytes(out: string, withoutIdentity = false): Promise<void> {
  const zip = await downloadResults(page, withoutIdentity);
  expect(zip.name).toBe(
    withoutIdentity ? 'results-without-identity.zip' : `${RECORD_CODE}-results.zip`,
  );
  const files = unzipStored(zip.bytes);
  expect([...files.keys()]).toEqual(NAMES);
  expect((await readdir(out)).sort()).toEqual([...NAMES].sort());
  for (const [name, bytes] of files) {
    const written = await readFile(join(out, name));
    expect(bytes.toString('utf8'), name).toBe(written.toString('utf8'));
    expect(bytes.equals(written), name).toBe(true);
  }
}

test('without an edit the page gives the bytes of the command line', async () => {
  const out = join(folder, 'plain');
  await analyse(RECORD, '--out', out);
  await expectSameBytes(out);
});

test('with edits, spans, phases and other settings too, by the downloaded session', async () => {
  await goTo(page, '0:31');
  await press(page, '.');
  await press(page, 'v');
  await press(page, '.');
  await press(page, 'Delete');
  await goTo(page, '3:00');
  await press(page, 'Control+e');
  await press(page, '2');
  await page.keyboard.press('Shift+S');
  const settings = page.getByRole('dialog', { name: 'Settings of the figures' });
  await settings.getByLabel('Route').first().selectOption('fractional');
  await settings.getByRole('button', { name: 'Use these settings' }).click();
  await page.keyboard.press('Shift+P');
  const phases = page.getByRole('dialog', { name: 'Phases' });
  await phases.getByLabel('to', { exact: true }).first().fill('4:30');
  await phases.getByRole('button', { name: 'Use these phases' }).click();
  const zip = await downloadResults(page);
  const session = join(folder, 'edited.bicadence.json');
  await writeFile(session, (await downloadSession(page)).bytes);
  const out = join(folder, 'edited');
  await analyse(RECORD, '--session', session, '--out', out);
  await expectSameBytes(out);
  expect((await downloadResults(page)).bytes.equals(zip.bytes), 'the same again').toBe(true);
  const findings = JSON.parse(await readFile(join(out, 'findings.json'), 'utf8'));
  expect(findings).toMatchObject({ edit: 6, settings: { slow_route: 'fractional' } });
});

test('without identity too, and then nothing says whose they are', async () => {
  const session = join(folder, 'bare.bicadence.json');
  await writeFile(session, (await downloadSession(page)).bytes);
  const out = join(folder, 'bare');
  await analyse(RECORD, '--session', session, '--without-identity', '--out', out);
  await expectSameBytes(out, true);
  for (const name of NAMES) {
    const text = (await readFile(join(out, name))).toString('latin1');
    expect(text, name).not.toMatch(/MITDB|T\. Technician|2020-03-01|record208/);
  }
});

test('each file by itself, and a picture as PNG', async () => {
  await press(page, 'Control+Shift+s');
  const dialog = page.getByRole('dialog', { name: 'Download the results' });
  const one = (name: string) => dialog.getByRole('button', { name, exact: true });
  await expect(one('Download beats.csv')).toBeVisible({ timeout: LONG_MS });
  const beats = await downloaded(page, () => one('Download beats.csv').click());
  expect(beats.name).toBe(`${RECORD_CODE}-beats.csv`);
  expect(beats.bytes.toString('utf8')).toMatch(/^time_s,sample,/);
  const png = await downloaded(page, () => one('Download trend.svg as PNG').click());
  expect(png.name).toBe(`${RECORD_CODE}-trend.png`);
  expect(png.bytes.subarray(1, 4).toString('latin1')).toBe('PNG');
  expect(png.bytes.readUInt32BE(16)).toBe(2400);
  await press(page, 'Escape');
});

test('the command line refuses a session of another study, and says why', async () => {
  const hashed = (await downloadSession(page)).bytes.toString('utf8');
  const unhashed = hashed.replaceAll(/"sha256":"[0-9a-f]{64}"/g, '"sha256":null');
  const other = `${RECORD_FOLDER}record208-rates.edf`;
  for (const [name, text] of Object.entries({ hashed, unhashed })) {
    const session = join(folder, `${name}.bicadence.json`);
    await writeFile(session, text);
    const failure = await analyse(other, '--session', session, '--out', join(folder, name)).then(
      () => null,
      (error: { readonly code?: number; readonly stderr?: string }) => error,
    );
    expect(failure?.code, name).toBe(1);
    expect(failure?.stderr).toMatch(/not the one that session MITDB-208 was made on/);
  }
});
