import { execFile } from 'node:child_process';
import { mkdtemp, readFile, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { expect, test } from 'playwright/test';
import {
  dialogOf,
  expectNoTroubles,
  figureButton,
  freshPage,
  LONG_MS,
  openStudy,
  press,
  STEADY,
} from './support';
import { downloadResults, unzipStored } from './support-results';

const HEAD = 'figure;phase;min_minutes;max_minutes;posture;meal;low;high;unit;population;source';
const SOURCE = 'invented <b>for this test</b>';
const row = (phase: string, low: string) => `rmssd_ms;${phase};4;6;;;${low};99;ms;nobody;${SOURCE}`;
const file = (name: string, text: string) => ({
  name,
  mimeType: 'text/csv',
  buffer: Buffer.from(text),
});

/** findings.json of the same study by the command line with the same file of reference values. */
async function ofTheCommandLine(reference: string): Promise<string> {
  const folder = await mkdtemp(join(tmpdir(), 'site-reference-'));
  const path = join(folder, 'ours.csv');
  await writeFile(path, reference);
  const words = [STEADY, '--code', 'INV-9', '--reference', path, '--out', folder];
  await promisify(execFile)('node', ['workers/dist/analyse.mjs', ...words]);
  return readFile(join(folder, 'findings.json'), 'utf8');
}

test('reference values of the site stand beside the figure they fit, as text, until they are removed', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  await openStudy(page, STEADY, 'INV-9');
  await page.getByRole('button', { name: 'Study', exact: true }).click();
  await page.getByRole('button', { name: /^Reference values of the site/ }).click();
  const dialog = dialogOf(page, 'Reference values of the site');
  const choose = dialog.getByLabel('File with reference values');
  await expect(dialog.getByRole('link', { name: /invented example/i })).toHaveAttribute(
    'href',
    './site-reference-example.csv',
  );

  await choose.setInputFiles(file('wrong.csv', `${HEAD}\n${row('lunch', 'two')}\n`));
  await expect(dialog.getByRole('alert')).toContainText('wrong.csv was not taken');
  await expect(dialog.getByRole('listitem')).toHaveText([
    'row 2, column phase: “lunch” is none of fasting, meal, fed, whole.',
    'row 2, column low: “two” is no number (write 3.75).',
  ]);

  const ours = `${HEAD}\n${row('fasting', '1,5')}\n`;
  await choose.setInputFiles(file('ours.csv', ours));
  await expect(dialog.getByRole('alert')).toBeHidden();
  await expect(dialog.getByRole('row').last()).toContainText(`1.5–99 ms`);
  await expect(dialog.getByRole('row').last()).toContainText(SOURCE);
  await dialog.getByRole('button', { name: 'Close' }).click();

  await figureButton(page, 'rmssd_ms').first().click();
  const own = dialogOf(page, 'RMSSD');
  await expect(own).toContainText('Reference of this site');
  await expect(own).toContainText(`1.5–99 ms (fasting of 4–6 min; nobody; source: ${SOURCE})`);
  await page.keyboard.press('Escape');

  const results = unzipStored((await downloadResults(page)).bytes);
  const findings = results.get('findings.json')?.toString() ?? '';
  const { phases } = JSON.parse(findings);
  expect(phases[0].figures.rmssd_ms.references_of_this_site).toMatchObject([
    { low: 1.5, high: 99, source: SOURCE },
  ]);

  expect(findings).toBe(await ofTheCommandLine(ours));

  await press(page, 'Shift+R');
  const report = page.getByRole('article', { name: 'Report' });
  await expect(report).toBeVisible({ timeout: LONG_MS });
  await expect(report).toContainText('site 1.5–99');
  await expect(report).toContainText(`reference of this site: fasting of 4–6 min`);
  await expect(report).not.toContainText(/abnormal/i);
  await press(page, 'Shift+R');

  await press(page, 'F8');
  await dialog.getByRole('button', { name: 'Remove from this browser' }).click();
  await expect(dialog).toContainText('None come with the program');
  await expect(dialog.getByRole('table')).toBeHidden();
  expect(await page.evaluate(() => localStorage.getItem('bicadence.site-reference'))).toBeNull();
  expectNoTroubles(page);
  await page.context().close();
});
