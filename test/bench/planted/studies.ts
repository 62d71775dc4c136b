import { openRecording } from '../../../src/decode/formats';
import { DEFAULT_SETTINGS, type Settings } from '../../../src/recording/settings';
import {
  type SimulatedStudy,
  simulateSources,
  simulateStudy,
} from '../../../src/simulate/simulate-study';
import type { SimulationSpec } from '../../../src/simulate/spec';
import type { Job } from '../../../workers/job';
import { doubtInputs } from '../../../workers/pipeline-analyse';
import type { EvidenceInputs } from '../../../workers/pipeline-evidence';
import { slowCheckOf } from '../../../workers/pipeline-planted';
import type { SlowCheck } from '../../../workers/pipeline-planted-judge';
import { propose } from '../../../workers/pipeline-propose';
import { createStudy } from '../../../workers/pipeline-study';
import { fileOf } from '../accuracy/analysed';
import { PHASES } from '../accuracy/families';
import { at4Hz } from '../accuracy/slow-wave-score';

const LEAD = { kind: 'channel', channel: 0 } as const;

/** What the evidence of an invented study that nobody has touched stands on. */
export async function evidenceInputs(
  study: SimulatedStudy,
  spec: SimulationSpec,
  job: Job,
  settings: Settings = DEFAULT_SETTINGS,
): Promise<EvidenceInputs> {
  const opened = createStudy(await openRecording(fileOf(study, spec), 'invented.edf', null));
  const roles = { slow: [LEAD], reported: 0, heart: LEAD, breath: null };
  const proposal = await propose(opened, { roles, phases: PHASES, spans: null, settings }, job);
  const spans = proposal.spans.map((span, i) => ({ ...span, id: i + 1 }));
  const { beats } = proposal;
  const inputs = { edit: 0, roles, phases: PHASES, settings, spans, beats };
  return { ...(await doubtInputs(opened, inputs, job)), study: opened, open: [] };
}

/** The check of an invented study, and the same with what is really left of its lead once the slow wave is taken away. */
export async function checks(spec: SimulationSpec, job: Job, settings?: Settings) {
  const study = simulateStudy(spec);
  const from = await evidenceInputs(study, spec, job, settings);
  const check = await slowCheckOf(from, job);
  if (!check) throw new Error('there is a leftover of 40 minutes');
  const own = at4Hz(simulateSources(spec).leads[0]['slow wave'], spec.rateHz);
  const change = own.map((value) => -value);
  const lead = check.lead.slow.recorded.map((value, i) => value + change[i]);
  const truth: SlowCheck = { ...check, leftover: { lead, change, restDb: null } };
  return { check, truth, lead };
}
