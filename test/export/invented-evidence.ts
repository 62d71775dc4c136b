import type { Evidence } from '../../src/recording/evidence/evidence';
import { INVENTED_PLANTED } from './invented-planted';

/** Evidence of an invented study; each part is filled in by whoever tests what is written of it. */
export const INVENTED_EVIDENCE: Evidence = {
  ranges: { lines: [] },
  opinions: { lines: [] },
  leads: { lines: [] },
  together: { lines: [] },
  planted: INVENTED_PLANTED,
};
