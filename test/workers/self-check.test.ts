import { execFile } from 'node:child_process';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { build } from 'vite';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { checkCount, failedChecks } from '../../src/recording/self-check';
import {
  ARITHMETIC,
  type CheckValue,
  EXACT,
  runCheck,
  within,
  withinShare,
} from '../../workers/check-value';
import { isSelfCheck, selfCheckText } from '../../workers/command-self-check';
import { startJob } from '../../workers/job';
import { createPipeline } from '../../workers/pipeline';
import { allChecks, LEFT_OUT, runChecks } from '../../workers/pipeline-self-check';

/** Ids of the project's list of check values (field notes, section 10). */
const LIST = [
  ...['01', '02', '03', '04', '05', '06', '07', '08', '08b', '08c', '08d', '08e', '08f', '09'],
  ...['10', '11', '12', '13', '14', '15', '16', '17', '18', '19', '20', '21', '22', '23', '23b'],
  ...['24', '25', '26', '27', '28', '29', '30', '31', '32', '33', '34', '35', '36', '37', '38'],
  ...['39', '45', '46', '47', '48', '49', '50', '51', '52', '53', '54', '55', '56', '57', '58'],
  ...['59', '60', '61', '62'],
].map((number) => `CV-${number}`);

const { job } = startJob(() => undefined);
const check = (parts: Partial<CheckValue>): CheckValue => ({
  id: 'CV-00',
  what: 'a sum',
  source: ARITHMETIC,
  expected: [4],
  tolerance: EXACT,
  got: () => [2 + 2],
  ...parts,
});

describe('the list of check values', () => {
  it('is run, each of it, or named as left out with the reason', () => {
    const run = new Set(allChecks(createPipeline).map(({ id }) => id));
    const left = LEFT_OUT.flatMap(({ ids }) => ids);
    for (const id of LIST) expect(run.has(id) !== left.includes(id), id).toBe(true);
    expect([...run, ...left].filter((id) => !LIST.includes(id))).toEqual([]);
    for (const { why } of LEFT_OUT) expect(why).toMatch(/\w+ \w+/);
  });

  it('names a source and a tolerance beside each, and tells each line from the others', () => {
    const checks = allChecks(createPipeline);
    for (const { id, what, source } of checks) {
      expect(source, id).toMatch(/\w/);
      expect(what, id).toMatch(/\w/);
    }
    expect(new Set(checks.map(({ id, what }) => `${id} ${what}`)).size).toBe(checks.length);
  });
});

describe('one check', () => {
  it('passes within its tolerance and fails beyond it', async () => {
    const pass = async (parts: Partial<CheckValue>) => (await runCheck(check(parts), job)).passed;
    expect(await pass({})).toBe(true);
    expect(await pass({ expected: [4.001] })).toBe(false);
    expect(await pass({ expected: [4.001], tolerance: within(0.002) })).toBe(true);
    expect(await pass({ expected: [4.003], tolerance: within(0.002) })).toBe(false);
    expect(await pass({ expected: [4.01], tolerance: withinShare(0.005) })).toBe(true);
    expect(await pass({ expected: [4.05], tolerance: withinShare(0.005) })).toBe(false);
  });

  it('fails on another count of values, on no number and on other words', async () => {
    const pass = async (parts: Partial<CheckValue>) => (await runCheck(check(parts), job)).passed;
    expect(await pass({ got: () => [4, 4] })).toBe(false);
    expect(await pass({ got: () => [] })).toBe(false);
    expect(await pass({ got: () => [Number.NaN], tolerance: within(9) })).toBe(false);
    expect(await pass({ expected: ['normo'], got: () => ['tachy'] })).toBe(false);
    expect(await pass({ got: () => ['4'] })).toBe(false);
  });

  it('that throws has failed with the error’s words, and the ones after it still run', async () => {
    const breaks = check({
      got: () => {
        throw new Error('no peak');
      },
    });
    const { lines } = await runChecks([breaks, check({})], job);
    expect(lines.map(({ passed }) => passed)).toEqual([false, true]);
    expect(lines[0].got).toBe('error: no peak');
  });

  it('is not counted as failed by a stop, which ends the whole run', async () => {
    const stopped = startJob(() => undefined);
    stopped.cancel();
    await expect(runChecks([check({})], stopped.job)).rejects.toMatchObject({
      failure: { kind: 'cancelled' },
    });
  });
});

describe('what is printed', () => {
  it('is a line a check with source, expected, got, tolerance and outcome, and a count', async () => {
    const result = await runChecks([check({}), check({ expected: [5], what: 'a wrong sum' })], job);
    const lines = selfCheckText(result).split('\n');
    expect(lines[0]).toBe(
      'pass  CV-00  a sum | source: arithmetic from the definition | expected: 4 | got: 4 | exact',
    );
    expect(lines[1]).toMatch(/^FAIL {2}CV-00 {2}a wrong sum .* expected: 5 \| got: 4/);
    expect(lines.at(-2)).toBe('2 checks: 1 passed, 1 failed');
    expect(failedChecks(result)).toBe(1);
    expect(checkCount(result)).toBe('2 checks: 1 passed, 1 failed');
  });

  it('is asked for alone', () => {
    expect(isSelfCheck(['--self-check'])).toBe(true);
    expect(isSelfCheck(['study.edf'])).toBe(false);
    expect(() => isSelfCheck(['--self-check', 'study.edf'])).toThrow('goes alone');
  });
});

describe('the command as it is built', () => {
  // Below node_modules, where the built command finds its packages.
  mkdirSync('node_modules/.cache', { recursive: true });
  const folder = mkdtempSync('node_modules/.cache/self-check-');
  const run = async () => {
    try {
      const { stdout } = await promisify(execFile)('node', [
        join(folder, 'analyse.mjs'),
        '--self-check',
      ]);
      return { status: 0, stdout };
    } catch (error) {
      const { code, stdout } = error as { code: number; stdout: string };
      return { status: code, stdout };
    }
  };

  beforeAll(async () => {
    await build({
      mode: 'node',
      logLevel: 'error',
      build: {
        outDir: folder,
        emptyOutDir: true,
        rollupOptions: { input: { analyse: 'workers/analyse.ts' } },
      },
    });
  }, 60_000);
  afterAll(() => rmSync(folder, { recursive: true }));

  it('passes every check on this machine and ends with status 0; with one expected value broken it prints FAIL and ends with 1', async () => {
    const whole = await run();
    expect(whole.stdout).not.toContain('FAIL');
    expect(whole.stdout).toMatch(/\n\d+ checks: \d+ passed, 0 failed\n$/);
    expect(whole.status).toBe(0);

    const chunk = join(folder, 'chunks', 'pipeline-self-check.mjs');
    const code = readFileSync(chunk, 'utf8');
    expect(code).toContain('42.485');
    writeFileSync(chunk, code.replace('42.485', '42.495'));
    const broken = await run();
    expect(broken.stdout.match(/^FAIL.*$/gm)).toEqual([expect.stringContaining('CV-23 ')]);
    expect(broken.stdout).toMatch(/, 1 failed\n$/);
    expect(broken.status).toBe(1);
  }, 300_000);
});
