import { readFile } from 'node:fs/promises';
import { describe, expect, it } from 'vitest';
import type { PlantedEvidence } from '../../src/recording/evidence/planted';
import { plantedLines } from '../../src/recording/evidence/planted-words';
import type { Phase } from '../../src/recording/phase';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import type { Span } from '../../src/recording/span';
import type { ReviewInputs } from '../../workers/analysis-api';
import { startJob } from '../../workers/job';
import { createPipeline } from '../../workers/pipeline';

const { job } = startJob(() => undefined);

interface Wish {
  readonly phases?: readonly Phase[];
  readonly spans?: readonly Span[];
  readonly settings?: Settings;
  readonly withoutHeart?: boolean;
}

async function opened(file: Blob, name: string, wish: Wish = {}) {
  const pipeline = createPipeline();
  const { ticket } = await pipeline.open(1, file, name, null, job);
  pipeline.accept(ticket);
  const settings = wish.settings ?? DEFAULT_SETTINGS;
  const proposal = await pipeline.propose(
    { roles: null, phases: null, spans: null, settings },
    job,
  );
  const { roles, beats } = proposal;
  const inputs: ReviewInputs = {
    edit: 0,
    roles: wish.withoutHeart ? { ...roles, heart: null } : roles,
    phases: wish.phases ?? proposal.phases,
    spans: wish.spans ?? proposal.spans.map((span, i) => ({ ...span, id: i + 1 })),
    beats,
    settings,
  };
  return { pipeline, inputs };
}

async function plantedIn(file: Blob, name: string, wish: Wish = {}): Promise<PlantedEvidence> {
  const { pipeline, inputs } = await opened(file, name, wish);
  const reply = await pipeline.evidence(inputs, [], 'planted', job);
  if (reply.part !== 'planted') throw new Error('the part asked for is given');
  return reply.value;
}

/** The open record 208: five real minutes of an ECG with an invented slow wave. */
const record = async () =>
  new Blob([await readFile('test/fixtures/record208/record208-abdomen.edf')]);

/** Invented text: a slow wave of 3 a minute at some samples a second, for some minutes. */
function text(rateHz: number, minutes: number): Blob {
  const rows = ['time,EGG (uV)'];
  for (let i = 0; i < minutes * 60 * rateHz; i += 1) {
    const t = i / rateHz;
    rows.push(`${t},${(100 * Math.sin(2 * Math.PI * 0.05 * t) + 8 * Math.sin(i * i)).toFixed(3)}`);
  }
  return new Blob([`${rows.join('\n')}\n`]);
}

const spoilAll: Span = {
  id: 1,
  fromS: 0,
  toS: 1e6,
  lead: null,
  target: 'both',
  cause: 'move',
  origin: 'drawn',
  note: '',
};

const reasonOf = (part: PlantedEvidence['slow'] | PlantedEvidence['heart']): string | null =>
  part.kind === 'not-planted' ? part.reason : null;

/** Every number in a value, however deep. */
function numbersIn(value: unknown): readonly number[] {
  if (typeof value === 'number') return [value];
  if (value instanceof Float32Array) return [];
  if (typeof value !== 'object' || value === null) return [];
  return Object.values(value).flatMap(numbersIn);
}

describe('the planted check of a study', () => {
  it('scores a short study in fewer stretches, and says so', async () => {
    const value = await plantedIn(await record(), 'record208.edf');
    if (value.slow.kind !== 'planted' || value.heart.kind !== 'planted')
      throw new Error(`${reasonOf(value.slow)} ${reasonOf(value.heart)}`);
    expect(value.slow.stretches).toBe(1);
    expect(numbersIn(value).every(Number.isFinite)).toBe(true);
    expect(value.heart.stretches).toBe(5);
    expect(value.heart.beats[0].sensitivityPct?.median).toBeGreaterThan(90);
    const marks = plantedLines(value).map(({ mark }) => mark);
    expect(marks).toContain('One stretch only: the study is short');
  });

  it('is the same for the same review, and is kept until something it hangs on changes', async () => {
    const { pipeline, inputs } = await opened(await record(), 'record208.edf');
    const ask = async (one: ReviewInputs) => {
      const reply = await pipeline.evidence(one, [], 'planted', job);
      return reply.part === 'planted' ? reply.value : null;
    };
    const first = await ask(inputs);
    expect((await ask({ ...inputs, edit: 3 }))?.slow).toBe(first?.slow);
    const without = { ...inputs.beats };
    const fewer = {
      ticks: without.ticks.slice(1),
      classes: without.classes.slice(1),
      origins: without.origins.slice(1),
    };
    const edited = await ask({ ...inputs, edit: 4, beats: fewer });
    expect(edited?.heart).not.toBe(first?.heart);
    expect(await plantedIn(await record(), 'record208.edf')).toEqual(first);
  });

  it.each(['fractional', 'beat-average'] as const)(
    'takes the route %s as the study does',
    async (slowRoute) => {
      const settings: Settings = { ...DEFAULT_SETTINGS, slowRoute };
      const { slow } = await plantedIn(await record(), 'record208.edf', { settings });
      if (slow.kind !== 'planted') throw new Error(slow.reason);
      const own = slow.waves.find(({ rate }) => rate.kind === 'steady' && rate.cpm === 3);
      expect(own?.scale?.median).toBeGreaterThan(0.8);
      expect(own?.scale?.median).toBeLessThan(1.2);
      // Order 0.5 leads by 2.5 s at 3 cpm; taking beats out delays nothing.
      const delayS = slowRoute === 'fractional' ? -2.5 : 0;
      expect(Math.abs((own?.delayS?.median ?? Number.NaN) - delayS)).toBeLessThan(0.6);
    },
  );

  it('says why it is not made where nothing is kept, nothing is long enough or there is no heartbeat', async () => {
    const spoiled = await plantedIn(await record(), 'record208.edf', { spans: [spoilAll] });
    expect(reasonOf(spoiled.slow)).toMatch(/kept/);
    expect(reasonOf((await plantedIn(text(8, 2), 'short.csv')).slow)).toMatch(/four minutes/);
    const slow = await plantedIn(text(8, 10), 'slow.csv');
    expect(slow.slow.kind).toBe('planted');
    expect(reasonOf(slow.heart)).toBe('There is no heart lead.');
    const without = await plantedIn(await record(), 'record208.edf', { withoutHeart: true });
    expect(without.slow.kind).toBe('planted');
    expect(reasonOf(without.heart)).toBe('There is no heart lead.');
    expect(plantedLines(without).at(-1)?.words).toBe('Not made. There is no heart lead.');
  });

  it('stops when it is told to', async () => {
    const { pipeline, inputs } = await opened(await record(), 'record208.edf');
    const stopped = startJob(() => undefined);
    const asked = pipeline.evidence(inputs, [], 'planted', stopped.job);
    stopped.cancel();
    await expect(asked).rejects.toThrow('stopped');
  });
});
