import { createInstantSampler, type InstantSampler } from '../numeric/sample-at';
import { kaiserTaps } from '../numeric/windows';
import { SLOW_RATE_HZ } from '../recording/separated';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/**
 * The low-pass before 4 Hz: flat within 0.1 % to 0.25 Hz, at least 60 dB down from 0.8 Hz on, so
 * that nothing near 4 Hz or its multiples can fold onto 0-9 cpm and no beat is left to be seen.
 */
export const SLOW_LOW_PASS = { passHz: 0.25, stopHz: 0.8, attenuationDb: 66 } as const;

/** Rate of the slow wave of a lead: 4 Hz, or the lead's own where that is lower. */
export function slowRateHz(rateHz: Hertz): Hertz {
  return Math.min(rateHz, SLOW_RATE_HZ);
}

/** Half the length of the low-pass before 4 Hz in seconds; 0 where the lead is taken as it is. */
export function slowSamplerReachS(rateHz: Hertz): Seconds {
  if (rateHz <= SLOW_RATE_HZ) return 0;
  const { attenuationDb, stopHz, passHz } = SLOW_LOW_PASS;
  return (kaiserTaps(attenuationDb, stopHz - passHz, rateHz) - 1) / 2 / rateHz;
}

/**
 * A lead to its anti-aliased 4 Hz form, evaluated at the output's own instants whatever the rate.
 * A lead of 4 Hz or less is passed on as it is: what has folded in it can no longer be parted.
 */
export function createSlowSampler(rateHz: Hertz): InstantSampler {
  if (rateHz <= SLOW_RATE_HZ) return createCollector();
  return createInstantSampler({
    rateHz,
    outputRateHz: SLOW_RATE_HZ,
    ...SLOW_LOW_PASS,
  });
}

/** Takes samples as they are. */
export function createCollector(): InstantSampler {
  const parts: Float64Array[] = [];
  let length = 0;
  return {
    push(block) {
      parts.push(block.slice());
      length += block.length;
    },
    finish() {
      const whole = new Float64Array(length);
      let at = 0;
      for (const part of parts) {
        whole.set(part, at);
        at += part.length;
      }
      return whole;
    },
  };
}
