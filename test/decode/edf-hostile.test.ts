import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { Refusal } from '../../src/recording/failure';
import { annotationBytes, annotationSignal, edfBytes } from './edf-bytes';

const records = [
  [1, 2, 3, 4],
  [5, 6, 7, 8],
  [9, 10, 11, 12],
];

describe('a hostile header', () => {
  /** A Blob that counts the bytes read from it. */
  function counting(bytes: Uint8Array<ArrayBuffer>): { blob: Blob; read: () => number } {
    const blob = new Blob([bytes]);
    const slice = blob.slice.bind(blob);
    let read = 0;
    blob.slice = (from, to, type) => {
      const part = slice(from, to, type);
      read += part.size;
      return part;
    };
    return { blob, read: () => read };
  }

  it('is refused or read, never worse, and asks for no more than the file holds', async () => {
    const template = edfBytes({
      reserved: 'EDF+C',
      signals: [
        { records },
        annotationSignal(records.map((_, i) => annotationBytes(16, `+${i}`, 0x14, 0x14, 0))),
      ],
    });
    const field = fc.oneof(
      fc.constantFrom(
        '0',
        '-1',
        '9999',
        '1E9',
        '99999999',
        'NaN',
        '',
        ' ',
        '1,5',
        'EDF+D',
        '\u0000',
        '4',
      ),
      fc.string({ maxLength: 8, unit: 'binary-ascii' }),
    );
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.tuple(fc.integer({ min: 8, max: 767 }), field), { minLength: 1, maxLength: 6 }),
        async (edits) => {
          const bytes = template.slice();
          for (const [at, text] of edits)
            for (let i = 0; i < text.length && at + i < 768; i += 1)
              bytes[at + i] = text.charCodeAt(i);
          const { blob, read } = counting(bytes);
          try {
            const source = await openRecording(blob, 'study.edf', null);
            for (const { sampleCount } of source.recording.channels)
              expect(2 * sampleCount).toBeLessThanOrEqual(bytes.length);
            for await (const block of source.blocks(source.recording.channels.map((_, i) => i)))
              for (const samples of block.samples)
                expect(2 * samples.length).toBeLessThanOrEqual(bytes.length);
          } catch (error) {
            if (!(error instanceof Refusal)) throw error;
          }
          expect(read()).toBeLessThanOrEqual(8 * bytes.length);
        },
      ),
      { numRuns: 1500, seed: 20210302 },
    );
  });
});
