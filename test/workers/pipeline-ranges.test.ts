import { openAsBlob } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { beatAt, changeBeats } from '../../src/recording/beat';
import type { RangesEvidence } from '../../src/recording/evidence/ranges';
import { rangesOfFigure } from '../../src/recording/evidence/ranges';
import { rangesLines } from '../../src/recording/evidence/ranges-words';
import { numberOf } from '../../src/recording/figure';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { ReviewInputs } from '../../workers/analysis-api';
import { type Job, startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';

const FIXTURE = new URL('../fixtures/record208/record208-abdomen.edf', import.meta.url);

/** A job that notes what is done. */
function listening(): { readonly job: Job; readonly steps: Set<string> } {
  const steps = new Set<string>();
  return { steps, job: startJob((step) => steps.add(step)).job };
}

describe('the ranges of a real recording', () => {
  let pipeline: Pipeline;
  let review: ReviewInputs;
  const { job } = listening();

  beforeAll(async () => {
    pipeline = createPipeline();
    const file = await openAsBlob(FIXTURE);
    const { ticket } = await pipeline.open(1, file, 'record208-abdomen.edf', null, job);
    pipeline.accept(ticket);
    const given = { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS };
    const proposal = await pipeline.propose(given, job);
    const spans = proposal.spans.map((span, i) => ({ ...span, id: i + 1 }));
    const { roles, phases, beats } = proposal;
    review = { edit: 1, roles, phases, settings: DEFAULT_SETTINGS, spans, beats };
  }, 60_000);

  async function rangesOf(inputs: ReviewInputs, settled: Parameters<Pipeline['doubts']>[1] = []) {
    const heard = listening();
    const reply = await pipeline.evidence(inputs, settled, 'ranges', heard.job);
    if (reply.part !== 'ranges') throw new Error('another part');
    return { value: reply.value, steps: heard.steps };
  }

  const allRanges = ({ phases }: RangesEvidence) =>
    phases.flatMap(({ figures }) =>
      figures.flatMap(({ chance, doubts, limits }) =>
        [chance, doubts, limits].filter((range) => range !== null),
      ),
    );

  it('hold the figures they belong to, as they stand', async () => {
    const { value } = await rangesOf(review);
    const { findings } = await pipeline.analyse({ ...review, edit: 2 }, job);
    expect(allRanges(value).length).toBeGreaterThan(5);
    for (const { low, high } of allRanges(value)) expect(low).toBeLessThanOrEqual(high);
    for (const { name, figures } of value.phases)
      for (const { key, ...ranges } of figures) {
        const printed = findings.phases.find((phase) => phase.name === name)?.figures[key];
        const now = printed ? numberOf(printed) : Number.NaN;
        for (const range of [ranges.chance, ranges.doubts, ranges.limits]) {
          if (!range) continue;
          expect(range.low, `${name} ${key}`).toBeLessThanOrEqual(now + 1e-9);
          expect(range.high, `${name} ${key}`).toBeGreaterThanOrEqual(now - 1e-9);
        }
      }
  });

  it('by doubts reach what each mend by itself does to a figure, and are gone once all are settled', async () => {
    const lost = beatAt(review.beats, 60);
    const without = { ...review, beats: changeBeats(review.beats, [lost], []) };
    const { open } = await pipeline.doubts(without, [], job);
    const { value } = await rangesOf(without);
    expect(value.openHeartDoubts).toBeGreaterThan(0);
    const moved = open.filter(({ effect }) => effect?.figure === 'heart_rate_bpm');
    for (const { effect } of moved) {
      if (!effect) continue;
      const range = rangesOfFigure(value, effect.phase, 'heart_rate_bpm')?.doubts;
      expect(range?.exact).toBe(true);
      expect(numberOf(effect.after)).toBeGreaterThanOrEqual((range?.low ?? 0) - 1e-9);
      expect(numberOf(effect.after)).toBeLessThanOrEqual((range?.high ?? 0) + 1e-9);
    }
    const settled = open.map(({ id, tick }) => ({ id, tick, ending: 'kept' as const }));
    const after = (await rangesOf(without, settled)).value;
    expect(after.openHeartDoubts).toBe(0);
    for (const { figures } of after.phases)
      for (const { doubts } of figures) expect(doubts).toBeNull();
    expect(rangesLines(after).map(({ words }) => words)).toContain(
      'No open doubt reaches a heart figure.',
    );
  });

  it('of the stomach are not computed again where only a beat was edited', async () => {
    const breath = review.roles.slow[0];
    const withLead = { ...review, roles: { ...review.roles, breath } };
    await rangesOf(withLead);
    const edited = changeBeats(review.beats, [beatAt(review.beats, 60)], []);
    const { steps } = await rangesOf({ ...withLead, beats: edited });
    expect(steps).not.toContain('Trying other limits');
    expect(steps).toContain('Deciding doubts one way and the other');
  });

  it.each([
    [
      'without a heart lead',
      (one: ReviewInputs) => ({ ...one, roles: { ...one.roles, heart: null } }),
    ],
    [
      'of two minutes',
      (one: ReviewInputs) => ({ ...one, phases: [{ name: 'fasting', fromS: 10, toS: 130 }] }),
    ],
    [
      'that is spoiled from end to end',
      (one: ReviewInputs) => ({
        ...one,
        spans: [
          {
            id: 1,
            fromS: 0,
            toS: 300,
            lead: null,
            target: 'both' as const,
            cause: 'other' as const,
            origin: 'drawn' as const,
            note: '',
          },
        ],
      }),
    ],
  ])('are finite or not told in a study %s, and say so in words', async (_, change) => {
    const { value } = await rangesOf(change(review));
    for (const { low, high } of allRanges(value)) {
      expect(Number.isFinite(low)).toBe(true);
      expect(Number.isFinite(high)).toBe(true);
    }
    for (const { words } of rangesLines(value)) expect(words.length).toBeGreaterThan(10);
  });
});
