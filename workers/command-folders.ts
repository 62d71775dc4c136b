import { basename, extname } from 'node:path';

/**
 * A folder's name for each study: the file's name without its ending, or a number alone where results go out without
 * identity. Names that some file system would take for the same (case, a number put behind) are told apart by a number.
 */
export function folderNames(paths: readonly string[], withoutIdentity: boolean): readonly string[] {
  if (withoutIdentity) return paths.map((_, i) => `study-${i + 1}`);
  const used = new Set<string>();
  return paths.map((path) => {
    const own = basename(path, extname(path));
    let name = own;
    for (let count = 2; used.has(name.toLowerCase()); count += 1) name = `${own}-${count}`;
    used.add(name.toLowerCase());
    return name;
  });
}
