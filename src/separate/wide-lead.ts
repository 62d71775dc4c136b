import { createInstantSampler, type InstantSampler } from '../numeric/sample-at';
import type { Hertz } from '../units/rate';
import { type LeadFacts, maskGaps } from './gaps';
import { createCollector } from './slow-rate';

/** Rate that average beats are made at, and what is kept of the lead: T waves whole, QRS complexes as far as their area counts. */
const WIDE_RATE_HZ: Hertz = 32;
const PASS_HZ = 4;
const STOP_HZ = 12;
const ATTENUATION_DB = 60;
/** At fewer samples a second a T wave is no shape any more. */
const LOWEST_RATE_HZ: Hertz = 20;

/** A lead at a rate that still shows its heartbeats; NaN inside gaps. */
export interface WideLead {
  readonly rateHz: Hertz;
  readonly samples: Float32Array;
}

/** True where a lead of this rate can have average beats taken out. */
export const carriesBeats = (rateHz: Hertz): boolean => rateHz >= LOWEST_RATE_HZ;

/** A lead's wide form while its samples run by; one of a lower rate is kept as it is. */
export function createWideSampler(rateHz: Hertz) {
  const outputRateHz = Math.min(rateHz, WIDE_RATE_HZ);
  const sampler: InstantSampler =
    rateHz <= WIDE_RATE_HZ
      ? createCollector()
      : createInstantSampler({
          rateHz,
          outputRateHz,
          passHz: PASS_HZ,
          stopHz: STOP_HZ,
          attenuationDb: ATTENUATION_DB,
        });
  return {
    push: (block: Float64Array) => sampler.push(block),
    finish({ gaps }: LeadFacts): WideLead {
      const samples = Float32Array.from(sampler.finish());
      maskGaps(samples, gaps, rateHz / outputRateHz);
      return { rateHz: outputRateHz, samples };
    },
  };
}
