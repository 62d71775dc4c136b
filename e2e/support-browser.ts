import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { chromium, type Page } from 'playwright/test';
import { BROWSER_FLAGS, findBrowser } from './browser.mjs';

/** A browser of its own on a profile that outlives it, so that it can be killed as a power cut would. */
export interface OwnBrowser {
  readonly page: Page;
  /** Ends all of its processes at once, without a chance to write anything. */
  kill(): Promise<void>;
}

/** Starts a browser on a profile's folder and opens the page. */
export async function startOwnBrowser(profile: string, url: string): Promise<OwnBrowser> {
  const path = findBrowser();
  if (!path) throw new Error('no browser for the browser tests');
  const flags = ['--headless=new', '--remote-debugging-port=0', `--user-data-dir=${profile}`];
  const child = spawn(path, [...BROWSER_FLAGS, ...flags, 'about:blank'], {
    detached: true,
    stdio: ['ignore', 'ignore', 'pipe'],
  });
  const browser = await chromium.connectOverCDP(await addressOf(child));
  const [context] = browser.contexts();
  const page = await context.newPage();
  await page.setViewportSize({ width: 1280, height: 720 });
  await page.goto(url);
  return {
    page,
    async kill() {
      const gone = once(child, 'exit');
      if (child.pid !== undefined) process.kill(-child.pid, 'SIGKILL');
      await gone;
      await browser.close().catch(() => undefined);
    },
  };
}

/** Where a started browser listens, as it says on its standard error. */
async function addressOf(child: ChildProcess): Promise<string> {
  let said = '';
  for await (const chunk of child.stderr ?? []) {
    said += String(chunk);
    const found = /DevTools listening on (ws:\S+)/.exec(said);
    if (found) return found[1];
  }
  throw new Error(`the browser did not start: ${said.slice(-400)}`);
}
