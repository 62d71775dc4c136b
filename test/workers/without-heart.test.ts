import { expect, it } from 'vitest';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { startJob } from '../../workers/job';
import { createPipeline } from '../../workers/pipeline';

const RATE_HZ = 8;
const MINUTES = 20;

/** Invented text at 8 samples a second, too few for a heartbeat: a slow wave of 3 a minute, and a belt that moves 15 times a minute. */
function study(belt: string): Blob {
  const rows = [`time,EGG (uV)${belt === '' ? '' : `,${belt} (au)`}`];
  for (let i = 0; i < MINUTES * 60 * RATE_HZ; i += 1) {
    const t = i / RATE_HZ;
    const slow = 100 * Math.sin(2 * Math.PI * 0.05 * t) + 5 * Math.sin(i * i);
    const breath = 3 * Math.sin(2 * Math.PI * 0.25 * t);
    rows.push(`${t},${slow.toFixed(3)}${belt === '' ? '' : `,${breath.toFixed(3)}`}`);
  }
  return new Blob([`${rows.join('\n')}\n`]);
}

async function breathingOf(belt: string) {
  const pipeline = createPipeline();
  const { job } = startJob(() => undefined);
  const opened = await pipeline.open(1, study(belt), 'invented.csv', null, job);
  pipeline.accept(opened.ticket);
  const given = { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS };
  const proposal = await pipeline.propose(given, job);
  expect(proposal.roles.heart).toBeNull();
  const inputs = { ...proposal, settings: DEFAULT_SETTINGS, spans: [], edit: 0 };
  return (await pipeline.analyse(inputs, job)).findings.phases[0].figures.breathing_bpm;
}

it('breathing is told from its own lead where no heartbeat can be read', async () => {
  const figure = await breathingOf('Resp');
  expect(figure).toMatchObject({ kind: 'number', marks: [] });
  if (figure.kind === 'number') expect(figure.value).toBeCloseTo(15, 1);
});

it('without heart and breathing lead it is withheld with the reason, not left out', async () => {
  expect(await breathingOf('')).toEqual({
    kind: 'withheld',
    reason: 'no breathing lead, and no beats to derive it from',
  });
});
