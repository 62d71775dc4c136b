import { describe, expect, it } from 'vitest';
import { readPrefilter } from '../../src/decode/prefilter';

describe('the prefilter text', () => {
  it.each([
    // The spelling of Kemp & Olivan 2003, then looser ones.
    ['HP:0.016Hz LP:35Hz N:50Hz', 0.016, 35],
    ['HP:DC LP:100Hz', 0, 100],
    ['HP: 0,05 Hz; LP: 40 Hz', 0.05, 40],
    ['hp=0.5 lp=70', 0.5, 70],
    ['High pass 0.1 Hz, low-pass 30 Hz', 0.1, 30],
    ['Highpass filter: 16mHz Lowpass filter: 1kHz', 0.016, 1000],
    ['LP:1.8Hz', null, 1.8],
    ['HP:0.1Hz', 0.1, null],
    ['BP 0.05-40 Hz', 0.05, 40],
    ['Bandpass: 0.5 to 35Hz Notch 50Hz', 0.5, 35],
    ['N:50Hz HP:.05Hz', 0.05, null],
    ['LP:none HP:0.01Hz', 0.01, null],
  ])('“%s”', (text, highPassHz, lowPassHz) => {
    expect(readPrefilter(text)).toEqual({ kind: 'stated', text, highPassHz, lowPassHz });
  });

  it('turns a time constant into its corner, 1/(2 pi TC)', () => {
    // 3 s: 0.0530516477 Hz.
    const read = readPrefilter('TC:3s LP:30Hz');
    expect(read).toMatchObject({ kind: 'stated', lowPassHz: 30 });
    expect(read.kind === 'stated' && read.highPassHz).toBeCloseTo(0.0530516477, 9);
  });

  it.each(['', 'none', 'N:50Hz', 'unfiltered', 'help 5 Hz', '50 Hz notch'])(
    'says unknown for “%s”',
    (text) => {
      expect(readPrefilter(text)).toEqual({ kind: 'unknown', text });
    },
  );
});
