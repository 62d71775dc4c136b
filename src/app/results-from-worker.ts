import type { AnalysisClient, CallOptions } from '../../workers/analysis-client';
import { EVIDENCE_PARTS, type Evidence, wholeOf } from '../recording/evidence/evidence';
import type { Reply } from '../recording/failure';
import { excerptWaves } from '../report/excerpt-waves';
import type { ResultInput } from '../report/result-files';
import type { Session } from '../session/document';
import { inputsOf } from './analysis-runner';

/** What results ask of the worker. */
export type ResultClient = Pick<AnalysisClient, 'doubts' | 'evidence' | 'separated' | 'columns'>;

type FromWorker = Pick<ResultInput, 'openDoubts' | 'evidence' | 'signals' | 'waves'>;

/** What of the results is not on the page already; what the worker has computed before costs nothing. */
export async function resultsFromWorker(
  client: ResultClient,
  open: Session,
  durationS: number,
  watch: CallOptions,
): Promise<Reply<FromWorker>> {
  const inputs = inputsOf(open);
  const { doubts: settled, roles, phases } = open.state;
  const doubts = await client.doubts(inputs, settled, watch);
  if (!doubts.ok) return doubts;
  const made: Partial<Evidence> = {};
  for (const part of EVIDENCE_PARTS) {
    const reply = await client.evidence(inputs, settled, part, watch);
    if (!reply.ok) return reply;
    Object.assign(made, { [part]: reply.value.value });
  }
  const signals = await client.separated(inputs, watch);
  if (!signals.ok) return signals;
  const lead = roles.slow[roles.reported];
  const waves = await excerptWaves({ lead, phases, durationS }, async (request) => {
    const columns = await client.columns(request);
    return columns.ok ? columns.value : null;
  });
  return {
    ok: true,
    value: {
      openDoubts: doubts.value.open,
      evidence: wholeOf(made),
      signals: signals.value,
      waves,
    },
  };
}
