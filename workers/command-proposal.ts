import type { Recording } from '../src/recording/recording';
import type { Roles } from '../src/recording/roles';
import type { Settings } from '../src/recording/settings';
import type { Proposal } from './analysis-api';
import { checkRoles, phasesWithin, rolesWith } from './command-choices';
import type { AnalyseRequest } from './command-line';
import type { Job } from './job';
import type { Pipeline } from './pipeline';

const NAMED = 'named on the command line';

/**
 * What the program proposes, with the leads that the command line names in the place of its own; the reported lead is still
 * chosen by quality where no slow-wave lead is named. Throws WrongArguments where a named lead or phase does not fit.
 */
export async function proposalOf(
  pipeline: Pick<Pipeline, 'firstRoles' | 'propose'>,
  recording: Recording,
  request: Pick<AnalyseRequest, 'slow' | 'heart' | 'breath' | 'phases'>,
  settings: Settings,
  job: Job,
): Promise<Proposal> {
  const phases = request.phases && phasesWithin(request.phases, recording);
  const propose = (roles: Roles | null) =>
    pipeline.propose({ roles, phases, spans: null, settings }, job);
  const slowNamed = request.slow.length > 0;
  const own = slowNamed ? null : await propose(null);
  if (own && request.heart === null && request.breath === null) return own;
  const roles = rolesWith(own?.roles ?? (await pipeline.firstRoles()), request, recording);
  checkRoles(roles, recording);
  const proposal = await propose(roles);
  const reported = own?.reasons.reported ?? NAMED;
  return { ...proposal, reasons: { ...proposal.reasons, reported } };
}
