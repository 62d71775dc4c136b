import { describe, expect, it } from 'vitest';
import { Refusal } from '../../src/recording/failure';
import type { SignalBlock, SignalSource } from '../../src/recording/recording';
import { inTurns, startJob, withRests } from '../../workers/job';
import { passOverLeads } from '../../workers/lead-pass';

describe('long work', () => {
  it('lets other messages in while it runs, and can be stopped between turns', async () => {
    const { job, cancel } = startJob(() => undefined);
    function* endless(): Generator<number, never> {
      for (let i = 0; ; i += 1) {
        const until = performance.now() + 3;
        while (performance.now() < until);
        yield i / (i + 1);
      }
    }
    setTimeout(cancel, 20);
    const work = inTurns(endless(), job, 'waiting');
    await expect(work).rejects.toBeInstanceOf(Refusal);
    await expect(work).rejects.toMatchObject({ failure: { kind: 'cancelled' } });
  });

  it('gives the result of work that ends', async () => {
    const told: number[] = [];
    const { job } = startJob((_, done) => told.push(done));
    function* two(): Generator<number, string> {
      yield 0.5;
      return 'beats';
    }
    expect(await inTurns(two(), job, 'looking')).toBe('beats');
    expect(told).toEqual([0.5]);
    expect(await withRests(two(), job)).toBe('beats');
    expect(told).toEqual([0.5]);
  });
});

describe('one pass over the file', () => {
  const block = (done: number, ...samples: number[][]): SignalBlock => ({
    fromS: 0,
    firstSamples: [0, 0],
    samples: samples.map((some) => Float64Array.from(some)),
    done,
  });

  it('a difference of two channels is read sample by sample', async () => {
    const source = {
      async *blocks() {
        yield block(0.5, [1, 2, 3], [1, 1, 1]);
        yield block(1, [4, 5], [Number.NaN, 2]);
      },
    } as unknown as SignalSource;
    const seen: number[] = [];
    const { job } = startJob(() => undefined);
    await passOverLeads(
      source,
      [
        {
          lead: { kind: 'difference', plus: 0, minus: 1 },
          consumers: [{ push: (samples) => seen.push(...samples) }],
        },
      ],
      job,
      'reading',
    );
    expect(seen).toEqual([0, 1, 2, Number.NaN, 3]);
  });
});
