import { execFileSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { chromium } from 'playwright';

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
  const root = process.getuid?.() === 0;
  try {
    if (isDebian() && root) {
      run('apt-get', ['update', '-qq']);
      run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium']);
    } else if (isDebian() && process.env.CI) {
      run('sudo', ['-n', 'apt-get', 'update', '-qq']);
      run('sudo', ['-n', 'apt-get', 'install', '-y', '-qq', '--no-install-recommends', 'chromium']);
    } else {
      run('npx', ['playwright', 'install', ...(root ? ['--with-deps'] : []), 'chromium']);
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

function isDebian() {
  if (!existsSync('/etc/os-release')) return false;
  return /^ID=debian$/m.test(readFileSync('/etc/os-release', 'utf8'));
}

function run(command, args) {
  console.log(`> ${command} ${args.join(' ')}`);
  execFileSync(command, args, {
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
  });
}
