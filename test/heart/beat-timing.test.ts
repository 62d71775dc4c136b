import { describe, expect, it } from 'vitest';
import { detectBeats } from '../../src/heart/detect';
import { heartbeatOf } from './record208';
import { matchBeats } from './score';
import { addBeats, addNoise, BIPHASIC, NARROW, planBeats, type Wave } from './simulated-heart';

const RATE = 250;
const SECONDS = 900;

/**
 * Least standard deviation of a beat's time in white noise (Kay 1993, chapter 3): noise SD over the root of the sum of squares
 * of the waveform's slope, both as the heartbeat band passes them. The slope is taken from the waves' own formula.
 */
function boundMs(shape: readonly Wave[], heightUv: number, noiseUv: number): number {
  const slope = Float64Array.from({ length: 4 * RATE }, (_, i) => {
    const t = i / RATE - 2;
    return shape.reduce((sum, { atS, sdS, size }) => {
      const u = (t - atS) / sdS;
      return sum - ((heightUv * size * u) / sdS) * Math.exp(-0.5 * u * u);
    }, 0);
  });
  const passed = heartbeatOf(slope, RATE);
  const energy = passed.reduce((sum, value) => sum + value ** 2, 0);
  return (1000 * noiseUv) / Math.sqrt(energy);
}

function timing(shape: readonly Wave[], heightUv: number, noiseUv: number, breathHeight = 0) {
  const beats = planBeats({ seed: 31, seconds: SECONDS, meanRrS: 0.85, breathHeight });
  const raw = addBeats(new Float64Array(SECONDS * RATE), RATE, beats, heightUv, shape);
  const heartbeat = heartbeatOf(
    addNoise(raw, RATE, { seed: 12, whiteUv: noiseUv, slowUv: 150, breathUv: 40 }),
    RATE,
  );
  const found = detectBeats({ heartbeat, rateHz: RATE, ticksPerSample: 256 });
  const times = Array.from(found.beats.ticks, (tick) => tick / (256 * RATE));
  const truth = beats.map((beat) => beat.timeS);
  const errors = matchBeats(truth, times).pairs.map(([r, d]) => 1000 * (times[d] - truth[r]));
  const mean = errors.reduce((sum, error) => sum + error, 0) / errors.length;
  const power = errors.reduce((sum, error) => sum + (error - mean) ** 2, 0);
  return { sdMs: Math.sqrt(power / (errors.length - 1)), saidMs: found.timingSdMs };
}

describe('the time of a beat', () => {
  it.each([
    { name: 'narrow', shape: NARROW, heightUv: 100, noiseUv: 3 },
    { name: 'narrow', shape: NARROW, heightUv: 50, noiseUv: 3 },
    { name: 'narrow', shape: NARROW, heightUv: 300, noiseUv: 1 },
    { name: 'biphasic', shape: BIPHASIC, heightUv: 100, noiseUv: 3 },
  ])(
    'is within 1.3 of the matched-filter bound: $name, $heightUv uV in noise of $noiseUv uV',
    ({ shape, heightUv, noiseUv }) => {
      const { sdMs } = timing(shape, heightUv, noiseUv);
      const bound = boundMs(shape, heightUv, noiseUv);
      expect(sdMs / bound).toBeLessThanOrEqual(1.3);
      expect(sdMs / bound).toBeGreaterThan(0.8);
    },
  );

  it('has the error that the detection says, within a fifth', () => {
    const { sdMs, saidMs } = timing(NARROW, 100, 3);
    expect(saidMs / sdMs).toBeGreaterThan(0.8);
    expect(saidMs / sdMs).toBeLessThan(1.2);
  });

  it('does not move with the height of the beat', () => {
    const { sdMs } = timing(NARROW, 200, 0.2, 0.5);
    expect(sdMs).toBeLessThan(0.1);
  });
});
