import { openAsBlob } from 'node:fs';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { BEAT_CLASSES, beatAt, changeBeats } from '../../src/recording/beat';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Proposal, ReviewInputs } from '../../workers/analysis-api';
import { type Job, startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';

const SETTINGS = { ...DEFAULT_SETTINGS, slowRoute: 'beat-average' } as const;

describe('a real recording under route beat-average', () => {
  let pipeline: Pipeline;
  let proposal: Proposal;
  let job: Job;
  const inputs = (parts: Partial<ReviewInputs> = {}): ReviewInputs => ({
    edit: 0,
    roles: proposal.roles,
    phases: proposal.phases,
    settings: SETTINGS,
    spans: proposal.spans.map((span, i) => ({ ...span, id: i + 1 })),
    beats: proposal.beats,
    ...parts,
  });
  const waveNow = () => pipeline.slowWave(proposal.roles.slow[0]);

  beforeAll(async () => {
    pipeline = createPipeline();
    job = startJob(() => undefined).job;
    const path = new URL('../fixtures/record208/record208-abdomen.edf', import.meta.url);
    const file = await openAsBlob(path);
    const { ticket } = await pipeline.open(1, file, 'record208-abdomen.edf', null, job);
    pipeline.accept(ticket);
    const given = { roles: null, phases: null, spans: null, settings: SETTINGS };
    proposal = await pipeline.propose(given, job);
  });

  it('has the same beats as under route band, taken out of the drawn wave, and says so', async () => {
    const { separation } = await pipeline.analyse(inputs(), job);
    expect(separation?.[0].notes.join()).toContain(
      `taken out at ${proposal.beats.ticks.length} beats`,
    );
    const averaged = waveNow();
    await pipeline.analyse(inputs({ settings: DEFAULT_SETTINGS }), job);
    expect(averaged?.recorded).toEqual(waveNow()?.recorded);
    expect(averaged?.slowWave).not.toEqual(waveNow()?.slowWave);
  });

  it('draws the wave anew after an edit of a beat, without the file, and the same one after undo', async () => {
    const first = await pipeline.analyse(inputs(), job);
    const before = waveNow();
    const reads = vi.spyOn(Blob.prototype, 'slice');
    const beats = changeBeats(proposal.beats, [beatAt(proposal.beats, 200)], []);
    const after = await pipeline.analyse(inputs({ beats, edit: 1 }), job);
    expect(after.stomach).not.toBeNull();
    expect(waveNow()?.slowWave).not.toEqual(before?.slowWave);
    const undone = await pipeline.analyse(inputs({ edit: 2 }), job);
    expect(waveNow()?.slowWave).toEqual(before?.slowWave);
    expect(undone.findings).toEqual({ ...first.findings, edit: 2 });
    expect(reads).not.toHaveBeenCalled();
    const same = await pipeline.analyse(
      inputs({ edit: 3, beats: { ...proposal.beats, ticks: proposal.beats.ticks.slice() } }),
      job,
    );
    expect(same).toMatchObject({ separation: null, stomach: null, heart: null });
  });

  it('gives beats of another class another average', async () => {
    await pipeline.analyse(inputs(), job);
    const before = waveNow();
    const classes = proposal.beats.classes.map(() => BEAT_CLASSES.indexOf('N'));
    await pipeline.analyse(inputs({ beats: { ...proposal.beats, classes }, edit: 4 }), job);
    expect(waveNow()?.slowWave).not.toEqual(before?.slowWave);
  });

  it('without a heart lead is route band, and says that nothing is taken out', async () => {
    const roles = { ...proposal.roles, heart: null };
    const { separation } = await pipeline.analyse(inputs({ roles, edit: 5 }), job);
    expect(separation?.[0].notes.join()).toContain('No heartbeat is taken out');
    const wave = waveNow()?.slowWave;
    await pipeline.analyse(inputs({ roles, settings: DEFAULT_SETTINGS, edit: 6 }), job);
    expect(wave).toEqual(waveNow()?.slowWave);
  });

  it('gives the figures of other states apart from the review', async () => {
    const beats = changeBeats(proposal.beats, [beatAt(proposal.beats, 100)], []);
    const other = inputs({ beats, edit: 7 });
    const wanted = (await pipeline.analyse(other, job)).findings;
    await pipeline.analyse(inputs({ edit: 8 }), job);
    const drawn = waveNow();
    expect(await pipeline.figuresOf([other], job)).toEqual([wanted]);
    expect(waveNow()).toBe(drawn);
  });
});
