import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { accuracy } from './accuracy/accuracy';
import { evidence } from './accuracy/evidence';
import { heartbeats } from './accuracy/heartbeats';
import { brokenFiles } from './broken-files';
import { detection } from './detection';
import { doubts } from './doubts/doubts';
import { loadWords, machineFacts } from './machine';
import { maps } from './maps';
import type { Bench, Measured, Part } from './measured';
import { opening } from './opening';
import { pageSize } from './page-size';
import { pipeline } from './pipeline';
import { planted } from './planted/planted';
import { ranges } from './ranges/ranges';
import { separation } from './separation';
import { markdownTable, plainTable } from './table';

const PARTS: Readonly<Record<string, Part>> = {
  separation,
  maps,
  detection,
  pipeline,
  opening,
  'page-size': pageSize,
  accuracy,
  evidence,
  heartbeats,
  doubts,
  'broken-files': brokenFiles,
  planted,
  ranges,
};

const USAGE = `npm run bench -- [PART]... [--minutes N] [--markdown]
  PART       ${Object.keys(PARTS).join(', ')}; all of them unless named
  --minutes  length of the invented study; 60 unless given, the budgets are for 60
  --markdown the table as Markdown
`;

interface Asked {
  readonly parts: readonly string[];
  readonly minutes: number;
  readonly markdown: boolean;
}

/** What the command line asks for, or null where it cannot be understood. */
function asked(): Asked | null {
  try {
    const { values, positionals } = parseArgs({
      allowPositionals: true,
      options: { minutes: { type: 'string' }, markdown: { type: 'boolean' } },
    });
    const minutes = Number(values.minutes ?? 60);
    const known = positionals.every((name) => Object.hasOwn(PARTS, name));
    if (!known || !Number.isInteger(minutes) || minutes < 6 || minutes > 1440) return null;
    const parts = positionals.length > 0 ? positionals : Object.keys(PARTS);
    return { parts, minutes, markdown: values.markdown ?? false };
  } catch {
    return null;
  }
}

const say = (line: string) => process.stdout.write(`${line}\n`);

async function measure({ parts, minutes }: Asked, folder: string): Promise<readonly Measured[]> {
  const bench: Bench = { minutes, folder, say };
  const rows: Measured[] = [];
  for (const name of parts) {
    say(`${name} (${loadWords()}) ...`);
    try {
      rows.push(...(await PARTS[name](bench)));
    } catch (error) {
      process.stderr.write(`${name} failed: ${error instanceof Error ? error.stack : error}\n`);
      process.exitCode = 1;
    }
  }
  return rows;
}

const wanted = asked();
if (wanted) {
  const folder = await mkdtemp(join(tmpdir(), 'bicadence-bench-'));
  try {
    say(`Invented study of ${wanted.minutes} min, 1 kHz, 4 channels. ${machineFacts()}`);
    const rows = await measure(wanted, folder);
    say(`\n${wanted.markdown ? markdownTable(rows) : plainTable(rows)}`);
    say(`\n${machineFacts()} at the end`);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
} else {
  process.stderr.write(USAGE);
  process.exitCode = 2;
}
