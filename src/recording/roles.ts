import type { Lead } from './lead';

/** Which lead serves what, and why. */
export interface Roles {
  /** At least one; the order is that of the panes. */
  readonly slow: readonly Lead[];
  /** Place in `slow` of the lead whose figures are reported. */
  readonly reported: number;
  readonly heart: Lead | null;
  readonly breath: Lead | null;
}

/** A reason for each role, in words for the person. */
export interface RoleReasons {
  readonly slow: readonly string[];
  readonly reported: string;
  readonly heart: string;
  readonly breath: string;
}
