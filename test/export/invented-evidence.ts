import type { Evidence } from '../../src/recording/evidence/evidence';
import { INVENTED_LEADS } from './invented-leads';
import { INVENTED_OPINIONS } from './invented-opinions';
import { INVENTED_PLANTED } from './invented-planted';
import { INVENTED_RANGES } from './invented-ranges';
import { INVENTED_TOGETHER } from './invented-together';

/** Evidence of an invented study; each part is filled in by whoever tests what is written of it. */
export const INVENTED_EVIDENCE: Evidence = {
  ranges: INVENTED_RANGES,
  opinions: INVENTED_OPINIONS,
  leads: INVENTED_LEADS,
  together: INVENTED_TOGETHER,
  planted: INVENTED_PLANTED,
};
