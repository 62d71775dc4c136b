import { Refusal } from '../recording/failure';
import type { Session, StudyIdentity } from './document';

/**
 * The session of a study whose full SHA-256 is now known. It is a fact about the file and no edit: the log does not grow.
 * Throws Refusal where the session knows another hash or quick key: then it belongs to another file and is left as it is.
 */
export function confirmStudy(session: Session, sha256: string, quickKey: string): Session {
  const { study } = session.state;
  if (study.sha256 === sha256 && study.quickKey === quickKey) return session;
  if (study.sha256 !== null || study.quickKey !== quickKey) throw otherFile(study, sha256);
  const confirmed = <S extends Session['state']>(state: S): S => ({
    ...state,
    study: { ...state.study, sha256 },
  });
  return { ...session, start: confirmed(session.start), state: confirmed(session.state) };
}

function otherFile({ code, sha256: known }: StudyIdentity, sha256: string): Refusal {
  const theirs = known === null ? 'not known' : `starting with ${known.slice(0, 8)}`;
  return new Refusal({
    kind: 'wrong-input',
    message: `This file is not the one that session ${code} was made on: its SHA-256 starts with ${sha256.slice(0, 8)}, the session's is ${theirs}.`,
    place: null,
    remedy:
      'Choose the file the session was made on, or begin a new session; the kept one is left unchanged.',
  });
}
