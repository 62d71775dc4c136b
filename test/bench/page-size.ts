import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { gzipSync } from 'node:zlib';
import type { Bench, Measured, Part } from './measured';
import { pathOf } from './places';

const PART = 'page size';
const ENTRY = 'index.html';

/** What the page fetches by itself once the first figures stand, by the names of its chunks. */
const BY_ITSELF = /^(pipeline-doubts|doubts-pane)-.*\.(js|css)$/;

/** Files that a built file makes the browser load at once; what `import()` brings later is left out. */
function loadedBy(text: string, file: string): readonly string[] {
  const beside = dirname(file);
  if (file.endsWith('.html'))
    return [...text.matchAll(/(?:src|href)="(\.?\/?[^":]+)"/g)].map(([, path]) => join(path));
  if (!file.endsWith('.js')) return [];
  const imports = [...text.matchAll(/(?:\bfrom|\bimport)\s*["'`](\.\/[^"'`]+)["'`]/g)];
  const workers = [...text.matchAll(/["'`]\.?\/?(assets\/[^"'`]+\.worker[^"'`]*\.js)["'`]/g)];
  const besideWorkers = [...text.matchAll(/["'`](?:\.\/)?([^"'`/]+\.worker-[^"'`]*\.js)["'`]/g)];
  return [
    ...imports.map(([, path]) => join(beside, path)),
    ...workers.map(([, path]) => path),
    ...besideWorkers.map(([, path]) => join(beside, path)),
  ];
}

/** Everything the page has loaded once a study is open, by its path in the built folder. */
function loadedFiles(folder: string): readonly string[] {
  const found = new Set([ENTRY]);
  const assets = readdirSync(join(folder, 'assets'));
  for (const file of assets.filter((name) => BY_ITSELF.test(name))) found.add(`assets/${file}`);
  for (const file of found)
    for (const next of loadedBy(readFileSync(join(folder, file), 'utf8'), file))
      if (existsSync(join(folder, next))) found.add(next);
  return [...found];
}

/** What comes over the wire before the report is opened and before a person asks for more: page, styles, workers, doubts. */
export const pageSize: Part = async (_: Bench): Promise<readonly Measured[]> => {
  const folder = pathOf('dist');
  const files = loadedFiles(folder).map((file) => ({
    file,
    kB: gzipSync(readFileSync(join(folder, file))).length / 1000,
    rawKB: statSync(join(folder, file)).size / 1000,
  }));
  const line = (what: string, kB: number, rawKB: number, budget = ''): Measured => ({
    part: PART,
    what,
    value: kB,
    unit: 'kB',
    decimals: 1,
    budget,
    note: `gzip; ${Math.round(rawKB)} kB unpacked`,
  });
  const sum = (key: 'kB' | 'rawKB') => files.reduce((all, one) => all + one[key], 0);
  const name = (file: string) => file.replace(/^assets\//, '').replace(/-[\w-]{8}\./, '.');
  return [
    line('before the report is opened', sum('kB'), sum('rawKB'), 'at most 250'),
    ...files.map(({ file, kB, rawKB }) => line(`of that ${name(file)}`, kB, rawKB)),
  ];
};
