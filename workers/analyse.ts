import { mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { bytesOf } from '../src/export/result-file';
import { type StudyOutcome, studiesCsv } from '../src/export/studies-csv';
import { Refusal } from '../src/recording/failure';
import { failedChecks } from '../src/recording/self-check';
import type { SiteReference } from '../src/recording/site-reference';
import { resultFiles } from '../src/report/result-files';
import { resultsWithoutIdentity } from '../src/report/results-without-identity';
import { PROGRAM } from '../src/units/program';
import { folderNames } from './command-folders';
import { type AnalyseRequest, parseArguments, USAGE, WrongArguments } from './command-line';
import { isSelfCheck, selfCheckText } from './command-self-check';
import { analyseStudy, referenceIn } from './command-study';
import { startJob } from './job';
import { selfCheck } from './pipeline';

function reasonOf(error: unknown): string {
  if (!(error instanceof Refusal)) return error instanceof Error ? error.message : String(error);
  const { message, place, remedy } = error.failure;
  return [message, place ? `(${place})` : '', remedy].filter((part) => part !== '').join(' ');
}

/** Analyses one study and writes its files; what went wrong is told and belongs to that study alone. */
async function outcomeOf(
  path: string,
  name: string,
  folder: string,
  request: AnalyseRequest,
  siteReference: SiteReference | null,
): Promise<StudyOutcome> {
  const { withoutIdentity } = request;
  try {
    const all = await analyseStudy(path, request, siteReference);
    const input = withoutIdentity ? resultsWithoutIdentity(all) : all;
    await mkdir(folder, { recursive: true });
    for (const file of resultFiles(input)) await writeFile(join(folder, file.name), bytesOf(file));
    process.stdout.write(`${path}: written to ${folder}\n`);
    return { kind: 'analysed', folder: name, input };
  } catch (error) {
    if (error instanceof WrongArguments) throw error;
    const reason = reasonOf(error);
    process.stderr.write(`${path}: ${reason}\n`);
    const told = withoutIdentity ? 'not analysed; the reason stood on standard error' : reason;
    return { kind: 'failed', folder: name, reason: told };
  }
}

/** Prints every check value with what this machine made of it; 1 where one failed. */
async function printSelfCheck(): Promise<number> {
  const check = await selfCheck(startJob(() => undefined).job);
  process.stdout.write(`${PROGRAM}\n${selfCheckText(check)}`);
  return failedChecks(check) > 0 ? 1 : 0;
}

async function main(words: readonly string[]): Promise<number> {
  if (isSelfCheck(words)) return printSelfCheck();
  const request = parseArguments(words);
  const { studies, out, withoutIdentity } = request;
  const several = studies.length > 1;
  const siteReference = await referenceIn(request.reference);
  const names = folderNames(studies, withoutIdentity);
  const outcomes: StudyOutcome[] = [];
  for (const [i, path] of studies.entries()) {
    const folder = several ? join(out, names[i]) : out;
    outcomes.push(await outcomeOf(path, names[i], folder, request, siteReference));
  }
  if (several) {
    await mkdir(out, { recursive: true });
    await writeFile(join(out, 'studies.csv'), studiesCsv(outcomes));
  }
  return outcomes.some(({ kind }) => kind === 'failed') ? 1 : 0;
}

try {
  process.exitCode = await main(process.argv.slice(2));
} catch (error) {
  process.stderr.write(`${reasonOf(error)}\n`);
  if (error instanceof WrongArguments) process.stderr.write(`\n${USAGE}\n`);
  process.exitCode = error instanceof WrongArguments ? 2 : 1;
}
