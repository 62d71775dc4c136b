import { Refusal } from '../recording/failure';
import type { Session } from './document';

/**
 * The session of a study whose full SHA-256 is now known. It is a fact about the file and no edit: the log does not grow.
 * Throws Refusal where the session knows another hash: then it belongs to another file and is left as it is.
 */
export function confirmStudy(session: Session, sha256: string): Session {
  const known = session.state.study.sha256;
  if (known === sha256) return session;
  if (known !== null)
    throw new Refusal({
      kind: 'wrong-input',
      message: `This file is not the one that session ${session.state.study.code} was made on: its SHA-256 starts with ${sha256.slice(0, 8)}, the session's with ${known.slice(0, 8)}.`,
      place: null,
      remedy:
        'Choose the file the session was made on, or begin a new session; the kept one is left unchanged.',
    });
  const confirmed = <S extends Session['state']>(state: S): S => ({
    ...state,
    study: { ...state.study, sha256 },
  });
  return { ...session, start: confirmed(session.start), state: confirmed(session.state) };
}
