import { truncationBound } from '../numeric/grunwald-letnikov';
import type { Kernel } from '../numeric/kernel';
import { blockSizeFor, type KernelSpectrum, kernelSpectrum } from '../numeric/kernel-spectrum';
import { nanRuns } from '../numeric/nan-runs';
import { createOverlapSave } from '../numeric/overlap-save';
import type { HeartOutput } from '../recording/separated';
import type { Settings } from '../recording/settings';
import { type Cpm, cpmToHz } from '../units/rate';
import { createChunks } from './chunks';
import { delayed } from './delay';
import {
  type FractionalKernels,
  fractionalKernels,
  HEART_SCALE_HZ,
  SLOW_SCALE_HZ,
} from './fractional-kernels';
import { type LeadFacts, maskGaps } from './gaps';
import type { Route, RouteJob, RouteRun, SeparatedSlow } from './route';
import { createSlowSampler, slowRateHz, slowSamplerReachS } from './slow-rate';
import { uncleanStretches } from './unclean';
import { withoutHoles } from './without-holes';

/** What the two outputs need of the settings at one rate, with the spectrum for one overlap-save pass. */
interface Prepared {
  readonly kernels: FractionalKernels;
  readonly spectrum: KernelSpectrum;
}

const prepared = new Map<string, Prepared>();
const MOST_PREPARED = 4;

/**
 * Kernels and their spectrum for a job, built once for all leads alike. Exported so that their
 * cost can be measured apart from that of the pass.
 */
export function prepareFractional(job: Omit<RouteJob, 'lead'>): Prepared {
  const { rateHz, sampleCount, slow, heart } = job;
  const { fractional } = job.settings;
  const key = JSON.stringify([{ ...fractional, undoLead: null }, rateHz, sampleCount, slow, heart]);
  const known = prepared.get(key);
  if (known) return known;
  const kernels = fractionalKernels(fractional, rateHz);
  const { decimation } = kernels;
  const set: readonly [Kernel] | readonly [Kernel, Kernel] =
    slow && heart ? [kernels.slow, kernels.heart] : [slow ? kernels.slow : kernels.heart];
  const blockSize = blockSizeFor(set, sampleCount, decimation);
  const made = {
    kernels,
    spectrum: kernelSpectrum({ blockSize, kernels: set, decimate: decimation }),
  };
  if (prepared.size >= MOST_PREPARED) prepared.clear();
  prepared.set(key, made);
  return made;
}

const sumOf = (x: Float64Array) => x.reduce((sum, value) => sum + value, 0);

/** Takes off what a constant of `levelUv` leaves in a kernel's output: the mean, removed afterwards. */
function removeConstant(
  signal: Float64Array | Float32Array,
  levelUv: number,
  kernel: Kernel,
): void {
  const left = levelUv * sumOf(kernel.taps);
  for (let i = 0; i < signal.length; i++) signal[i] -= left;
}

function fitLength(signal: Float64Array, length: number): Float64Array {
  if (signal.length === length) return signal;
  const fitted = new Float64Array(length).fill(signal.at(-1) ?? 0);
  fitted.set(signal.subarray(0, length));
  return fitted;
}

function describe(settings: Settings, kernels: FractionalKernels): string[] {
  const { order, memoryS, polynomialOrder } = settings.fractional;
  const bound = order > 0 ? truncationBound(order, memoryS) * kernels.slowScale : 0;
  const leadS = kernels.slowResponse(SLOW_SCALE_HZ).leadS;
  return [
    `Slow wave by a derivative of order ${order} over ${memoryS} s, then Savitzky-Golay smoothing of ${kernels.slowWindow} samples (polynomial ${polynomialOrder}); scaled to µV at 3 cpm, where it runs ahead by ${leadS.toFixed(2)} s.`,
    `What lies more than ${memoryS} s back can change it by at most ${(100 * bound).toFixed(1)} % of the lead's largest distance from its mean (truncation bound; far less for a wave).`,
  ];
}

/** The drawn wave from the derivative: as it is, or shifted back by its lead at DF. */
function draw(slow: SeparatedSlow, settings: Settings, dfCpm: Cpm): SeparatedSlow {
  if (!settings.fractional.undoLead)
    return { ...slow, slowWave: slow.forSpectra, leadSAt: slow.derivativeLeadSAt };
  const shiftS = slow.derivativeLeadSAt(cpmToHz(dfCpm));
  const slowWave = delayed(withoutHoles(slow.forSpectra), shiftS, slow.rateHz);
  maskGaps(slowWave, nanRuns(slow.forSpectra), 1);
  return { ...slow, slowWave, leadSAt: (hz) => slow.derivativeLeadSAt(hz) - shiftS };
}

function slowOutput(
  job: RouteJob,
  kernels: FractionalKernels,
  forSpectra: Float64Array,
  recorded: Float64Array,
  facts: LeadFacts,
): SeparatedSlow {
  const { rateHz, settings } = job;
  const slow = kernels.slow;
  const derivativeLeadSAt = (hz: number) => kernels.slowResponse(hz).leadS;
  const samplerS = slowSamplerReachS(rateHz);
  const reach = {
    afterS: (slow.taps.length - 1 - slow.origin) / rateHz + samplerS,
    beforeS: slow.origin / rateHz + samplerS,
  };
  const undrawn: SeparatedSlow = {
    lead: job.lead,
    route: 'fractional',
    rateHz: slowRateHz(rateHz),
    recorded,
    slowWave: forSpectra,
    forSpectra,
    powerResponse: (hz) => kernels.slowResponse(hz).power,
    unclean: uncleanStretches(facts.gaps, facts.sampleCount, rateHz, reach),
    leadSAt: derivativeLeadSAt,
    derivativeLeadSAt,
    wide: null,
    notes: describe(settings, kernels),
  };
  return draw(undrawn, settings, SLOW_SCALE_HZ * 60);
}

function heartOutput(
  job: RouteJob,
  kernels: FractionalKernels,
  heartbeat: Float32Array,
  facts: LeadFacts,
): HeartOutput {
  const { order, memoryS, polynomialOrder } = job.settings.fractional;
  const { heart, decimation } = kernels;
  const reach = {
    afterS: (heart.taps.length - 1 - heart.origin) / job.rateHz,
    beforeS: heart.origin / job.rateHz,
  };
  const scaleHz = Math.min(HEART_SCALE_HZ, 0.2 * job.rateHz);
  return {
    lead: job.lead,
    rateHz: job.rateHz / decimation,
    heartbeat,
    decimation,
    unclean: uncleanStretches(facts.gaps, facts.sampleCount, job.rateHz, reach),
    notes: [
      `Heartbeat by Savitzky-Golay smoothing of ${kernels.heartWindow} samples (polynomial ${polynomialOrder}), then a derivative of order ${order} over ${memoryS} s; scaled to µV at ${scaleHz} Hz.`,
    ],
  };
}

function start(job: RouteJob): RouteRun {
  const { kernels, spectrum } = prepareFractional(job);
  const { decimation } = kernels;
  const filter = createOverlapSave({ spectrum, ends: 'reflect-odd' });
  const sampler = job.slow ? createSlowSampler(job.rateHz / decimation) : null;
  const beats = job.heart ? createChunks(Math.ceil(job.sampleCount / decimation)) : null;
  let levelUv = Number.NaN;
  const take = (outputs: Float64Array[]) => {
    sampler?.push(outputs[0]);
    beats?.add(outputs[outputs.length - 1]);
  };
  return {
    push(block) {
      if (block.length === 0) return;
      if (Number.isNaN(levelUv)) levelUv = block[0];
      const level = new Float64Array(block.length);
      for (let i = 0; i < block.length; i++) level[i] = block[i] - levelUv;
      take(filter.push(level));
    },
    finish(recorded, facts) {
      take(filter.finish());
      const aboveLevel = facts.meanUv - (Number.isNaN(levelUv) ? 0 : levelUv);
      let slow: SeparatedSlow | null = null;
      if (sampler) {
        const forSpectra = fitLength(sampler.finish(), recorded.length);
        removeConstant(forSpectra, aboveLevel, kernels.slow);
        maskGaps(forSpectra, facts.gaps, job.rateHz / slowRateHz(job.rateHz));
        slow = slowOutput(job, kernels, forSpectra, recorded, facts);
      }
      let heart: HeartOutput | null = null;
      if (beats) {
        const heartbeat = beats.joined();
        removeConstant(heartbeat, aboveLevel, kernels.heart);
        maskGaps(heartbeat, facts.gaps, decimation);
        heart = heartOutput(job, kernels, heartbeat, facts);
      }
      return { slow, heart };
    },
  };
}

/**
 * Route `fractional`: a fractional derivative and Savitzky-Golay smoothing, slow wave and heartbeat
 * by one overlap-save pass. The derivative tilts the spectrum and leads in phase; both are stated.
 */
export const fractionalRoute: Route = {
  start,
  *redraw(slow, settings, { dfCpm }) {
    yield;
    return draw(slow, settings, dfCpm);
  },
};
