import type { KeptReference } from '../recording/site-reference';
import type { ShellStore } from './shell-store';

const KEY = 'bicadence.site-reference';

/** The file's own text and name, as kept in this browser. */
export interface KeptText {
  readonly fileName: string;
  readonly text: string;
}

/** Takes the site's reference values, if this browser keeps any, into use; the reader is fetched only then. */
export async function recallReference(shell: ShellStore, storage: Storage | null): Promise<void> {
  const kept = keptText(storage);
  if (!kept) return;
  const { readSiteReference } = await import('../session/read-site-reference');
  const read = readSiteReference(kept.text);
  if (!read.ok) return;
  shell.setState({ siteReference: { fileName: kept.fileName, reference: read.reference } });
}

/** Null where nothing, or nothing sensible, is kept or storage is out of reach. */
function keptText(storage: Storage | null): KeptText | null {
  try {
    const kept: unknown = JSON.parse(storage?.getItem(KEY) ?? 'null');
    if (typeof kept !== 'object' || kept === null) return null;
    const { fileName, text } = kept as Record<string, unknown>;
    return typeof fileName === 'string' && typeof text === 'string' ? { fileName, text } : null;
  } catch {
    return null;
  }
}

/** Takes reference values into use and keeps them in this browser; false where they are lost when the page is closed. */
export function keepReference(
  shell: ShellStore,
  storage: Storage | null,
  kept: KeptReference,
  text: string,
): boolean {
  shell.setState({ siteReference: kept });
  try {
    if (!storage) return false;
    storage.setItem(KEY, JSON.stringify({ fileName: kept.fileName, text } satisfies KeptText));
    return true;
  } catch {
    return false;
  }
}

/** Takes them out of use and out of this browser. */
export function dropReference(shell: ShellStore, storage: Storage | null): void {
  shell.setState({ siteReference: null });
  try {
    storage?.removeItem(KEY);
  } catch {
    return;
  }
}
