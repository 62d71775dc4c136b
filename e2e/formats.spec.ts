import { readFileSync } from 'node:fs';
import { expect, type Page, test } from 'playwright/test';
import {
  agree,
  allFigures,
  bar,
  chooseFile,
  dialogOf,
  expectNoTroubles,
  findings,
  freshPage,
  goTo,
  IDENTITY,
  openStudy,
  STEADY,
  told,
} from './support';
import { dropFile, type GivenFile, of24Bit, timedText, withGap } from './support-files';

const EDF_RATES = STEADY.replace('steady/steady.edf', 'record208/record208-rates.edf');
const plain = (path: string, name: string): GivenFile => ({
  name,
  mimeType: 'application/octet-stream',
  buffer: readFileSync(path),
});

const FORMATS: readonly (readonly [string, () => GivenFile])[] = [
  ['EDF', () => plain(EDF_RATES, 'rates.edf')],
  ['EDF+C', () => plain(STEADY, 'steady.edf')],
  ['EDF+D', withGap],
  ['BDF+C', of24Bit],
  ['delimited text', () => timedText('belly.csv', 'uV', 1)],
];

const WAYS: readonly (readonly [string, (page: Page, file: GivenFile) => Promise<void>])[] = [
  ['by choice', chooseFile],
  ['by drop', dropFile],
];

for (const [format, file] of FORMATS)
  for (const [way, give] of WAYS)
    test(`a file of format ${format} opens ${way}`, async ({ browser }) => {
      const page = await freshPage(browser);
      await give(page, file());
      await expect(dialogOf(page, IDENTITY)).toContainText(format);
      await agree(page, 'ZZ-31');
      await expect(bar(page)).toContainText('ZZ-31');
      expectNoTroubles(page);
      await page.context().close();
    });

test('24-bit samples give the figures of the same samples with 16 bits', async ({ browser }) => {
  const page = await freshPage(browser);
  await openStudy(page, plain(STEADY, 'steady.edf'), 'ZZ-31');
  const narrow = await allFigures(page);
  await page.context().close();
  const other = await freshPage(browser);
  await openStudy(other, of24Bit(), 'ZZ-31');
  expect(await allFigures(other)).toEqual(narrow);
  await other.context().close();
});

test('the gap of a recording that was stopped stays a gap: named, shown, without beats', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  await chooseFile(page, withGap());
  const dialog = dialogOf(page, IDENTITY);
  await expect(dialog).toContainText('1 stretch without samples, 30 s in all');
  await expect(dialog).toContainText('0:05:00');
  await agree(page, 'ZZ-31');
  await expect(findings(page)).toContainText('Spoiled spans 1 proposed');
  await goTo(page, '0:02:15');
  expect(await told(page, 'Seconds')).toMatch(/recorded: nothing recorded here/);
  await page.context().close();
});
