import { describe, expect, it } from 'vitest';
import { parseRecordAnnotations } from '../../src/decode/edf-annotations';
import { annotationBytes } from './edf-bytes';

const hex = (text: string) => Uint8Array.from(text.split(' ').map((byte) => Number(`0x${byte}`)));

describe('annotation lists (Kemp & Olivan 2003)', () => {
  it('reads onset, duration and text', () => {
    // CV-37.
    const bytes = hex('2B 31 38 30 32 2E 35 15 33 30 14 4D 65 61 6C 20 73 74 61 72 74 14 00');
    expect(parseRecordAnnotations(bytes)).toEqual({
      annotations: [{ onsetS: 1802.5, durationS: 30, text: 'Meal start' }],
      timeKeepingS: null,
      loose: 0,
      lost: 0,
    });
  });

  it('reads a time before the start', () => {
    // CV-38.
    const bytes = annotationBytes(40, '-0.065', 0x14, 'pre-trigger', 0x14, 0);
    expect(parseRecordAnnotations(bytes).annotations).toEqual([
      { onsetS: -0.065, durationS: null, text: 'pre-trigger' },
    ]);
  });

  it('keeps the time-keeping list apart from texts', () => {
    const bytes = annotationBytes(
      60,
      '+567',
      0x14,
      0x14,
      0,
      '+568.25',
      0x14,
      'A',
      0x14,
      'B',
      0x14,
      0,
    );
    const record = parseRecordAnnotations(bytes);
    expect(record.timeKeepingS).toBe(567);
    expect(record.annotations.map((one) => [one.onsetS, one.text])).toEqual([
      [568.25, 'A'],
      [568.25, 'B'],
    ]);
  });

  it('takes the record’s time from its first list only', () => {
    const later = annotationBytes(30, '+1', 0x14, 'x', 0x14, 0, '+9', 0x14, 0x14, 0);
    expect(parseRecordAnnotations(later).timeKeepingS).toBeNull();
    const two = annotationBytes(30, '+1', 0x14, 0x14, 0, '+9', 0x14, 0x14, 0);
    expect(parseRecordAnnotations(two).timeKeepingS).toBe(1);
  });

  it('reads texts that share the time-keeping list', () => {
    const bytes = annotationBytes(30, '+3', 0x14, 0x14, 'drank', 0x14, 0);
    expect(parseRecordAnnotations(bytes)).toMatchObject({
      timeKeepingS: 3,
      annotations: [{ onsetS: 3, text: 'drank' }],
    });
  });

  it('keeps text as text: accents, markup, and control characters as blanks', () => {
    const bytes = annotationBytes(80, '+1', 0x14, 'água 20 °C <b>x</b>\u0007\n!', 0x14, 0);
    expect(parseRecordAnnotations(bytes).annotations[0].text).toBe('água 20 °C <b>x</b> !');
  });

  it('reads on where a list breaks the letter, and counts it', () => {
    const unsigned = annotationBytes(20, '5', 0x14, 'x', 0x14, 0);
    expect(parseRecordAnnotations(unsigned)).toMatchObject({
      annotations: [{ onsetS: 5, text: 'x' }],
      loose: 1,
    });
    const noZero = annotationBytes(5, '+5', 0x14, 'x', 0x14);
    expect(parseRecordAnnotations(noZero)).toMatchObject({
      annotations: [{ onsetS: 5, text: 'x' }],
      loose: 1,
    });
    const latin = annotationBytes(8, '+5', 0x14, 0xe9, 0x14, 0);
    expect(parseRecordAnnotations(latin)).toMatchObject({
      annotations: [{ onsetS: 5, text: 'é' }],
      loose: 1,
    });
  });

  it('counts what cannot be read and reads the rest', () => {
    const bytes = annotationBytes(
      60,
      'junk',
      0,
      '+x',
      0x14,
      'y',
      0x14,
      0,
      '+7',
      0x14,
      'z',
      0x14,
      0,
    );
    expect(parseRecordAnnotations(bytes)).toMatchObject({
      annotations: [{ onsetS: 7, text: 'z' }],
      lost: 2,
    });
  });
});
