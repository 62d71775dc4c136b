import { beforeAll, describe, expect, it } from 'vitest';
import { writeEdfPlus } from '../../src/export/edf-plus';
import type { LeadsEvidence } from '../../src/recording/evidence/leads';
import { leadsLines } from '../../src/recording/evidence/leads-words';
import type { TogetherEvidence } from '../../src/recording/evidence/together';
import { togetherLines } from '../../src/recording/evidence/together-words';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Span } from '../../src/recording/span';
import { simulateStudy } from '../../src/simulate/simulate-study';
import { PLAIN_LEAD, PLAIN_STUDY, type SimulationSpec } from '../../src/simulate/spec';
import type { Proposal, ReviewInputs } from '../../workers/analysis-api';
import { type Job, startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';

const STEP_UV = 0.1;
const LATER_S = 1.6;

function fileOf(spec: SimulationSpec): Blob {
  const { signals, labels } = simulateStudy(spec);
  const parts = writeEdfPlus({
    patient: { code: 'INVENTED', sex: null, birthDate: null, name: 'invented data' },
    recordingFields: {
      investigation: null,
      technician: null,
      equipment: 'test',
      additional: ['invented data'],
    },
    start: '2024-05-14T09:00:00',
    recordDurationS: 1,
    recordCount: spec.durationS,
    signals: signals.map((signal, i) => ({
      label: labels[i],
      transducer: 'none (invented data)',
      unit: 'uV',
      physicalMin: -3276.7,
      physicalMax: 3276.7,
      digitalMin: -32767,
      digitalMax: 32767,
      prefilter: 'HP:DC LP:40Hz',
      samplesPerRecord: spec.rateHz,
      digital: Int16Array.from(signal, (value) => Math.round(value / STEP_UV)),
    })),
    annotations: [],
  });
  return new Blob(parts.map((part) => new Uint8Array(part)));
}

interface Opened {
  readonly pipeline: Pipeline;
  readonly proposal: Proposal;
  readonly job: Job;
}

async function opened(spec: SimulationSpec): Promise<Opened> {
  const { job } = startJob(() => undefined);
  const pipeline = createPipeline();
  const { ticket } = await pipeline.open(1, fileOf(spec), 'invented.edf', null, job);
  pipeline.accept(ticket);
  const given = { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS };
  return { pipeline, proposal: await pipeline.propose(given, job), job };
}

const inputsOf = ({ proposal }: Opened, parts: Partial<ReviewInputs> = {}): ReviewInputs => ({
  edit: 0,
  roles: proposal.roles,
  phases: proposal.phases,
  settings: DEFAULT_SETTINGS,
  spans: proposal.spans.map((span, i) => ({ ...span, id: i + 1 })),
  beats: proposal.beats,
  ...parts,
});

async function evidenceOf(study: Opened, inputs: ReviewInputs) {
  const { pipeline, job } = study;
  await pipeline.analyse(inputs, job);
  const leads = await pipeline.evidence(inputs, [], 'leads', job);
  const together = await pipeline.evidence(inputs, [], 'together', job);
  if (leads.part !== 'leads' || together.part !== 'together') throw new Error('another part');
  return { leads: leads.value, together: together.value };
}

const spanOver = (toS: number): Span => ({
  id: 90,
  fromS: 0,
  toS,
  lead: null,
  target: 'both',
  cause: 'other',
  origin: 'drawn',
  note: '',
});

const TWO_LEADS: SimulationSpec = {
  ...PLAIN_STUDY,
  durationS: 1500,
  rateHz: 100,
  leads: [
    { ...PLAIN_LEAD, label: 'E1-E2' },
    { ...PLAIN_LEAD, label: 'E3-E4', slowGain: 0.7, slowDelayS: LATER_S },
    { ...PLAIN_LEAD, label: 'E4-E5', slowGain: 0.7 },
  ],
  slowWave: {
    frequencyCpm: 3,
    wanderCpm: 0.12,
    wanderS: 90,
    amplitudeUv: 150,
    amplitudeWander: 0.1,
    harmonics: [],
  },
};

describe('two leads that share no electrode, and both rhythms', () => {
  let study: Opened;
  let leads: LeadsEvidence;
  let together: TogetherEvidence;
  let inputs: ReviewInputs;

  beforeAll(async () => {
    study = await opened(TWO_LEADS);
    inputs = inputsOf(study);
    ({ leads, together } = await evidenceOf(study, inputs));
  }, 120_000);

  it('are coupled, with the lead named that is earlier and by how much', () => {
    const pair = leads.pairs.find(({ first, second }) => first === '#1' && second === '#2');
    if (pair?.kind !== 'compared') throw new Error('the pair is not compared');
    expect(pair.electrodes.kind).toBe('apart');
    const [whole] = pair.phases;
    expect(whole.coupling).toMatchObject({ kind: 'number' });
    if (whole.coupling.kind === 'number') expect(whole.coupling.value).toBeGreaterThan(90);
    if (whole.lag.kind !== 'lag') throw new Error('no lag');
    expect(Math.abs(whole.lag.lagS - LATER_S)).toBeLessThan(0.2);
    expect(whole.lag.coherence).toBeGreaterThan(whole.lag.level);
    const known = pair.strip.flatMap(({ lagS }) => (lagS === null ? [] : [lagS]));
    expect(known.length).toBeGreaterThan(15);
    for (const lagS of known) expect(Math.abs(lagS - LATER_S)).toBeLessThan(1);
    expect(leadsLines(leads)[0].words).toMatch(/E1-E2 earlier by 1\.[4-8] s/);
  });

  it('are not shown where they share an electrode, with the reason', () => {
    const pair = leads.pairs.find(({ first, second }) => first === '#2' && second === '#3');
    expect(pair).toMatchObject({
      kind: 'left-out',
      why: 'both use electrode E4: what it records is in both',
    });
  });

  it('give the same leads again after an edit of a beat, without a new computation', async () => {
    const { ticks, classes, origins } = inputs.beats;
    const fewer = { ticks: ticks.slice(1), classes: classes.slice(1), origins: origins.slice(1) };
    const again = await evidenceOf(study, { ...inputs, edit: 1, beats: fewer });
    expect(again.leads).toBe(leads);
    expect(again.together).not.toBe(together);
  });

  it('stand side by side over the same minutes, an epoch a row', () => {
    expect(together.windows).toHaveLength(22);
    for (const one of together.windows) {
      expect(Math.abs((one.dfCpm ?? 0) - 3)).toBeLessThan(0.4);
      expect(Math.abs((one.heartRateBpm ?? 0) - 66)).toBeLessThan(1.5);
      expect(Math.abs((one.breathingPerMin ?? 0) - 15)).toBeLessThan(2);
      expect(one.hfMs2).toBeGreaterThan(100);
    }
    expect(together.phases).toMatchObject([{ name: 'whole', windows: 22, shared: 22 }]);
  });

  it('are tested for a tie with every other explanation beside it', () => {
    const [{ modulation }] = together.phases;
    if (modulation.kind !== 'found') throw new Error(modulation.reason);
    expect(modulation.surrogates).toBeGreaterThanOrEqual(500);
    expect(modulation.leastShiftS).toBeGreaterThanOrEqual(60);
    expect(modulation.cycles).toBeGreaterThan(60);
    expect(modulation.cycles).toBeLessThan(80);
    expect(modulation.p).toBeGreaterThan(0.05);
    const { breathing, waves, leak } = modulation.rivals;
    expect(breathing.perMin).toBeCloseTo(15, 0);
    expect(breathing.multiple).toBe(5);
    expect(waves.verdict).toBe('seen');
    expect(leak.leakUv).toBeLessThan(2);
    const { slowGain } = TWO_LEADS.leads[inputs.roles.reported];
    expect(Math.abs(leak.slowUv / (150 * slowGain) - 1)).toBeLessThan(0.15);
    expect(togetherLines(together)[0].mark).toContain('exploratory, no reference values');
  });
});

describe('studies that carry little', () => {
  it('of two minutes and one lead give words', async () => {
    const study = await opened({ ...TWO_LEADS, durationS: 120, leads: [TWO_LEADS.leads[0]] });
    const { leads, together } = await evidenceOf(study, inputsOf(study));
    expect(leadsLines(leads)[0].words).toBe('one slow-wave lead: nothing to compare');
    expect(together.windows).toEqual([]);
    expect(togetherLines(together)[0].words).toBe('not tested (whole: no epoch has a rhythm)');
  });

  it('wholly spoiled, or without a heart lead, give words', async () => {
    const study = await opened({ ...TWO_LEADS, durationS: 780 });
    const spoiled = await evidenceOf(study, inputsOf(study, { spans: [spanOver(780)] }));
    expect(leadsLines(spoiled.leads)[0].words).toContain('coupled not given');
    expect(togetherLines(spoiled.together)[0].words).toContain('no epoch has a rhythm');
    const roles = { ...study.proposal.roles, heart: null };
    const without = await evidenceOf(study, inputsOf(study, { roles, edit: 1 }));
    expect(togetherLines(without.together)[0].words).toBe('no heart lead is read');
    expect(without.together.windows.some(({ dfCpm }) => dfCpm !== null)).toBe(true);
    expect(without.together.windows.every(({ heartRateBpm }) => heartRateBpm === null)).toBe(true);
  });

  it('with a slow wave made by the beats are told that leakage is seen', async () => {
    const heart = TWO_LEADS.leads[0];
    const study = await opened({
      ...TWO_LEADS,
      seed: 9,
      leads: [{ ...heart, heartUv: 2000, breathingUv: 0 }],
      slowWave: { ...(TWO_LEADS.slowWave ?? never()), amplitudeUv: 1.5, frequencyCpm: 3 },
      heart: {
        ...(TWO_LEADS.heart ?? never()),
        rateBpm: swinging(TWO_LEADS.durationS),
        respiratoryMs: 0,
        lowFrequencyMs: 0,
      },
      noise: { ...TWO_LEADS.noise, backgroundUv: 0.3, whiteUv: 0.2, muscleUv: 0.2 },
    });
    const { together } = await evidenceOf(study, inputsOf(study));
    const [{ modulation }] = together.phases;
    if (modulation.kind !== 'found') throw new Error(modulation.reason);
    expect(modulation.rivals.leak.verdict).toBe('seen');
    expect(modulation.rivals.leak.leakUv).toBeGreaterThan(0.5);
    expect(modulation.p).toBeLessThan(0.05);
    expect(modulation.rivals.leak.withoutDepthPct).toBeLessThan(modulation.depthPct / 2);
    expect(modulation.rivals.leak.withoutP).toBeGreaterThan(0.05);
  });
});

const never = (): never => {
  throw new Error('the plain study has it');
};

/** A heart rate that swings by 6 a minute about 66, near three times a minute but not quite regularly. */
function swinging(durationS: number) {
  let turn = 0;
  return Array.from({ length: Math.floor(durationS / 2) }, (_, k) => {
    turn += (2 * Math.PI * 2 * (3 + 0.25 * Math.sin(k / 37) + 0.15 * Math.sin(k / 11))) / 60;
    return { atS: 2 * k, value: 66 + 6 * Math.sin(turn) };
  });
}
