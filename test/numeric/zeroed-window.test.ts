import { expect, it } from 'vitest';
import { powerDensity } from '../../src/numeric/spectrum';
import { hannPeriodic } from '../../src/numeric/windows';
import { zeroedWindow } from '../../src/numeric/zeroed-window';

const LENGTH = 256;
const taper = hannPeriodic(LENGTH);
const kept = Uint8Array.from({ length: LENGTH }, (_, i) => (i >= 60 && i < 80 ? 0 : 1));
const holed = (at: (i: number) => number) =>
  Float64Array.from(kept, (there, i) => (there ? at(i) : Number.NaN));

it('a window of a drift with a hole is 0 once it is made ready', () => {
  const { samples } = zeroedWindow(
    holed((i) => 300 - 2 * i),
    kept,
    taper,
  );
  for (const value of samples) expect(value).toBeCloseTo(0, 9);
});

it('what the hole takes of the power of a line is what the taper lost there, squared', () => {
  const tone = (i: number) => 10 * Math.cos((2 * Math.PI * 32 * i) / LENGTH);
  const all = powerDensity(
    Float64Array.from({ length: LENGTH }, (_, i) => tone(i)),
    taper,
    1,
    LENGTH,
  );
  const { samples, keptTaper } = zeroedWindow(holed(tone), kept, taper);
  const part = powerDensity(samples, taper, 1, LENGTH);
  const whole = taper.reduce((sum, one) => sum + one, 0);
  expect(part[32] / all[32]).toBeCloseTo((keptTaper / whole) ** 2, 2);
});
