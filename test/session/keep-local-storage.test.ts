import { describe, expect, it } from 'vitest';
import { ALL_COPIES_LIMIT, COPY_LIMIT, copyStore } from '../../src/session/keep-local-storage';
import { MemoryStorage } from './memory-stores';

const copy = (quickKey: string, day: number, size: number) => ({
  quickKey,
  savedAtUtc: `2026-03-0${day}T00:00:00Z`,
  edits: day,
  text: 'x'.repeat(size),
});

describe('copies in local storage', () => {
  it('come back as they were', () => {
    const copies = copyStore(new MemoryStorage());
    expect(copies.write(copy('a', 1, 10))).toBeNull();
    expect(copies.read('a')).toEqual(copy('a', 1, 10));
    expect(copies.read('b')).toBeNull();
  });

  it('are at most 1 MB each', () => {
    const copies = copyStore(new MemoryStorage());
    expect(copies.write(copy('a', 1, COPY_LIMIT + 1))).toMatchObject({ kind: 'too-large' });
    expect(copies.write(copy('a', 1, COPY_LIMIT))).toBeNull();
  });

  it('are at most 5 MB together: the oldest give way, and other keys stay', () => {
    const storage = new MemoryStorage(20_000_000);
    storage.setItem('theme', 'dark');
    const copies = copyStore(storage);
    for (const [key, day] of [
      ['b', 2],
      ['a', 1],
      ['c', 3],
      ['d', 4],
      ['e', 5],
    ] as const)
      copies.write(copy(key, day, COPY_LIMIT));
    expect(copies.all()).toHaveLength(ALL_COPIES_LIMIT / COPY_LIMIT);
    expect(copies.write(copy('f', 6, COPY_LIMIT))).toBeNull();
    expect(
      copies
        .all()
        .map((one) => one.quickKey)
        .sort(),
    ).toEqual(['b', 'c', 'd', 'e', 'f']);
    expect(storage.getItem('theme')).toBe('dark');
  });

  it('give way where the browser has less room, and say so where nothing is left to give', () => {
    const storage = new MemoryStorage(1500);
    const copies = copyStore(storage);
    copies.write(copy('a', 1, 700));
    expect(copies.write(copy('b', 2, 1000))).toBeNull();
    expect(copies.read('a')).toBeNull();
    expect(copies.write(copy('c', 3, 2000))).toMatchObject({ kind: 'full' });
  });
});
