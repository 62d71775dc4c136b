import { spawnSync } from 'node:child_process';
import { expect, test } from 'playwright/test';
import { dialogOf, expectNoTroubles, freshPage, LONG_MS, openStudy } from './support';

/** Id, expected, got and outcome of every line that the command line prints. */
function printed(): { status: number | null; lines: readonly (readonly string[])[] } {
  const { status, stdout } = spawnSync('node', ['workers/dist/analyse.mjs', '--self-check'], {
    encoding: 'utf8',
  });
  const lines = stdout.split('\n').flatMap((line) => {
    const found = /^(pass|FAIL) {2}(CV-\w+) .* \| expected: (.*) \| got: (.*) \| [^|]*$/.exec(line);
    return found ? [[found[2], found[3], found[4], found[1]]] : [];
  });
  return { status, lines };
}

test('the self-check passes in the browser without a study, with the digits of the command line', async ({
  browser,
}) => {
  const page = await freshPage(browser);
  await page.getByRole('button', { name: 'Help' }).click();
  await page.getByRole('button', { name: /^Self-check of the program/ }).click();
  const dialog = dialogOf(page, 'Self-check');
  await expect(dialog.getByRole('status')).toContainText(/\d+ checks: \d+ passed, 0 failed/, {
    timeout: LONG_MS,
  });
  await expect(dialog.getByRole('navigation')).toBeHidden();

  const command = printed();
  expect(command.status).toBe(0);
  expect(command.lines.length).toBeGreaterThan(60);
  const rows = await dialog
    .getByRole('row')
    .evaluateAll((all) =>
      all.slice(1).map((row) => [...row.children].map((cell) => cell.textContent ?? '')),
    );
  expect(rows.map(([id, , expected, got, , outcome]) => [id, expected, got, outcome])).toEqual(
    command.lines,
  );
  expectNoTroubles(page);
  await page.context().close();
});

test('leaving the self-check stops it, and the open study goes on', async ({ browser }) => {
  const page = await freshPage(browser);
  await openStudy(page);
  await page.keyboard.press('Shift+Y');
  const dialog = dialogOf(page, 'Evidence');
  await expect(dialog.getByRole('status')).toContainText(/^Checking CV-/);
  await page.keyboard.press('Escape');
  await expect(dialog).toBeHidden();
  await expect(page.locator('html')).toHaveAttribute('data-idle', 'true', { timeout: LONG_MS });
  expectNoTroubles(page);
  await page.context().close();
});
