import { describe, expect, it } from 'vitest';
import { isNode, type Node, placeIn, type SourceFile, sourcesIn, visitNodes } from './source-files';

// Engines differ in the last bit of sin, cos, exp, log, pow and atan2 (and so of `**`); those that
// are exact by ECMA-262 or were seen to agree are allowed. The rest comes from numeric/elementary.

const ALLOWED_FUNCTIONS = 'abs min max floor ceil round trunc sign sqrt hypot fround imul'.split(
  ' ',
);
const CONSTANTS = 'PI E LN2 LN10 LOG2E LOG10E SQRT2 SQRT1_2'.split(' ');
const ALLOWED = new Set([...ALLOWED_FUNCTIONS, ...CONSTANTS]);

function isMath(node: unknown): boolean {
  return isNode(node) && node.type === 'Identifier' && node.name === 'Math';
}

/** What is wrong with a node, or null. */
function fault(node: Node, above: Node | null): string | null {
  if (isMath(node)) {
    if (above?.type === 'MemberExpression' && above.object === node) {
      const { property, computed } = above;
      const name = isNode(property) && !computed ? String(property.name) : null;
      return name !== null && ALLOWED.has(name) ? null : `Math.${name ?? '[...]'}`;
    }
    return 'Math under another name';
  }
  if (node.type === 'BinaryExpression' && node.operator === '**') {
    const { right } = node;
    return isNode(right) && right.type === 'Literal' && right.value === 2
      ? null
      : '** other than 2';
  }
  if (node.type === 'AssignmentExpression' && node.operator === '**=') return '**=';
  return null;
}

function faultsOf(file: SourceFile): string[] {
  const found: string[] = [];
  visitNodes(file, (node, above) => {
    const what = fault(node, above);
    if (what !== null) found.push(`${placeIn(file, node.start)} ${what}`);
  });
  return found;
}

const planted = (text: string) => faultsOf({ path: 'src/planted.ts', text });

describe('the same digits in every engine', () => {
  it('hold: src and workers use no function that engines round differently', () => {
    const sources = sourcesIn(['src', 'workers']);
    expect(sources.map((file) => file.path)).toContain('src/numeric/elementary.ts');
    expect(sources.flatMap(faultsOf)).toEqual([]);
  });

  it.each([
    ['const y = Math.sin(x);', 'src/planted.ts:1 Math.sin'],
    ['\n\nconst y = Math.pow(2, x);', 'src/planted.ts:3 Math.pow'],
    ['const y = Math.random();', 'src/planted.ts:1 Math.random'],
    ['const y = Math["cos"](x);', 'src/planted.ts:1 Math.[...]'],
    ['const { exp } = Math;', 'src/planted.ts:1 Math under another name'],
    ['const m = Math; m.exp(1);', 'src/planted.ts:1 Math under another name'],
    ['const y = 10 ** x;', 'src/planted.ts:1 ** other than 2'],
    ['const y = x ** 3;', 'src/planted.ts:1 ** other than 2'],
    ['let y = 2; y **= 2;', 'src/planted.ts:1 **='],
  ])('would be lost by %j, and that is found', (text, wanted) => {
    expect(planted(text)).toEqual([wanted]);
  });

  it('are kept by squares, roots, constants, comments and words', () => {
    expect(
      planted(
        '/** Math.sin(x) ** 3 */ const y = x ** 2 + Math.sqrt(2) * Math.PI; const s = "Math.cos";',
      ),
    ).toEqual([]);
  });
});
