import { expect, test } from 'vitest';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import { bestCell, type OrganMap } from '../../src/recording/settings-map';
import { simulateStudy } from '../../src/simulate/simulate-study';
import { PLAIN_LEAD, PLAIN_STUDY, type SimulationSpec } from '../../src/simulate/spec';
import { startJob } from '../../workers/job';
import { createPipeline } from '../../workers/pipeline';

/** An invented study as text, so that any rate and length go. */
function textOf(spec: SimulationSpec): Blob {
  const { signals, rateHz } = simulateStudy(spec);
  const rows = ['time,EGG 1 (uV)'];
  signals[0].forEach((value, i) => {
    rows.push(`${(i / rateHz).toFixed(4)},${value.toFixed(2)}`);
  });
  return new Blob([`${rows.join('\n')}\n`]);
}

const SPEC: SimulationSpec = {
  ...PLAIN_STUDY,
  seed: 3,
  durationS: 720,
  rateHz: 100,
  leads: [{ ...PLAIN_LEAD, heartUv: 300 }],
  slowWave: PLAIN_STUDY.slowWave && { ...PLAIN_STUDY.slowWave, wanderCpm: 0.15 },
};

async function opened(spec: SimulationSpec, change: Partial<Settings> = {}) {
  const pipeline = createPipeline();
  const { job, cancel } = startJob(() => undefined);
  const { ticket } = await pipeline.open(1, textOf(spec), 'invented.csv', null, job);
  pipeline.accept(ticket);
  const settings = { ...DEFAULT_SETTINGS, ...change };
  const proposal = await pipeline.propose(
    { roles: null, phases: null, spans: null, settings },
    job,
  );
  const spans = proposal.spans.map((span, i) => ({ ...span, id: i + 1 }));
  return { pipeline, job, cancel, inputs: { ...proposal, settings, spans, edit: 4 } };
}

const isMap = (one: { readonly kind: string }): one is OrganMap => one.kind === 'map';
const scoresIn = (map: OrganMap) =>
  [map.recorded, map.noisy].flatMap(({ cells, bars, asSet }) => [...cells.flat(), ...bars, asSet]);

test('a study has a map an organ, finite throughout, with the other routes by the same score', async () => {
  const { pipeline, job, inputs } = await opened(SPEC);
  const map = await pipeline.settingsMap(inputs, job);
  expect(map.edit).toBe(4);
  if (!isMap(map.slow) || !isMap(map.heart)) throw new Error('both organs have a map');
  for (const one of [map.slow, map.heart]) {
    expect(scoresIn(one).every(({ snrDb, aheadS }) => Number.isFinite(snrDb + aheadS))).toBe(true);
    expect(one.recorded.cells.flat()).toHaveLength(420);
    const { order, window } = bestCell(one.recorded);
    expect(one.recorded.cells[order][window].snrDb).toBeGreaterThan(
      one.noisy.cells[order][window].snrDb,
    );
  }
  expect(map.slow.recorded.bars.map(({ route }) => route)).toEqual(['band', 'beat-average']);
  expect(map.slow.recorded.bars[0].snrDb).toBeGreaterThan(18);
  expect(map.heart.recorded.bars.map(({ route }) => route)).toEqual(['band']);
  if (map.slow.target.kind !== 'wave') throw new Error('the slow wave is a wave');
  expect(Math.abs(map.slow.target.cpm - 3)).toBeLessThan(0.3);
  expect(map.slow.target.uv).toBeGreaterThan(0.9 * 150);
  expect(map.slow.target.uv).toBeLessThan(1.1 * 150);
}, 60_000);

test('route beat-average scores higher than band where a weak wave lies under tall T waves and early beats', async () => {
  const { heart, slowWave } = PLAIN_STUDY;
  const { pipeline, job, inputs } = await opened({
    ...SPEC,
    leads: [{ ...PLAIN_LEAD, heartUv: 1000, breathingUv: 5 }],
    slowWave: slowWave && { ...slowWave, amplitudeUv: 30, wanderCpm: 0.15 },
    heart: heart && { ...heart, tWave: 0.35, ventricularPerHour: 60 },
    noise: { ...PLAIN_STUDY.noise, backgroundUv: 2 },
  });
  const { slow } = await pipeline.settingsMap({ ...inputs, spans: [] }, job);
  if (!isMap(slow)) throw new Error('the slow wave has a map');
  const [band, average] = slow.recorded.bars;
  expect(average.route).toBe('beat-average');
  expect(average.snrDb).toBeGreaterThan(band.snrDb + 3);
}, 60_000);

test('settings on the map have the score of their cell', async () => {
  const { fractional } = DEFAULT_SETTINGS;
  const { pipeline, job, inputs } = await opened(SPEC, {
    fractional: { ...fractional, order: 0.35, slowWindowMs: 400, heartWindowMs: 65 },
  });
  const map = await pipeline.settingsMap(inputs, job);
  for (const one of [map.slow, map.heart]) {
    if (!isMap(one)) throw new Error('both organs have a map');
    const cell = one.recorded.cells[7][one.windowsMs.indexOf(one.windowMs)];
    expect(one.recorded.asSet.snrDb).toBeCloseTo(cell.snrDb, 9);
  }
}, 60_000);

test('where there is no heart lead, or no four clean minutes, it says so', async () => {
  const slow = await opened({ ...SPEC, rateHz: 8 });
  const withoutHeart = await slow.pipeline.settingsMap(slow.inputs, slow.job);
  expect(withoutHeart.slow.kind).toBe('map');
  expect(withoutHeart.heart).toMatchObject({
    kind: 'no-map',
    reason: expect.stringMatching(/heartbeat/),
  });

  const short = await opened({ ...SPEC, durationS: 120 });
  const none = await short.pipeline.settingsMap(short.inputs, short.job);
  expect(none.slow).toMatchObject({
    kind: 'no-map',
    reason: expect.stringMatching(/four minutes/),
  });
  expect(none.heart).toMatchObject({ kind: 'no-map' });

  const spoiled = await opened(SPEC);
  const whole = {
    id: 99,
    fromS: 0,
    toS: 720,
    lead: null,
    target: 'both',
    cause: 'other',
    origin: 'drawn',
    note: '',
  } as const;
  const all = { ...spoiled.inputs, spans: [whole] };
  const lost = await spoiled.pipeline.settingsMap(all, spoiled.job);
  expect([lost.slow.kind, lost.heart.kind]).toEqual(['no-map', 'no-map']);
}, 60_000);

test('a map under way can be stopped', async () => {
  const { pipeline, job, cancel, inputs } = await opened(SPEC);
  await pipeline.analyse(inputs, job);
  const work = pipeline.settingsMap(inputs, job);
  cancel();
  await expect(work).rejects.toMatchObject({ failure: { kind: 'cancelled' } });
}, 60_000);
