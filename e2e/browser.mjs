import { existsSync } from 'node:fs';
import { chromium } from 'playwright';
import { installOnDebian, run } from '../.ci/debian.mjs';

const PLACES = ['/usr/bin/chromium', '/usr/bin/chromium-browser-stable', '/snap/bin/chromium'];

/** Flags that keep a test browser quiet on a closed network and able to start as root. */
export const BROWSER_FLAGS = [
  '--no-sandbox',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--no-first-run',
];

/** Path of a browser on this machine, or null. CHROMIUM names one of your own. */
export function findBrowser() {
  const own = chromium.executablePath();
  return [process.env.CHROMIUM, ...PLACES, own].find((path) => path && existsSync(path)) ?? null;
}

/** A browser, fetched where that may be done unasked; null with one line said where it may not or cannot. */
export function findOrGetBrowser() {
  const found = findBrowser();
  if (found) return found;
  try {
    if (!installOnDebian(['chromium'])) {
      const withDeps = process.getuid?.() === 0 ? ['--with-deps'] : [];
      run(['npx', 'playwright', 'install', ...withDeps, 'chromium']);
    }
  } catch (error) {
    console.error(String(error instanceof Error ? error.message : error).split('\n')[0]);
  }
  const fetched = findBrowser();
  if (!fetched)
    console.error(
      'No browser for the browser tests: install one (Debian: sudo apt-get install chromium; elsewhere: npx playwright install chromium) or set CHROMIUM to its path.',
    );
  return fetched;
}
