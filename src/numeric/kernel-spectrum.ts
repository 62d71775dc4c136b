import { isPowerOfTwo, sharedFft } from './fft';
import type { Kernel } from './kernel';

/** One kernel, or two whose outputs are wanted of the same input. */
export type KernelSet = readonly [Kernel] | readonly [Kernel, Kernel];

export interface KernelSpectrumOptions {
  /** Size of the transforms, a power of two that holds the kernels and at least one output. */
  readonly blockSize: number;
  readonly kernels: KernelSet;
  /** Keep every decimate-th output; any whole number from 1. */
  readonly decimate: number;
}

/** Everything overlap-save needs of its kernels; built once, shared by any number of streams. */
export interface KernelSpectrum {
  readonly blockSize: number;
  readonly decimate: number;
  readonly outputs: 1 | 2;
  /** Input samples needed before and after the sample an output belongs to. */
  readonly before: number;
  readonly after: number;
  /** Input samples from one block to the next. */
  readonly hop: number;
  /** The power of two by which the spectrum is folded; it divides `decimate`. */
  readonly fold: number;
  /** (Ha + i Hb) / blockSize, interleaved. */
  readonly bins: Float64Array;
}

/** The largest power of two that divides n. */
function powerOfTwoIn(n: number): number {
  let power = 1;
  while (n % (power * 2) === 0) power *= 2;
  return power;
}

/** How far the kernels reach before and after; 1 and 0 at least. */
export function kernelReach(kernels: KernelSet): { before: number; after: number } {
  let before = 1;
  let after = 0;
  for (const { taps, origin } of kernels) {
    before = Math.max(before, taps.length - 1 - origin);
    after = Math.max(after, origin);
  }
  return { before, after };
}

/**
 * Spectrum of one kernel, or of two as Ha + i Hb, for createOverlapSave.
 * Throws where the block size is no power of two or cannot hold the kernels.
 */
export function kernelSpectrum(options: KernelSpectrumOptions): KernelSpectrum {
  const { blockSize, kernels, decimate } = options;
  if (!isPowerOfTwo(blockSize) || blockSize < 2)
    throw new Error(`block size must be a power of two from 2 on, not ${blockSize}`);
  if (!Number.isInteger(decimate) || decimate < 1)
    throw new Error(`decimation must be a whole number from 1 on, not ${decimate}`);
  const fold = Math.min(powerOfTwoIn(decimate), blockSize / 2);
  const reach = kernelReach(kernels);
  const after = reach.after;
  const before = Math.ceil((reach.before + after) / fold) * fold - after;
  const hop = Math.floor((blockSize - before - after) / decimate) * decimate;
  if (hop < 1)
    throw new Error(
      `block of ${blockSize} is too small for kernels that reach ${before} back and ${after} ahead`,
    );
  const packed = new Float64Array(2 * blockSize);
  kernels.forEach(({ taps, origin }, part) => {
    for (let j = 0; j < taps.length; j++)
      packed[2 * (j - origin + after) + part] = taps[j] / blockSize;
  });
  const bins = new Float64Array(2 * blockSize);
  sharedFft(blockSize).forward(packed, bins);
  const outputs = kernels.length;
  return { blockSize, decimate, outputs, before, after, hop, fold, bins };
}

/** Transforms of more points no longer fit the caches of usual processors and cost more (measured). */
const CACHED_POINTS = 262_144;
const UNCACHED_COST = 1.4;

/**
 * A block size of little work per output for these kernels, by the count of operations,
 * and no larger than `sampleCount` samples need.
 */
export function blockSizeFor(kernels: KernelSet, sampleCount: number, decimate = 1): number {
  const { before, after } = kernelReach(kernels);
  const span = before + after + 2 * decimate;
  let best = 2;
  let leastWork = Number.POSITIVE_INFINITY;
  for (let size = 2, log2 = 1; size <= 0x2000000; size *= 2, log2++) {
    const hop = size - span;
    if (hop < 1) continue;
    const slowness = size > CACHED_POINTS ? UNCACHED_COST : 1;
    const work = (Math.ceil(sampleCount / hop) || 1) * size * (log2 + 4) * slowness;
    if (work >= leastWork) break;
    leastWork = work;
    best = size;
  }
  return best;
}
