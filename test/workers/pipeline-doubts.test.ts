import { openAsBlob } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { type Beat, beatAt, changeBeats } from '../../src/recording/beat';
import { Refusal } from '../../src/recording/failure';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Proposal, ReviewInputs } from '../../workers/analysis-api';
import { type Job, startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';

const FIXTURE = new URL('../fixtures/record208/record208-abdomen.edf', import.meta.url);

describe('the doubts of a real recording', () => {
  let pipeline: Pipeline;
  let proposal: Proposal;
  let job: Job;
  let lost: Beat;
  let without: ReviewInputs;

  beforeAll(async () => {
    pipeline = createPipeline();
    job = startJob(() => undefined).job;
    const file = await openAsBlob(FIXTURE);
    const { ticket } = await pipeline.open(1, file, 'record208-abdomen.edf', null, job);
    pipeline.accept(ticket);
    const given = { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS };
    proposal = await pipeline.propose(given, job);
    lost = beatAt(proposal.beats, 60);
    without = {
      edit: 1,
      roles: proposal.roles,
      phases: proposal.phases,
      settings: DEFAULT_SETTINGS,
      spans: proposal.spans.map((span, i) => ({ ...span, id: i + 1 })),
      beats: changeBeats(proposal.beats, [lost], []),
    };
  }, 60_000);

  it('hold the place of a beat that was taken away, at the beat after the gap', async () => {
    const { edit, open } = await pipeline.doubts(without, [], job);
    expect(edit).toBe(1);
    const doubt = open.find(({ tick }) => tick === beatAt(proposal.beats, 61).tick);
    expect(doubt).toMatchObject({ kind: 'missed-beat' });
    const added = doubt?.mend?.kind === 'beats' ? doubt.mend.added : [];
    expect(Math.abs((added[0]?.tick ?? 0) - lost.tick)).toBeLessThan(64 * 360 * 0.005);
  });

  it('are open no more once settled', async () => {
    const { open } = await pipeline.doubts(without, [], job);
    const [{ id, tick }] = open;
    const left = await pipeline.doubts(without, [{ id, ending: 'kept', tick }], job);
    expect(left.open.map((one) => one.id)).not.toContain(id);
    expect(left.open).toHaveLength(open.length - 1);
  });

  it('foretell what the mend does to a figure: the figure of the mended beats', async () => {
    const { open } = await pipeline.doubts(without, [], job);
    const doubt = open.find(({ tick }) => tick === beatAt(proposal.beats, 61).tick);
    if (doubt?.mend?.kind !== 'beats' || !doubt.effect) throw new Error('no effect');
    const { figure, phase, before, after, weight } = doubt.effect;
    const now = await pipeline.analyse(without, job);
    const beats = changeBeats(without.beats, doubt.mend.removed, doubt.mend.added);
    const then = await pipeline.analyse({ ...without, beats, edit: 2 }, job);
    const of = ({ findings }: typeof now) =>
      findings.phases.find(({ name }) => name === phase)?.figures[figure];
    expect(before).toEqual(of(now));
    expect(after).toEqual(of(then));
    expect(weight).toBeGreaterThan(0);
  });

  it('come in the order of what they move, and are given up where the work is stopped', async () => {
    const { open } = await pipeline.doubts(without, [], job);
    const own = open.filter(({ kind }) => kind !== 'span').map(({ effect }) => effect?.weight ?? 0);
    expect(own).toEqual([...own].sort((a, b) => b - a));
    const stopped = startJob(() => undefined);
    stopped.cancel();
    await expect(pipeline.doubts(without, [], stopped.job)).rejects.toThrow(Refusal);
  });

  it('are the same for the files, in the order of time and without their effects', async () => {
    const { open } = await pipeline.doubts(without, [], job);
    const plain = await pipeline.openDoubts(without, [], job);
    expect(plain.map(({ id }) => id).sort()).toEqual(open.map(({ id }) => id).sort());
    const times = plain.map(({ fromS }) => fromS);
    expect(times).toEqual([...times].sort((a, b) => a - b));
  });

  it('carry the edit they were asked for, though it reached no figure', async () => {
    await pipeline.analyse(without, job);
    const { edit, open } = await pipeline.doubts({ ...without, edit: 9 }, [], job);
    expect(edit).toBe(9);
    expect(open).toEqual((await pipeline.doubts(without, [], job)).open);
  });

  it('look alike where their beats do, the most alike first', async () => {
    const { open } = await pipeline.doubts(without, [], job);
    const asked = open.find(({ tick }) => tick === beatAt(proposal.beats, 61).tick);
    const looks = await pipeline.lookAlikes(without, [], asked?.id ?? '', job);
    expect(looks.asked.doubt.id).toBe(asked?.id);
    expect(looks.asked.heartbeatUv).toHaveLength(Math.round(looks.rateHz));
    const likeness = looks.others.map((one) => one.likeness);
    expect(likeness).toEqual([...likeness].sort((a, b) => b - a));
    await expect(pipeline.lookAlikes(without, [], 'no such doubt', job)).rejects.toThrow(Refusal);
  });
});
