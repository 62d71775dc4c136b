// The README's test command: types, lint, unit and reference tests, the build, the browser tests; last line the counts.
import { spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { findOrGetBrowser } from '../e2e/browser.mjs';
import { getEdflib } from '../test/fixtures/edflib/get.mjs';

const CACHE = 'node_modules/.cache';
const UNIT_RESULTS = `${CACHE}/unit-results.json`;
const BROWSER_RESULTS = `${CACHE}/e2e-results.json`;

let passed = 0;
let failed = 0;

function run(title, command, args) {
  console.log(`\n== ${title}`);
  const { status } = spawnSync(command, args, { stdio: ['ignore', 'inherit', 'inherit'] });
  return status === 0;
}

function step(title, command, args) {
  if (run(title, command, args)) passed += 1;
  else failed += 1;
}

function counted(title, command, args, file, count) {
  rmSync(file, { force: true });
  const ok = run(title, command, args);
  try {
    const counts = count(JSON.parse(readFileSync(file, 'utf8')));
    passed += counts.passed;
    failed += counts.failed;
    if (!ok && counts.failed === 0) failed += 1;
  } catch {
    console.error(`${title}: no results were written.`);
    failed += 1;
  }
}

mkdirSync(CACHE, { recursive: true });
for (const project of ['src', 'workers', 'workers/tsconfig.node.json', 'test', 'e2e'])
  step(`types of ${project}`, 'npx', ['tsc', '-p', project]);
step('lint and format', 'npx', ['biome', 'check', '--error-on-warnings', '.']);
getEdflib();
counted(
  'unit and reference tests',
  'npx',
  ['vitest', 'run', '--reporter=default', '--reporter=json', `--outputFile.json=${UNIT_RESULTS}`],
  UNIT_RESULTS,
  (results) => ({ passed: results.numPassedTests, failed: results.numFailedTests }),
);
step('build', 'npm', ['run', '--silent', 'build']);
if (findOrGetBrowser())
  counted(
    'browser tests',
    'npx',
    ['playwright', 'test', '-c', 'e2e'],
    BROWSER_RESULTS,
    ({ stats }) => {
      if (stats.flaky > 0)
        console.log(`${stats.flaky} browser tests passed only when tried again.`);
      return { passed: stats.expected + stats.flaky, failed: stats.unexpected };
    },
  );
else failed += 1;

console.log(`\n${passed} passed, ${failed} failed`);
process.exitCode = failed === 0 ? 0 : 1;
