import { openAsBlob, readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { median } from '../../src/numeric/statistics';
import type { BeatList } from '../../src/recording/beat';
import { Refusal } from '../../src/recording/failure';
import { type Lead, leadKey } from '../../src/recording/lead';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Proposal, WithinRequest } from '../../workers/analysis-api';
import { type Job, startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';
import { matchBeats, positivePredictivity, sensitivity } from '../heart/score';

const FIXTURE = new URL('../fixtures/record208/', import.meta.url);
const RATE_HZ = 360;
/** Reference beats of scipy and the eye (test/fixtures/record208/reference_beats.py). */
const REFERENCE = (
  JSON.parse(readFileSync(new URL('reference-beats.json', FIXTURE), 'utf8')) as {
    readonly beats: readonly { readonly time_s: number }[];
  }
).beats.map(({ time_s }) => time_s);

const inside = (timesS: readonly number[], { fromS, toS }: { fromS: number; toS: number }) =>
  timesS.filter((atS) => atS >= fromS && atS <= toS);
const secondsOf = ({ ticks }: BeatList) => Array.from(ticks, (tick) => tick / 64 / RATE_HZ);

describe('beats of a stretch found again', () => {
  let pipeline: Pipeline;
  let proposal: Proposal;
  let job: Job;
  let heartLead: Lead;
  const find = (parts: Partial<WithinRequest> = {}) =>
    pipeline.detectWithin(
      {
        fromS: 100,
        toS: 130,
        lead: heartLead,
        heartLead,
        polarity: 'dominant',
        eager: 'usual',
        spans: [],
        settings: DEFAULT_SETTINGS,
        ...parts,
      },
      job,
    );
  const otherLead = (): Lead => ({
    kind: 'channel',
    channel: leadKey(heartLead) === '#1' ? 1 : 0,
  });

  beforeAll(async () => {
    pipeline = createPipeline();
    job = startJob(() => undefined).job;
    const file = await openAsBlob(new URL('record208-abdomen.edf', FIXTURE));
    const { ticket } = await pipeline.open(1, file, 'record208-abdomen.edf', null, job);
    pipeline.accept(ticket);
    proposal = await pipeline.propose(
      { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS },
      job,
    );
    if (!proposal.roles.heart) throw new Error('a heart lead is expected');
    heartLead = proposal.roles.heart;
  });

  it('with the choices of the study are those of the study, from the stretch and its surroundings alone', async () => {
    const { beats, lookedIn } = await find();
    expect(lookedIn).toEqual({ fromS: 40, toS: 190 });
    const stretch = { fromS: 100, toS: 130 };
    const counts = matchBeats(
      inside(secondsOf(proposal.beats), stretch),
      inside(secondsOf(beats), stretch),
      0.06,
    );
    expect(counts).toMatchObject({ falseNegative: 0, falsePositive: 0 });
  });

  it('in another lead, and in a difference of two, are the beats of the reference', async () => {
    const difference: Lead = { kind: 'difference', plus: 0, minus: 1 };
    for (const lead of [otherLead(), difference]) {
      const { beats } = await find({ lead });
      const stretch = { fromS: 100, toS: 130 };
      const counts = matchBeats(
        inside(REFERENCE, stretch),
        inside(secondsOf(beats), stretch),
        0.15,
      );
      expect(sensitivity(counts), leadKey(lead)).toBeGreaterThan(95);
      expect(positivePredictivity(counts), leadKey(lead)).toBeGreaterThan(95);
    }
  });

  it('stand at crests where the upright extreme is asked for, at troughs where the inverted one is', async () => {
    const heart = pipeline.heartbeat(heartLead);
    if (!heart) throw new Error('a heartbeat is expected');
    const levelAt = ({ beats }: { readonly beats: BeatList }) =>
      median(secondsOf(beats).map((atS) => heart.heartbeat[Math.round(atS * heart.rateHz)]));
    expect(levelAt(await find({ polarity: 'upright' }))).toBeGreaterThan(0);
    expect(levelAt(await find({ polarity: 'inverted' }))).toBeLessThan(0);
  });

  it('are no fewer the more eagerly they are looked for', async () => {
    const whole = { fromS: 0, toS: 300 };
    const counts: number[] = [];
    for (const eager of ['less', 'usual', 'more'] as const)
      counts.push((await find({ ...whole, eager })).beats.ticks.length);
    expect(counts).toEqual([...counts].sort((a, b) => a - b));
    expect(counts[2]).toBeGreaterThan(counts[0]);
  });

  it('are not looked for in spans spoiled for the heart, which are told', async () => {
    const span = {
      id: 1,
      fromS: 110,
      toS: 115,
      lead: null,
      target: 'heart' as const,
      cause: 'move' as const,
      origin: 'drawn' as const,
      note: '',
    };
    const { beats, left } = await find({ spans: [span, { ...span, id: 2, fromS: 150, toS: 160 }] });
    expect(inside(secondsOf(beats), { fromS: 110.1, toS: 114.9 })).toEqual([]);
    expect(left).toEqual([{ fromS: 110, toS: 115 }]);
  });

  it('are refused in a lead that does not exist, with the remedy', async () => {
    const refused = find({ lead: { kind: 'channel', channel: 17 } });
    await expect(refused).rejects.toBeInstanceOf(Refusal);
    await expect(refused).rejects.toMatchObject({ failure: { remedy: 'Choose another lead.' } });
  });
});
