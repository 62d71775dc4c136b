import { afterEach, describe, expect, it, vi } from 'vitest';
import { asWork, beginWork, endWork, isIdle } from '../../src/review/idle';

describe('the idle mark', () => {
  const root = { dataset: {} as Record<string, string> };
  vi.stubGlobal('document', { documentElement: root });
  afterEach(() => expect(isIdle()).toBe(true));

  it('says idle only when every begun piece has ended', () => {
    beginWork();
    beginWork();
    endWork();
    expect(root.dataset.idle).toBe('false');
    endWork();
    expect(root.dataset.idle).toBe('true');
  });

  it('ends a piece whose promise fails', async () => {
    await expect(asWork(Promise.reject(new Error('lost')))).rejects.toThrow('lost');
    expect(root.dataset.idle).toBe('true');
  });

  it('does not end what was not begun', () => {
    expect(() => endWork()).toThrow();
  });
});
