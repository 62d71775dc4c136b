import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { uniqueLabels } from '../../src/decode/labels';
import { always } from '../properties';

describe('labels', () => {
  it('stay as they are where they are unique', () => {
    expect(uniqueLabels(['EGG', 'ECG'])).toEqual(['EGG', 'ECG']);
  });

  it('are numbered where they are not, past numbers that are taken', () => {
    expect(uniqueLabels(['EGG', 'EGG', 'EGG 1', ' '])).toEqual([
      'EGG 2',
      'EGG 3',
      'EGG 1',
      'channel 4',
    ]);
  });

  it('are always unique and never blank', () => {
    const label = fc.constantFrom('', ' ', 'a', 'a 1', 'a 1 1', 'channel 1', 'channel 2');
    fc.assert(
      fc.property(fc.array(label, { maxLength: 12 }), (labels) => {
        const unique = uniqueLabels(labels);
        expect(new Set(unique).size).toBe(labels.length);
        expect(unique.every((one) => one.trim() !== '')).toBe(true);
      }),
      always(100),
    );
  });
});
