import type { CheckLeftOut, CheckLine, SelfCheck } from '../src/recording/self-check';
import { type CheckValue, runCheck } from './check-value';
import type { Job } from './job';
import type { Pipeline } from './pipeline';
import { DECODE_CHECKS } from './pipeline-check-decode';
import { FILTER_CHECKS } from './pipeline-check-filters';
import { HEART_CHECKS } from './pipeline-check-heart';
import { separationChecks } from './pipeline-check-separation';
import { SPECTRUM_CHECKS } from './pipeline-check-spectra';
import { STOMACH_CHECKS } from './pipeline-check-stomach';
import { mixtureChecks, sameFiguresChecks } from './pipeline-check-study';

/** Check values of the project's list that no code of the program makes. */
export const LEFT_OUT: readonly CheckLeftOut[] = [
  { ids: ['CV-47'], why: 'scores over several records are counted by the tests and benches only' },
  { ids: ['CV-48'], why: 'the detector has no filter of that kind' },
  { ids: ['CV-53'], why: 'the bound is a yardstick of the tests; no figure is made of it' },
  {
    ids: ['CV-57'],
    why: 'contrast of the themes is computed by a test; the program computes none',
  },
];

/** Every check, in the order of the list. */
export function allChecks(make: () => Pipeline): readonly CheckValue[] {
  const all = [
    ...FILTER_CHECKS,
    ...SPECTRUM_CHECKS,
    ...STOMACH_CHECKS,
    ...HEART_CHECKS,
    ...DECODE_CHECKS,
    ...separationChecks(make),
    ...mixtureChecks(make),
    ...sameFiguresChecks(make),
  ];
  return all
    .map((check, place) => ({ check, place }))
    .sort((a, b) =>
      a.check.id < b.check.id ? -1 : a.check.id > b.check.id ? 1 : a.place - b.place,
    )
    .map(({ check }) => check);
}

/** Runs checks one after the other, in turns with other work. */
export async function runChecks(checks: readonly CheckValue[], job: Job): Promise<SelfCheck> {
  const quiet: Job = { breathe: () => job.breathe(), progress: () => undefined };
  const lines: CheckLine[] = [];
  for (const check of checks) {
    job.progress(`Checking ${check.id}`, lines.length / checks.length);
    await job.breathe();
    lines.push(await runCheck(check, quiet));
  }
  return { lines, leftOut: LEFT_OUT };
}
