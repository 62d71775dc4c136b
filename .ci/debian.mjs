import { execFileSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';

/** Installs Debian packages where that may be done unasked: as root, or where CI is set. False where it may not. Throws Error where it fails. */
export function installOnDebian(packages) {
  const root = process.getuid?.() === 0;
  if (!isDebian() || !(root || process.env.CI)) return false;
  const before = root ? [] : ['sudo', '-n'];
  run([...before, 'apt-get', 'update', '-qq']);
  run([...before, 'apt-get', 'install', '-y', '-qq', '--no-install-recommends', ...packages]);
  return true;
}

function isDebian() {
  if (!existsSync('/etc/os-release')) return false;
  return /^ID=debian$/m.test(readFileSync('/etc/os-release', 'utf8'));
}

/** Runs a command, shown first, without questions. Throws Error where it fails. */
export function run([command, ...words]) {
  console.log(`> ${[command, ...words].join(' ')}`);
  execFileSync(command, words, {
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
  });
}
