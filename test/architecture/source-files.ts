import { readdirSync, readFileSync } from 'node:fs';
import { join, relative, sep } from 'node:path';
import { parseSync } from 'vite';

/** The root of the repository. */
export const ROOT = join(import.meta.dirname, '..', '..');

/** A source file: its path from the root with forward slashes, and its text. */
export interface SourceFile {
  readonly path: string;
  readonly text: string;
}

/** All TypeScript sources below folders of the root, built files left out. */
export function sourcesIn(folders: readonly string[]): SourceFile[] {
  return folders.flatMap((folder) =>
    readdirSync(join(ROOT, folder), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && /\.tsx?$/.test(entry.name))
      .map((entry) => join(entry.parentPath, entry.name))
      .filter((path) => !path.split(sep).includes('dist'))
      .map((path) => ({
        path: relative(ROOT, path).split(sep).join('/'),
        text: readFileSync(path, 'utf8'),
      }))
      .sort((a, b) => (a.path < b.path ? -1 : 1)),
  );
}

/** A node of the syntax tree, with whatever properties it has. */
export type Node = { readonly type: string; readonly start: number } & Readonly<
  Record<string, unknown>
>;

export function isNode(value: unknown): value is Node {
  return typeof value === 'object' && value !== null && 'type' in value && 'start' in value;
}

/** Calls `visit` on every node of a file, with the node above it. Throws where it does not parse. */
export function visitNodes(
  file: SourceFile,
  visit: (node: Node, above: Node | null) => void,
): void {
  const { program, errors } = parseSync(file.path, file.text);
  if (errors.length > 0) throw new Error(`${file.path} does not parse: ${errors[0].message}`);
  const walk = (value: unknown, above: Node | null): void => {
    if (Array.isArray(value)) {
      for (const item of value) walk(item, above);
    } else if (isNode(value)) {
      visit(value, above);
      for (const child of Object.values(value)) walk(child, value);
    }
  };
  walk(program, null);
}

/** "path:line" of a place in a file. */
export function placeIn(file: SourceFile, start: number): string {
  return `${file.path}:${file.text.slice(0, start).split('\n').length}`;
}
