import { openAsBlob, readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { BEAT_CLASSES, type BeatList, changeBeats } from '../../src/recording/beat';
import { Refusal } from '../../src/recording/failure';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Span } from '../../src/recording/span';
import { ticksToSeconds } from '../../src/units/ticks';
import type { Proposal, ReviewInputs } from '../../workers/analysis-api';
import { type Job, startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';
import { matchBeats, positivePredictivity, sensitivity } from '../heart/score';

const FIXTURE = new URL('../fixtures/record208/', import.meta.url);
const RATE_HZ = 360;

/** RMSSD over adjacent NN pairs, written down from numbers.md and apart from the program's own code. */
function rmssdByHand(beats: BeatList, blocked: readonly (readonly [number, number])[]): number {
  const seconds = [...beats.ticks].map((tick) => tick / 64 / RATE_HZ);
  const isN = [...beats.classes].map((code) => BEAT_CLASSES[code] === 'N');
  const nn = seconds.slice(1).map((end, i) => {
    const start = seconds[i];
    const clear = !blocked.some(([from, to]) => from < end && to > start);
    const ms = 1000 * (end - start);
    return isN[i] && isN[i + 1] && clear && ms >= 300 && ms <= 2000 ? ms : null;
  });
  let sum = 0;
  let pairs = 0;
  for (let i = 1; i < nn.length; i += 1) {
    const [a, b] = [nn[i - 1], nn[i]];
    if (a === null || b === null) continue;
    sum += (b - a) ** 2;
    pairs += 1;
  }
  return Math.sqrt(sum / pairs);
}

describe('the way of a real recording through the steps', () => {
  let pipeline: Pipeline;
  let proposal: Proposal;
  let job: Job;
  const inputs = (parts: Partial<ReviewInputs> = {}): ReviewInputs => ({
    edit: 0,
    roles: proposal.roles,
    phases: proposal.phases,
    settings: DEFAULT_SETTINGS,
    spans: proposal.spans.map((span, i) => ({ ...span, id: i + 1 })),
    beats: proposal.beats,
    ...parts,
  });

  beforeAll(async () => {
    pipeline = createPipeline();
    job = startJob(() => undefined).job;
    const path = new URL('record208-abdomen.edf', FIXTURE);
    const file = await openAsBlob(path);
    const { ticket } = await pipeline.open(1, file, 'record208-abdomen.edf', null, job);
    expect(pipeline.accept(ticket + 1)).toBe(false);
    expect(pipeline.accept(ticket)).toBe(true);
    proposal = await pipeline.propose(
      { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS },
      job,
    );
  });

  it('phases come from the file’s annotations', () => {
    expect(proposal.phasesFrom).toBe('annotations');
    expect(proposal.phases[0].name).toBe('fasting');
  });

  it('the beats found are those that scipy and the eye found', () => {
    const { beats, not_scored: left } = JSON.parse(
      readFileSync(new URL('reference-beats.json', FIXTURE), 'utf8'),
    ) as {
      readonly beats: readonly { readonly time_s: number }[];
      readonly not_scored: readonly { readonly from_s: number; readonly to_s: number }[];
    };
    const spoiled = proposal.spans.filter(({ target }) => target !== 'stomach');
    const scored = (timeS: number) =>
      !left.some(({ from_s, to_s }) => timeS >= from_s && timeS <= to_s) &&
      !spoiled.some(({ fromS, toS }) => timeS >= fromS - 0.2 && timeS <= toS + 0.2);
    const counts = matchBeats(
      beats.map(({ time_s }) => time_s).filter(scored),
      [...proposal.beats.ticks].map((tick) => ticksToSeconds(tick, RATE_HZ)).filter(scored),
    );
    expect(counts.truePositive).toBeGreaterThan(400);
    expect(sensitivity(counts)).toBeGreaterThanOrEqual(99);
    expect(positivePredictivity(counts)).toBeGreaterThanOrEqual(99);
  });

  it('a figure printed is the one worked out by hand from the beats', async () => {
    const { findings, heart } = await pipeline.analyse(inputs(), job);
    expect(heart).not.toBeNull();
    const spans = inputs().spans.filter(({ target }) => target !== 'stomach');
    const heartLead = proposal.roles.heart;
    const key = heartLead?.kind === 'channel' ? `#${heartLead.channel + 1}` : '';
    const blocked = spans
      .filter(({ lead }) => lead === null || lead === key)
      .map(({ fromS, toS }) => [fromS, toS] as const);
    const figure = findings.phases[0].figures.rmssd_ms;
    if (figure.kind === 'number')
      expect(figure.value).toBeCloseTo(rmssdByHand(proposal.beats, blocked), 6);
    else expect(figure).toMatchObject({ kind: 'withheld' });
  });

  it('an edit of one beat sends back the heart’s part alone, and the figures of that edit', async () => {
    await pipeline.analyse(inputs(), job);
    const tick = proposal.beats.ticks[20];
    const row = {
      tick,
      beatClass: BEAT_CLASSES[proposal.beats.classes[20]],
      origin: 'detected',
    } as const;
    const beats = changeBeats(proposal.beats, [row], []);
    const after = await pipeline.analyse(inputs({ beats, edit: 1 }), job);
    expect(after.edit).toBe(1);
    expect(after.findings.edit).toBe(1);
    expect(after.heart?.value?.rr.rrMs.length).toBe(proposal.beats.ticks.length - 2);
    const again = await pipeline.analyse(inputs({ beats, edit: 2 }), job);
    expect(again.heart).toBeNull();
    expect(again.stomach).toBeNull();
  });

  it('figures come out the same whatever was computed before them', async () => {
    const first = await pipeline.analyse(inputs({ edit: 5 }), job);
    const settings = {
      ...DEFAULT_SETTINGS,
      slowRoute: 'fractional',
      heartRoute: 'fractional',
    } as const;
    await pipeline.analyse(inputs({ settings, edit: 6 }), job);
    const back = await pipeline.analyse(inputs({ edit: 5 }), job);
    expect(back.findings).toEqual(first.findings);
  });

  it('other states give the figures they would give in its place, and leave the review as it is', async () => {
    const reads = vi.spyOn(Blob.prototype, 'slice');
    const settings = {
      ...DEFAULT_SETTINGS,
      slowRoute: 'fractional',
      heartRoute: 'fractional',
    } as const;
    const drawnSpan: Span = {
      id: 1,
      fromS: 100,
      toS: 130,
      lead: null,
      target: 'both',
      cause: 'talk',
      origin: 'drawn',
      note: '',
    };
    const others = [inputs({ spans: [drawnSpan], edit: 10 }), inputs({ settings, edit: 11 })];
    const wanted = [];
    for (const one of others) wanted.push((await pipeline.analyse(one, job)).findings);
    const own = await pipeline.analyse(inputs({ edit: 13 }), job);
    const { roles } = proposal;
    const drawn = pipeline.slowWave(roles.slow[0]);
    expect(await pipeline.figuresOf(others, job)).toEqual(wanted);
    expect(wanted[0]).not.toEqual({ ...wanted[1], edit: 10 });
    expect(pipeline.slowWave(roles.slow[0])).toBe(drawn);
    expect(reads).toHaveBeenCalled();
    reads.mockClear();
    const after = await pipeline.analyse(inputs({ edit: 14 }), job);
    expect(after).toMatchObject({ separation: null, stomach: null, heart: null });
    expect(after.findings).toEqual({ ...own.findings, edit: 14 });
    expect(reads).not.toHaveBeenCalled();
  });

  it('a beat put by hand near a QRS stands on it; one put where nothing is, is placed', async () => {
    await pipeline.analyse(inputs(), job);
    const at = ticksToSeconds(proposal.beats.ticks[30], RATE_HZ);
    const near = pipeline.placeBeat(at + 0.04);
    expect(near.visible).toBe(true);
    expect(Math.abs(ticksToSeconds(near.tick, RATE_HZ) - at)).toBeLessThan(0.01);
  });

  it('panes get columns, not samples, at any width', async () => {
    const lead = proposal.roles.slow[0];
    for (const [fromS, toS] of [
      [0, 300],
      [10, 20],
      [0, 1],
    ] as const) {
      const found = await pipeline.columns({ lead, signal: 'recorded', fromS, toS, columns: 400 });
      expect(found.low.length).toBeLessThanOrEqual(400);
      expect(found.low.length).toBeGreaterThan(200);
    }
  });

  it('work that is stopped ends as a refusal and leaves the study usable', async () => {
    const control = startJob(() => undefined);
    control.cancel();
    const settings = { ...DEFAULT_SETTINGS, heartBandHz: [1, 35] as const };
    await expect(pipeline.analyse(inputs({ settings }), control.job)).rejects.toBeInstanceOf(
      Refusal,
    );
    const { findings } = await pipeline.analyse(inputs({ edit: 9 }), job);
    expect(findings.edit).toBe(9);
  });
});
