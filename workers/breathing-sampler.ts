import { createInstantSampler } from '../src/numeric/sample-at';

/** Rate at which a breathing lead is kept; breathing above 40 a minute (0.67 Hz) is not looked for. */
const BREATHING_RATE_HZ = 8;

export interface BreathingSampler {
  push(block: Float64Array): void;
  finish(): { readonly samples: Float64Array; readonly rateHz: number };
}

/** Brings a breathing lead down to 8 Hz without aliases; a slower one is kept as it is. */
export function createBreathingSampler(rateHz: number): BreathingSampler {
  if (rateHz <= BREATHING_RATE_HZ) {
    const blocks: Float64Array[] = [];
    return {
      push: (block) => blocks.push(block.slice()),
      finish: () => ({ samples: joined(blocks), rateHz }),
    };
  }
  const sampler = createInstantSampler({
    rateHz,
    outputRateHz: BREATHING_RATE_HZ,
    passHz: 1,
    stopHz: 4,
    attenuationDb: 60,
  });
  return {
    push: (block) => sampler.push(block),
    finish: () => ({ samples: sampler.finish(), rateHz: BREATHING_RATE_HZ }),
  };
}

function joined(blocks: readonly Float64Array[]): Float64Array {
  const out = new Float64Array(blocks.reduce((sum, block) => sum + block.length, 0));
  let at = 0;
  for (const block of blocks) {
    out.set(block, at);
    at += block.length;
  }
  return out;
}
