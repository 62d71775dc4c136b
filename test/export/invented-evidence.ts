import type { Evidence } from '../../src/recording/evidence/evidence';
import { INVENTED_PLANTED } from './invented-planted';
import { INVENTED_RANGES } from './invented-ranges';

/** Evidence of an invented study; each part is filled in by whoever tests what is written of it. */
export const INVENTED_EVIDENCE: Evidence = {
  ranges: INVENTED_RANGES,
  opinions: { lines: [] },
  leads: { lines: [] },
  together: { lines: [] },
  planted: INVENTED_PLANTED,
};
