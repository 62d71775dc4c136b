/** The two stores of the page's browser; null where the browser does not even let one look at it. */
export function browserStores(): {
  readonly indexedDB: IDBFactory | null;
  readonly localStorage: Storage | null;
} {
  const look = <T>(at: () => T | undefined): T | null => {
    try {
      return at() ?? null;
    } catch {
      return null;
    }
  };
  return {
    indexedDB: look(() => globalThis.indexedDB),
    localStorage: look(() => globalThis.localStorage),
  };
}
