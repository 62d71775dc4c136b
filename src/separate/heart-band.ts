import { highPassTaps, lowPassTaps } from '../numeric/fir';
import { cascadeKernels, centredKernel, type Kernel } from '../numeric/kernel';
import { blockSizeFor } from '../numeric/kernel-spectrum';
import { createOverlapSave } from '../numeric/overlap-save';
import type { HeartOutput } from '../recording/separated';
import type { Hertz } from '../units/rate';
import { createChunks } from './chunks';
import { type LeadFacts, maskGaps } from './gaps';
import { heartDecimation } from './heart-rate';
import type { RouteJob } from './route';
import { uncleanStretches } from './unclean';

/** Half the transition of the lower edge over the edge itself; the edge is the -6 dB point. */
const EDGE_WIDTH = 0.5;
const HEART_ATTENUATION_DB = 60;
/**
 * Share of a filter's half length within which the end of a lead is felt: beyond it the drawn wave
 * is within 2 uV of the one drawn from a lead that goes on (100 uV wave over 1/f drift, by trial).
 */
export const FELT_SHARE = 0.55;

/** The band the heartbeat keeps at a rate: the upper edge at most 0.4 of it; null where nothing is left. */
export function heartBandAt(
  rateHz: Hertz,
  bandHz: readonly [Hertz, Hertz],
): readonly [Hertz, Hertz] | null {
  const high = Math.min(bandHz[1], 0.4 * rateHz);
  return high > 2 * bandHz[0] ? [bandHz[0], high] : null;
}

/**
 * The heartbeat's zero-phase filter at the lead's own rate: a high-pass and a low-pass in one
 * (windowed sincs, Kaiser 1974), -6 dB at the band's edges, the upper transition wide enough not
 * to ring. `outputRateHz` is the rate it is folded to.
 */
export function heartBandKernel(
  rateHz: Hertz,
  outputRateHz: Hertz,
  bandHz: readonly [Hertz, Hertz],
): Kernel {
  const [low, high] = bandHz;
  const above = Math.min(0.2 * high, outputRateHz / 2 - high);
  const highPass = highPassTaps({
    rateHz,
    stopHz: low * (1 - EDGE_WIDTH),
    passHz: low * (1 + EDGE_WIDTH),
    attenuationDb: HEART_ATTENUATION_DB,
  });
  const lowPass = lowPassTaps({
    rateHz,
    passHz: high - above,
    stopHz: high + above,
    attenuationDb: HEART_ATTENUATION_DB,
  });
  return cascadeKernels(centredKernel(highPass), centredKernel(lowPass));
}

/** The heartbeat's filter of route `band` at work; null where the rate leaves no band. */
export function startHeart(job: RouteJob) {
  const decimation = heartDecimation(job.rateHz);
  const rateHz = job.rateHz / decimation;
  const band = heartBandAt(rateHz, job.settings.heartBandHz);
  if (!band) return null;
  const kernel = heartBandKernel(job.rateHz, rateHz, band);
  const filter = createOverlapSave({
    blockSize: blockSizeFor([kernel], job.sampleCount, decimation),
    kernels: [kernel],
    decimate: decimation,
    ends: 'reflect-odd',
  });
  const chunks = createChunks(Math.ceil(job.sampleCount / decimation));
  return {
    push(block: Float64Array): void {
      chunks.add(filter.push(block)[0]);
    },
    finish(facts: LeadFacts): HeartOutput {
      chunks.add(filter.finish()[0]);
      const heartbeat = chunks.joined();
      maskGaps(heartbeat, facts.gaps, decimation);
      const feltS = (FELT_SHARE * kernel.origin) / job.rateHz;
      const reach = { afterS: feltS, beforeS: feltS };
      return {
        lead: job.lead,
        rateHz,
        heartbeat,
        decimation,
        unclean: uncleanStretches(facts.gaps, facts.sampleCount, job.rateHz, reach),
        notes: [`Heartbeat by a zero-phase band-pass of ${band[0]}-${band[1]} Hz (-6 dB).`],
      };
    },
  };
}
