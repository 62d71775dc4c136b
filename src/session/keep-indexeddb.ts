import type { KeptHead, KeptLineRow, KeptRows, KeptStore, KeptWrite } from './kept-store';

const DATABASE = 'bicadence';
const VERSION = 1;
const STORES = ['head', 'snapshot', 'journal'] as const;

/**
 * The durable store in IndexedDB: heads and snapshots by quick key, the journal by quick key and line number. Writes ask for
 * strict durability: they are done when they are on disk.
 */
export function indexedDbStore(factory: IDBFactory): KeptStore {
  let opening: Promise<IDBDatabase> | null = null;
  const database = (): Promise<IDBDatabase> => {
    opening ??= open(factory, () => {
      opening = null;
    });
    return opening;
  };
  const writing = async (act: (stores: Stores) => void): Promise<void> => {
    const transaction = (await database()).transaction(STORES, 'readwrite', {
      durability: 'strict',
    });
    act(storesOf(transaction));
    await ended(transaction);
  };
  const reading = async (): Promise<Stores> =>
    storesOf((await database()).transaction(STORES, 'readonly'));

  return {
    heads: async () => result<KeptHead[]>((await reading()).head.getAll()),
    read: async (quickKey) => read(await reading(), quickKey),
    write: async (what) => {
      let written = false;
      await writing((stores) => {
        const there = stores.head.get(what.head.quickKey);
        there.onsuccess = () => {
          written = what.allowed((there.result as KeptHead | undefined) ?? null);
          if (written) put(stores, what);
        };
      });
      return written;
    },
    forget: (quickKey) =>
      writing((stores) => {
        stores.head.delete(quickKey);
        stores.snapshot.delete(quickKey);
        stores.journal.delete(linesOf(quickKey));
      }),
  };
}

type Stores = Readonly<Record<(typeof STORES)[number], IDBObjectStore>>;

const storesOf = (transaction: IDBTransaction): Stores => ({
  head: transaction.objectStore('head'),
  snapshot: transaction.objectStore('snapshot'),
  journal: transaction.objectStore('journal'),
});

/** The journal's keys of one study, through a line. */
const linesOf = (quickKey: string, through = Number.MAX_SAFE_INTEGER) =>
  IDBKeyRange.bound([quickKey, 0], [quickKey, through]);

async function read(stores: Stores, quickKey: string): Promise<KeptRows | null> {
  const [head, snapshot, lines] = await Promise.all([
    result<KeptHead | undefined>(stores.head.get(quickKey)),
    result<KeptRows['snapshot'] | undefined>(stores.snapshot.get(quickKey)),
    result<KeptLineRow[]>(stores.journal.getAll(linesOf(quickKey))),
  ]);
  if (!head || !snapshot) return null;
  return {
    head,
    snapshot: { n: snapshot.n, text: snapshot.text },
    lines: lines.map(({ n, text }) => ({ n, text })),
  };
}

function put(stores: Stores, { head, snapshot, lines }: KeptWrite): void {
  const { quickKey } = head;
  stores.head.put(head);
  for (const line of lines) stores.journal.put({ quickKey, ...line });
  if (snapshot === null) return;
  stores.snapshot.put({ quickKey, n: head.edits, text: snapshot });
  stores.journal.delete(linesOf(quickKey));
}

function open(factory: IDBFactory, closed: () => void): Promise<IDBDatabase> {
  return new Promise((resolve, reject) => {
    const fail = (error: unknown) => {
      closed();
      reject(error);
    };
    const request = factory.open(DATABASE, VERSION);
    request.onupgradeneeded = () => {
      request.result.createObjectStore('head', { keyPath: 'quickKey' });
      request.result.createObjectStore('snapshot', { keyPath: 'quickKey' });
      request.result.createObjectStore('journal', { keyPath: ['quickKey', 'n'] });
    };
    request.onerror = () => fail(request.error);
    request.onblocked = () => fail(new Error('another tab holds an older store open'));
    request.onsuccess = () => {
      const opened = request.result;
      opened.onversionchange = () => {
        opened.close();
        closed();
      };
      opened.onclose = closed;
      resolve(opened);
    };
  });
}

function result<T>(request: IDBRequest): Promise<T> {
  return new Promise((resolve, reject) => {
    request.onsuccess = () => resolve(request.result as T);
    request.onerror = () => reject(request.error);
  });
}

function ended(transaction: IDBTransaction): Promise<void> {
  return new Promise((resolve, reject) => {
    transaction.oncomplete = () => resolve();
    transaction.onabort = () => reject(transaction.error ?? new Error('the store gave up'));
  });
}
