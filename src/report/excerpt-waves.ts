import type { Columns, ColumnsRequest } from '../../workers/analysis-api';
import type { Lead } from '../recording/lead';
import type { Phase } from '../recording/phase';
import { excerptsOf, type PictureInput } from './report-pictures';

const WAVE_COLUMNS = 960;

/** Asks for the slow wave of the excerpts of a report; those of which nothing comes are left out. */
export async function excerptWaves(
  of: { readonly lead: Lead; readonly phases: readonly Phase[]; readonly durationS: number },
  columnsOf: (request: ColumnsRequest) => Promise<Columns | null>,
): Promise<PictureInput['waves']> {
  const { lead, phases, durationS } = of;
  const asked = excerptsOf(phases, durationS).map(async (excerpt) => {
    const { fromS, toS } = excerpt;
    const columns = await columnsOf({
      lead,
      signal: 'slow-wave',
      fromS,
      toS,
      columns: WAVE_COLUMNS,
    });
    return columns ? [{ excerpt, columns }] : [];
  });
  return (await Promise.all(asked)).flat();
}
