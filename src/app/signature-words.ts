import { reportStatus } from '../export/report-status';
import type { Session } from '../session/document';

/** What the bar says of the signature. */
export interface SignatureState {
  /** '' while nobody has signed. */
  readonly words: string;
  /** True where the study was changed after it was signed. */
  readonly changed: boolean;
}

/** Who signed the study last and as what, or that it was changed since. */
export function signatureState(session: Session): SignatureState {
  const status = reportStatus(session);
  const last = session.state.signed.at(-1);
  if (!last) return { words: '', changed: false };
  if (status.kind === 'draft')
    return { words: status.why, changed: session.log.length > last.edit + 1 };
  const { meaning, name } = status.signature;
  const as = meaning === 'amended' ? 'amended and signed' : `signed as ${meaning}`;
  return { words: `${as} by ${name}`, changed: false };
}
