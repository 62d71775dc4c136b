import { posix } from 'node:path';
import { describe, expect, it } from 'vitest';
import { IMPORT_RULES, type ImportRule } from './import-rules';
import { isNode, type Node, placeIn, type SourceFile, sourcesIn, visitNodes } from './source-files';

/** One import of a file: what it names, resolved from the root if relative, and whether it is of types. */
interface Import {
  readonly place: string;
  readonly target: string;
  readonly relative: boolean;
  readonly typeOnly: boolean;
}

/** True where nothing of an import or export statement is left when types are erased. */
function isTypeOnly(node: Node): boolean {
  if (node.type === 'TSImportType') return true;
  if (node.importKind === 'type' || node.exportKind === 'type') return true;
  const { specifiers } = node;
  return (
    Array.isArray(specifiers) &&
    specifiers.length > 0 &&
    specifiers.every((one) => one.importKind === 'type' || one.exportKind === 'type')
  );
}

function importsOf(file: SourceFile): Import[] {
  const found: Import[] = [];
  visitNodes(file, (node) => {
    if (!/^(Import|Export|TSImport)/.test(node.type) || !isNode(node.source)) return;
    const name = node.source.value;
    if (typeof name !== 'string')
      throw new Error(`${placeIn(file, node.start)} imports what is only known when it runs`);
    const relative = name.startsWith('.');
    const target = relative ? posix.join(posix.dirname(file.path), name) : name;
    found.push({ place: placeIn(file, node.start), target, relative, typeOnly: isTypeOnly(node) });
  });
  return found;
}

/** A package may be named whole, or as all that starts so where the rule ends in a star. */
function isOneOf(name: string, packages: readonly string[]): boolean {
  return packages.some((one) =>
    one.endsWith('*') ? name.startsWith(one.slice(0, -1)) : name === one,
  );
}

function isAllowed(rule: ImportRule, { target, relative, typeOnly }: Import): boolean {
  if (!relative) return isOneOf(target, rule.packages ?? []);
  const startsWithOne = (parts: readonly string[]) => parts.some((part) => target.startsWith(part));
  if (target.startsWith(rule.part) || startsWithOne(rule.uses)) return true;
  return typeOnly && startsWithOne(rule.types ?? []);
}

function faultsOf(file: SourceFile): string[] {
  const rule = IMPORT_RULES.find(({ part }) => file.path.startsWith(part));
  if (!rule) return [`${file.path} belongs to no part of the table`];
  return importsOf(file)
    .filter((one) => !isAllowed(rule, one))
    .map(({ place, target, typeOnly }) => `${place} imports ${typeOnly ? 'type ' : ''}${target}`);
}

const planted = (path: string, text: string) => faultsOf({ path, text });

describe('who imports whom', () => {
  it('is as the table says, over all of src and workers', () => {
    expect(sourcesIn(['src', 'workers']).flatMap(faultsOf)).toEqual([]);
  });

  it.each([
    ['src/heart/a.ts', "import { x } from '../stomach/b';", 'imports src/stomach/b'],
    ['src/heart/a.ts', "import type { X } from '../stomach/b';", 'imports type src/stomach/b'],
    ['src/numeric/a.ts', "export * from '../recording/beat';", 'imports src/recording/beat'],
    ['src/review/a.tsx', "const b = import('../separate/band');", 'imports src/separate/band'],
    ['src/review/a.tsx', "let b: import('../heart/b').B;", 'imports type src/heart/b'],
    ['src/report/a.tsx', "import { x } from '../app/shell';", 'imports src/app/shell'],
    ['src/session/a.ts', "import { useState } from 'react';", 'imports react'],
    ['src/report/a.tsx', "import uPlot from 'uplot';", 'imports uplot'],
    ['src/heart/a.ts', "import FFT from 'fft.js';", 'imports fft.js'],
    ['src/app/a.ts', "import { x } from '../../workers/pipeline';", 'imports workers/pipeline'],
    [
      'src/app/a.ts',
      "import { type T, x } from '../../workers/analysis-api';",
      'imports workers/analysis-api',
    ],
    ['workers/analyse.ts', "import { x } from '../src/heart/b';", 'imports src/heart/b'],
    ['workers/analysis.worker.ts', "import '../src/app/shell';", 'imports src/app/shell'],
  ])('in %s refuses %j', (path, text, wanted) => {
    expect(planted(path, text)).toEqual([`${path}:1 ${wanted}`]);
  });

  it.each([
    ['src/heart/a.ts', "import { sin } from '../numeric/elementary'; import { b } from './b';"],
    ['src/review/a.ts', "import type { T } from '../../workers/analysis-api';"],
    ['src/review/a.ts', "import { type T, type U } from '../../workers/analysis-api';"],
    ['src/app/a.ts', "import { connect } from '../../workers/analysis-client';"],
    ['workers/pipeline.ts', "import { x } from '../src/heart/b'; import './job';"],
  ])('in %s allows %j', (path, text) => {
    expect(planted(path, text)).toEqual([]);
  });

  it('refuses files that stand outside every part', () => {
    expect(planted('src/helpers/a.ts', '')).toEqual([
      'src/helpers/a.ts belongs to no part of the table',
    ]);
  });
});
