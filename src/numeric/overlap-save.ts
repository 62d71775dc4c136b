import { type Ends, extendedAt } from './ends';
import { sharedFft } from './fft';
import { type KernelSpectrum, type KernelSpectrumOptions, kernelSpectrum } from './kernel-spectrum';

export type { Kernel } from './kernel';
export {
  blockSizeFor,
  type KernelSet,
  type KernelSpectrum,
  kernelSpectrum,
} from './kernel-spectrum';

/** Kernels still to be transformed, or their spectrum made before; `ends` is 'zero' unless given. */
export type OverlapSaveOptions = (KernelSpectrumOptions | { readonly spectrum: KernelSpectrum }) & {
  readonly ends?: Ends;
};

/** A running filter; every call gives one array a kernel with the outputs that became ready. */
export interface OverlapSave {
  /** Takes the next samples, any number of them. */
  push(block: Float64Array): Float64Array[];
  /** Ends the input and gives what is left; nothing may be pushed after it. */
  finish(): Float64Array[];
}

/**
 * Multiplies the spectrum of a real block with the kernels' and turns it back: one inverse
 * transform for both outputs, since Ha + i Hb of a real input has ya as its real and yb as its
 * imaginary part; at 1/fold of the rate by summing the parts of the spectrum that alias.
 * `result` holds yb, ya, interleaved: with re and im exchanged before and after, a forward
 * transform is an inverse one, and its 1/size is in the bins already.
 */
function createBlockFilter(spectrum: KernelSpectrum): (block: Float64Array) => Float64Array {
  const { blockSize, fold, bins } = spectrum;
  const shortSize = blockSize / fold;
  const forward = sharedFft(blockSize);
  const back = fold === 1 ? forward : sharedFft(shortSize);
  const x = new Float64Array(2 * blockSize);
  const product = new Float64Array(2 * shortSize);
  const result = new Float64Array(2 * shortSize);
  return (block) => {
    forward.forwardReal(block, x);
    for (let k = 0; k < product.length; k += 2) {
      product[k + 1] = x[k] * bins[k] - x[k + 1] * bins[k + 1];
      product[k] = x[k] * bins[k + 1] + x[k + 1] * bins[k];
    }
    for (let from = product.length; from < x.length; from += product.length) {
      for (let k = 0, j = from; k < product.length; k += 2, j += 2) {
        product[k + 1] += x[j] * bins[j] - x[j + 1] * bins[j + 1];
        product[k] += x[j] * bins[j + 1] + x[j + 1] * bins[j];
      }
    }
    back.forward(product, result);
    return result;
  };
}

/** Joins arrays; the only one is given as it is. */
function join(parts: readonly Float64Array[]): Float64Array {
  if (parts.length === 1) return parts[0];
  const whole = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}

/** State of one stream: the block being filled and the outputs made since the last call. */
class Stream implements OverlapSave {
  private readonly spectrum: KernelSpectrum;
  private readonly ends: Ends;
  private readonly filter: (block: Float64Array) => Float64Array;
  private readonly block: Float64Array;
  /** Samples in `block`; the first of them belongs `before` samples ahead of output `next`. */
  private filled: number;
  private next = 0;
  private received = 0;
  /** The first samples, until there are enough of them to say what was before. */
  private head: Float64Array | null;
  private ready: Float64Array[][] = [];
  private finished = false;

  constructor(spectrum: KernelSpectrum, ends: Ends) {
    this.spectrum = spectrum;
    this.ends = ends;
    this.filter = createBlockFilter(spectrum);
    this.block = new Float64Array(spectrum.blockSize);
    this.filled = spectrum.before;
    this.head = new Float64Array(ends === 'reflect-odd' ? spectrum.before + 1 : 1);
  }

  push(samples: Float64Array): Float64Array[] {
    if (this.finished) throw new Error('samples pushed after the end');
    let rest = samples;
    if (this.head) {
      const taken = Math.min(rest.length, this.head.length - this.received);
      this.head.set(rest.subarray(0, taken), this.received);
      this.received += taken;
      rest = rest.subarray(taken);
      if (this.received === this.head.length) this.start(this.head);
    }
    if (!this.head) {
      this.received += rest.length;
      this.append(rest);
    }
    return this.take();
  }

  finish(): Float64Array[] {
    if (this.finished) throw new Error('finish called twice');
    if (this.head) this.start(this.head.slice(0, this.received));
    this.finished = true;
    const { after } = this.spectrum;
    const kept = Math.min(this.received, after + 1);
    const tail = this.block.slice(this.filled - kept, this.filled);
    const extension = new Float64Array(after);
    for (let i = 0; i < after; i++) extension[i] = extendedAt(tail, kept + i, this.ends);
    this.append(extension);
    while (this.next < this.received) {
      this.block.fill(0, this.filled);
      this.run();
    }
    return this.take();
  }

  private start(head: Float64Array): void {
    const { before } = this.spectrum;
    for (let i = 0; i < before; i++) this.block[i] = extendedAt(head, i - before, this.ends);
    this.head = null;
    this.append(head);
  }

  private append(samples: Float64Array): void {
    let at = 0;
    while (at < samples.length) {
      const count = Math.min(samples.length - at, this.block.length - this.filled);
      this.block.set(samples.subarray(at, at + count), this.filled);
      this.filled += count;
      at += count;
      if (this.filled === this.block.length) this.run();
    }
  }

  /** Filters the block, keeps its outputs and makes room for the next. */
  private run(): void {
    const { before, after, hop, fold, decimate, outputs } = this.spectrum;
    const result = this.filter(this.block);
    const wanted = Math.min(hop, this.limit() - this.next);
    const count = Math.max(0, Math.ceil(wanted / decimate));
    const stride = (2 * decimate) / fold;
    const from = (2 * (before + after)) / fold;
    const made: Float64Array[] = [];
    for (let part = 0; part < outputs; part++) {
      const y = new Float64Array(count);
      for (let i = 0, j = from + 1 - part; i < count; i++, j += stride) y[i] = result[j];
      made.push(y);
    }
    this.ready.push(made);
    this.next += hop;
    this.block.copyWithin(0, hop, this.filled);
    this.filled = Math.max(0, this.filled - hop);
  }

  /** While samples still come every output of a full block is wanted. */
  private limit(): number {
    return this.finished ? this.received : Number.POSITIVE_INFINITY;
  }

  private take(): Float64Array[] {
    const parts = this.ready;
    this.ready = [];
    return Array.from({ length: this.spectrum.outputs }, (_, part) =>
      join(parts.map((made) => made[part])),
    );
  }
}

/**
 * A filter for a real signal that comes in blocks, by overlap-save (Oppenheim & Schafer): one
 * forward transform a block, one multiplication and one inverse transform for both outputs.
 * Output i of a kernel is sum taps[j] x[i decimate - (j - origin)]; there are
 * ceil(samples / decimate) of them. Rounding is of the order of 1e-15 of the larger output.
 * A NaN spoils every output of its block, so gaps are to be filled before.
 */
export function createOverlapSave(options: OverlapSaveOptions): OverlapSave {
  const spectrum = 'spectrum' in options ? options.spectrum : kernelSpectrum(options);
  return new Stream(spectrum, options.ends ?? 'zero');
}

/** The same over a whole signal at once: one array a kernel. */
export function overlapSave(x: Float64Array, options: OverlapSaveOptions): Float64Array[] {
  const spectrum = 'spectrum' in options ? options.spectrum : kernelSpectrum(options);
  const stream = new Stream(spectrum, options.ends ?? 'zero');
  const length = Math.ceil(x.length / spectrum.decimate);
  const whole = Array.from({ length: spectrum.outputs }, () => new Float64Array(length));
  let at = 0;
  const keep = (parts: Float64Array[]): void => {
    parts.forEach((part, k) => {
      whole[k].set(part, at);
    });
    at += parts[0].length;
  };
  for (let from = 0; from < x.length; from += spectrum.hop)
    keep(stream.push(x.subarray(from, from + spectrum.hop)));
  keep(stream.finish());
  return whole;
}
