import type { KeptHead, KeptLineRow, KeptStore } from '../../src/session/kept-store';

/** Stands for the durable store; `fails` makes every call reject as the browser's would. */
export class MemoryStore implements KeptStore {
  readonly head = new Map<string, KeptHead>();
  readonly snapshot = new Map<string, { n: number; text: string }>();
  readonly journal = new Map<string, KeptLineRow[]>();
  readonly written: ('snapshot' | number)[] = [];
  fails: Error | null = null;

  private async ready() {
    await Promise.resolve();
    if (this.fails) throw this.fails;
  }
  async heads() {
    await this.ready();
    return [...this.head.values()];
  }
  async read(quickKey: string) {
    await this.ready();
    const head = this.head.get(quickKey);
    const snapshot = this.snapshot.get(quickKey);
    if (!head || !snapshot) return null;
    return { head, snapshot, lines: this.journal.get(quickKey) ?? [] };
  }
  async write({ head, snapshot, lines, allowed }: Parameters<KeptStore['write']>[0]) {
    await this.ready();
    const { quickKey } = head;
    if (!allowed(this.head.get(quickKey) ?? null)) return false;
    this.head.set(quickKey, head);
    this.journal.set(quickKey, [...(this.journal.get(quickKey) ?? []), ...lines]);
    this.written.push(...lines.map((line) => line.n));
    if (snapshot === null) return true;
    this.snapshot.set(quickKey, { n: head.edits, text: snapshot });
    this.journal.set(quickKey, []);
    this.written.push('snapshot');
    return true;
  }
  async forget(quickKey: string) {
    await this.ready();
    this.head.delete(quickKey);
    this.snapshot.delete(quickKey);
    this.journal.delete(quickKey);
  }
}

/** Stands for local storage with room for so many characters; `broken` makes it throw as a blocked one does. */
export class MemoryStorage implements Storage {
  readonly map = new Map<string, string>();
  broken = false;
  constructor(readonly room = 5_200_000) {}
  get length() {
    this.look();
    return this.map.size;
  }
  key(index: number) {
    return [...this.map.keys()][index] ?? null;
  }
  getItem(key: string) {
    this.look();
    return this.map.get(key) ?? null;
  }
  setItem(key: string, value: string) {
    this.look();
    const others = [...this.map].filter(([other]) => other !== key);
    const size = others.reduce((sum, [a, b]) => sum + a.length + b.length, 0);
    if (size + key.length + value.length > this.room)
      throw new DOMException('no room', 'QuotaExceededError');
    this.map.set(key, value);
  }
  removeItem(key: string) {
    this.look();
    this.map.delete(key);
  }
  clear() {
    this.map.clear();
  }
  private look() {
    if (this.broken) throw new DOMException('blocked', 'SecurityError');
  }
}
