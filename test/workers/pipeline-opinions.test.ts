import { openAsBlob } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { beatAt, changeBeats } from '../../src/recording/beat';
import type { OpinionsEvidence } from '../../src/recording/evidence/opinions';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Span } from '../../src/recording/span';
import type { Proposal, ReviewInputs } from '../../workers/analysis-api';
import { type Job, startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';

describe('second opinions on five minutes in sinus rhythm', () => {
  let pipeline: Pipeline;
  let proposal: Proposal;
  let job: Job;
  let asked = 0;
  const inputs = (parts: Partial<ReviewInputs> = {}): ReviewInputs => ({
    edit: 0,
    roles: proposal.roles,
    phases: proposal.phases,
    settings: DEFAULT_SETTINGS,
    spans: [],
    beats: proposal.beats,
    ...parts,
  });
  async function opinions(from: ReviewInputs): Promise<OpinionsEvidence> {
    asked = 0;
    const reply = await pipeline.evidence(from, [], 'opinions', job);
    if (reply.part !== 'opinions') throw new Error('opinions were asked for');
    return reply.value;
  }

  beforeAll(async () => {
    pipeline = createPipeline();
    job = startJob((step) => {
      if (step === 'Asking other methods') asked += 1;
    }).job;
    const file = await openAsBlob(new URL('../fixtures/steady/steady.edf', import.meta.url));
    const { ticket } = await pipeline.open(1, file, 'steady.edf', null, job);
    pipeline.accept(ticket);
    proposal = await pipeline.propose(
      { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS },
      job,
    );
  });

  it('agree on a wave of 3 cpm, by spectrum, model and crests', async () => {
    const { epochs, parts } = await opinions(inputs());
    expect(asked).toBe(epochs.length);
    expect(epochs.length).toBe(2);
    for (const epoch of epochs)
      for (const cpm of [epoch.hannCpm, epoch.burgCpm, epoch.multitaperCpm, epoch.crestCpm])
        expect(Math.abs((cpm ?? 0) - 3)).toBeLessThan(0.15);
    expect(parts[0]).toMatchObject({
      burg: { same: 2, of: 2 },
      multitaper: { same: 2, of: 2 },
      disagreements: [],
    });
  });

  it('pair the powers that the figures have', async () => {
    const { findings } = await pipeline.analyse(inputs(), job);
    const { parts } = await opinions(inputs());
    const [{ figures }] = findings.phases;
    const value = (key: string) => {
      const figure = figures[key];
      return figure.kind === 'number' ? figure.value : null;
    };
    for (const { key, lombMs2, welchMs2 } of parts[0].powers) {
      expect(lombMs2).toBe(value(key));
      expect(welchMs2).toBe(value(key.replace('_ms2', '_welch_ms2')));
    }
    expect(parts[0].powers.map(({ key }) => key)).toEqual(['lf_ms2', 'hf_ms2']);
  });

  it('are not asked again about epochs that an edit of beats leaves as they are', async () => {
    const settings = { ...DEFAULT_SETTINGS, breathingOut: 'never' } as const;
    const roles = { ...proposal.roles, breath: null };
    const first = await opinions(inputs({ roles, settings, phases: [] }));
    const beats = changeBeats(proposal.beats, [beatAt(proposal.beats, 200)], []);
    const after = await opinions(inputs({ roles, settings, phases: [], beats, edit: 1 }));
    expect(after.epochs.map(({ burgCpm }) => burgCpm)).toEqual(
      first.epochs.map(({ burgCpm }) => burgCpm),
    );
  });

  it('have words where no heart is read, where nothing is kept, and where no phase holds an epoch', async () => {
    const noHeart = await opinions(inputs({ roles: { ...proposal.roles, heart: null }, edit: 2 }));
    expect(noHeart.parts[0].powers).toEqual([]);
    const all: Span = {
      id: 1,
      fromS: 0,
      toS: 300,
      lead: null,
      target: 'both',
      cause: 'move',
      origin: 'drawn',
      note: '',
    };
    const spoiled = await opinions(inputs({ spans: [all], edit: 3 }));
    expect(spoiled.epochs).toEqual([]);
    expect(spoiled.parts[0]).toMatchObject({ hannCpm: null, burg: { same: 0, of: 0 } });
    const short = await opinions(
      inputs({ phases: [{ name: 'fasting', fromS: 0, toS: 120 }], edit: 4 }),
    );
    expect(short.epochs).toEqual([]);
  });
});
