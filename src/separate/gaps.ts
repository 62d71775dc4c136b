import type { SampleRun } from '../numeric/nan-runs';

/** Missing samples of a lead, in its own samples. */
export type SampleGap = SampleRun;

/** What was seen of a lead once its last sample has come. */
export interface LeadFacts {
  readonly sampleCount: number;
  readonly gaps: readonly SampleGap[];
  /** Mean of the samples that are there; 0 where there is none. */
  readonly meanUv: number;
}

/** A lead on its way to the filters, without holes. */
export interface GapFiller {
  push(block: Float64Array): void;
  finish(): LeadFacts;
}

/** Longest piece of a filled gap handed on at once. */
const PIECE = 65536;

/**
 * Passes a lead on with each gap (NaN) filled by the straight line between the samples beside it,
 * at the ends by the nearest sample; `emit` gets every sample once, in order, and may not keep or
 * change the block. Filters need numbers; what they make of the filled stretch is masked afterwards.
 */
export function createGapFiller(emit: (block: Float64Array) => void): GapFiller {
  const gaps: SampleGap[] = [];
  let received = 0;
  let gapFrom = -1;
  let last = Number.NaN;
  let sum = 0;
  let present = 0;

  function fill(count: number, from: number, to: number): void {
    for (let done = 0; done < count; done += PIECE) {
      const piece = new Float64Array(Math.min(PIECE, count - done));
      for (let i = 0; i < piece.length; i++)
        piece[i] = from + ((to - from) * (done + i + 1)) / (count + 1);
      emit(piece);
    }
  }

  function closeGap(next: number): void {
    if (gapFrom < 0) return;
    gaps.push({ from: gapFrom, to: received });
    fill(received - gapFrom, Number.isNaN(last) ? next : last, next);
    gapFrom = -1;
  }

  /** Hands on samples [from, to) of a block, none of them NaN. */
  function pass(block: Float64Array, from: number, to: number): void {
    if (to <= from) return;
    closeGap(block[from]);
    for (let i = from; i < to; i++) sum += block[i];
    present += to - from;
    received += to - from;
    last = block[to - 1];
    emit(from === 0 && to === block.length ? block : block.subarray(from, to));
  }

  return {
    push(block) {
      let from = 0;
      for (let i = 0; i < block.length; i++) {
        if (!Number.isNaN(block[i])) continue;
        pass(block, from, i);
        if (gapFrom < 0) gapFrom = received;
        received += 1;
        from = i + 1;
      }
      pass(block, from, block.length);
    },
    finish() {
      closeGap(Number.isNaN(last) ? 0 : last);
      return { sampleCount: received, gaps, meanUv: present > 0 ? sum / present : 0 };
    },
  };
}

/** Sets what lies inside the gaps to NaN in a signal of `ratio` samples of the lead to one of its own. */
export function maskGaps(
  signal: Float64Array | Float32Array,
  gaps: readonly SampleGap[],
  ratio: number,
): void {
  for (const { from, to } of gaps) {
    const first = Math.max(0, Math.ceil(from / ratio - 1e-9));
    const end = Math.min(signal.length, Math.ceil(to / ratio - 1e-9));
    for (let i = first; i < end; i++) signal[i] = Number.NaN;
  }
}
