import type { Signature } from '../session/document';
import type { Hide } from './report-hiding';
import type { ReportStatus } from './report-status';

/** One line of the signature block. */
export interface SignatureRow {
  readonly meaning: Signature['meaning'];
  readonly name: string;
  readonly time: string;
  readonly reason: string;
  /** True for the signature that the report now stands on. */
  readonly current: boolean;
}

/** A time in UTC to the minute, as the report writes it; the year alone where dates are hidden, since a date can identify. */
export const signedAt = (atUtc: string, hidden: boolean): string =>
  hidden
    ? `${atUtc.slice(0, 4)} (day and time hidden)`
    : `${atUtc.slice(0, 16).replace('T', ' ')} UTC`;

/** The status in one line, without the reason of an amendment; a draft says of which edit it is. */
export function statusWords(status: ReportStatus, edit: number, hidden: boolean): string {
  if (status.kind === 'draft') return `Draft of edit ${edit}: ${status.why}`;
  const { name, atUtc } = status.signature;
  const by = `signed ${signedAt(atUtc, hidden)} by ${name}`;
  return `${status.kind === 'final' ? 'Final' : 'Amended'}: ${by}`;
}

/** All signatures, oldest first; a draft has none in force. */
export function signatureRows(
  status: ReportStatus,
  hidden: boolean,
  hide: Hide,
): readonly SignatureRow[] {
  const current = status.kind === 'draft' ? [] : [status.signature];
  return [...status.former, ...current].map((one) => ({
    meaning: one.meaning,
    name: hide(one.name),
    time: signedAt(one.atUtc, hidden),
    reason: hide(one.reason),
    current: current.includes(one),
  }));
}
