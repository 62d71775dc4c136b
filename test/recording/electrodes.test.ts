import { describe, expect, it } from 'vitest';
import { electrodesOfPair } from '../../src/recording/electrodes';
import { parseLead } from '../../src/recording/lead';

/** The relation of two leads written as the command line writes them, over channels of these labels. */
function relation(labels: readonly string[], a: string, b: string): string {
  const channels = labels.map((label) => ({ label }));
  const [first, second] = [a, b].map((text) => parseLead(text, channels));
  if (!first || !second) throw new Error(`no lead ${a} or ${b}`);
  return electrodesOfPair(first, second, channels).kind;
}

const PLACES = ['EGG 1', 'EGG 2', 'EGG 3', 'EGG 4'];

describe('two leads share an electrode', () => {
  it('where they share a channel', () => {
    expect(relation(PLACES, '#1~#2', '#2~#3')).toBe('shared');
    expect(relation(PLACES, '#1', '#1~#2')).toBe('shared');
  });

  it('where their labels name one electrode twice', () => {
    expect(relation(['E1-E2', 'E2-E3'], '#1', '#2')).toBe('shared');
    expect(relation(['EGG A1-REF', 'EGG A2 - ref'], '#1', '#2')).toBe('shared');
    expect(relation(['E1', 'E1-E2'], '#1', '#2')).toBe('shared');
  });

  it('not where an electrode cancels', () => {
    expect(relation(['E1-R', 'E2-R', 'E3-R', 'E4-R'], '#1~#2', '#3~#4')).toBe('apart');
    expect(relation(['E1-R', 'E2-R', 'R-E3'], '#1~#2', '#3')).toBe('apart');
  });

  it('not where their labels or channels have none in common', () => {
    expect(relation(['E1-E2', 'E3-E4'], '#1', '#2')).toBe('apart');
    expect(relation(['1-2', '3-4'], '#1', '#2')).toBe('apart');
    expect(relation(PLACES, '#1~#2', '#3~#4')).toBe('apart');
    expect(relation(PLACES, '#1', '#2~#3')).toBe('apart');
  });

  it('perhaps, where each was measured against something the file does not tell', () => {
    expect(relation(PLACES, '#1', '#2')).toBe('not-known');
    expect(relation(['EGG-1', 'EGG-2'], '#1', '#2')).toBe('not-known');
    expect(relation(['E1', 'E2-E3'], '#1', '#2')).toBe('not-known');
    expect(relation(['', 'a-b-c'], '#1', '#2')).toBe('not-known');
  });
});
