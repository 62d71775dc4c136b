import { reportStatus } from '../export/report-status';
import type { Session } from '../session/document';

/** What the page says of the signature. */
export interface SignatureState {
  /** For the bar: short; '' while nobody has signed. */
  readonly words: string;
  /** The same in full. */
  readonly whole: string;
  /** True where the study was changed after it was signed. */
  readonly changed: boolean;
}

const UNSIGNED: SignatureState = { words: '', whole: '', changed: false };

/** Who signed the study last and as what, or that it was changed since. */
export function signatureState(session: Session): SignatureState {
  const status = reportStatus(session);
  const last = session.state.signed.at(-1);
  if (!last) return UNSIGNED;
  if (status.kind !== 'draft') {
    const { meaning, name } = status.signature;
    const as = meaning === 'amended' ? 'amended and signed' : `signed as ${meaning}`;
    return { words: `${as} by ${name}`, whole: `${as} by ${name}`, changed: false };
  }
  return session.log.length > last.edit + 1
    ? { words: 'changed since signed', whole: status.why, changed: true }
    : { words: `${last.meaning} by ${last.name}`, whole: status.why, changed: false };
}

/** What a person must hear when an edit takes a signature out of force; null where it does not. */
export function signatureLost(before: Session, now: Session): string | null {
  const [was, is] = [signatureState(before), signatureState(now)];
  if (was.words === '' || was.changed || !is.changed) return null;
  const final = reportStatus(before).kind !== 'draft';
  const words = `${is.whole.charAt(0).toUpperCase()}${is.whole.slice(1)}.`;
  return final ? `The report is a draft again. ${words}` : words;
}
