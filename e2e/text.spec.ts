import { expect, type Page, test } from 'playwright/test';
import {
  agree,
  bar,
  chooseFile,
  dialogOf,
  expectNoTroubles,
  figureNumber,
  freshPage,
  IDENTITY,
  LONG_MS,
  openStudy,
  REFUSED,
} from './support';
import { expectDrawn } from './support-drawing';
import { type GivenFile, microvolts, textOf, timedText } from './support-files';
import { downloadResults, unzipStored } from './support-results';

const ASKS = 'How is this text file to be read?';
const RATE = /^Samples a second/;
const whole = () => microvolts(3).uv.map((value) => Math.round(value).toFixed(0));

let page: Page;
test.beforeEach(async ({ browser }) => {
  page = await freshPage(browser);
});
test.afterEach(async () => {
  expectNoTroubles(page);
  await page.context().close();
});

test('text that says its unit but no rate: the rate is asked for', async () => {
  await chooseFile(page, textOf('belly.csv', 'E1 (uV)', whole()));
  const asked = dialogOf(page, ASKS);
  await expect(asked).toContainText(/belly\.csv: .*rate/, { timeout: LONG_MS });
  await asked.getByRole('button', { name: 'Open again' }).click();
  await expect(asked).toContainText('Type the rate');
  await asked.getByLabel(RATE).fill('120');
  await asked.getByRole('button', { name: 'Open again' }).click();
  const dialog = dialogOf(page, IDENTITY);
  await expect(dialog).toContainText('0:05:00', { timeout: LONG_MS });
  await dialog.getByRole('button', { name: 'This is the study, open it' }).click();
  await expect(dialog, 'text has no code of its own').toContainText('Type a code');
  await agree(page, 'T-1');
  await expect(bar(page)).toContainText('0:05:00 · 1 channel · 120 Hz');
  await expectDrawn(page, 'Seconds');
});

test('bare numbers: rate and unit are asked for, and the unit scales them', async () => {
  const values = microvolts(3).uv.map((value) => (Math.round(value) / 1000).toFixed(3));
  await chooseFile(page, textOf('bare.txt', null, values));
  const asked = dialogOf(page, ASKS);
  await expect(asked).toBeVisible({ timeout: LONG_MS });
  await asked.getByLabel(RATE).fill('120');
  await asked.getByRole('button', { name: 'Open again' }).click();
  await expect(asked).toContainText(/unit/, { timeout: LONG_MS });
  await asked.getByLabel(RATE).fill('120');
  await asked.getByLabel('Unit of the values').selectOption('mV');
  await asked.getByRole('button', { name: 'Open again' }).click();
  await agree(page, 'T-2');
  // 3.1 cpm at 150 uV is in the fixture (truth.json): a sine of 150 uV has 11250 uV2, so DP lies near 60 dB, not near 0.
  expect(await figureNumber(page, 'dp_mean_spectrum_db', 'whole')).toBeGreaterThan(50);
});

test('a unit that is no voltage is refused by its name', async () => {
  await chooseFile(page, textOf('press.csv', 'time (s),P1 (bar)', timed('bar')));
  const dialog = page.getByRole('dialog');
  await expect(dialog).toContainText(/press\.csv: .*bar/, { timeout: LONG_MS });
  await expect(dialog).toHaveAccessibleName(REFUSED);
});

test('a file in mV gives the same results as the same file in uV', async ({ browser }) => {
  const inUv = await resultsOf(timedText('study.csv', 'uV', 1));
  await page.context().close();
  page = await freshPage(browser);
  const inMv = await resultsOf(timedText('study.csv', 'mV', 0.001));
  expect([...inMv.keys()]).toEqual([...inUv.keys()]);
  for (const [name, text] of inUv) expect(inMv.get(name), name).toBe(text);
});

const timed = (unit: string) =>
  timedText('any.csv', unit, 1).buffer.toString('utf8').trimEnd().split('\n').slice(1);

/** All result files of a text study, the hash of the file itself left out. */
async function resultsOf(file: GivenFile): Promise<ReadonlyMap<string, string>> {
  await openStudy(page, file, 'T-3');
  const files = unzipStored((await downloadResults(page)).bytes);
  return new Map(
    [...files].map(([name, bytes]) => [
      name,
      bytes.toString('utf8').replaceAll(/\b[0-9a-f]{64}\b/g, 'hash'),
    ]),
  );
}
