import {
  deepTexts,
  identityTexts,
  namesOfPhases,
  recordingWithout,
  stateWithout,
  without,
} from '../export/without-identity';
import type { Identity, Recording } from '../recording/recording';
import type { Change, LogLine, Session, SessionState, Signature } from '../session/document';
import { clockMs, clockText } from '../units/calendar';
import type { ResultInput } from './result-files';

const X: Identity = { code: 'X', name: 'X', sex: 'X', birthYear: null, recordingText: '' };
/** The day every recording begins on: the first that an EDF+ header can name (Kemp & Olivan 2003). */
const FIRST_DAY = '1985-01-01T00:00:00';
const OLDEST_YEARS = 89;

/** Age in whole years by the years alone, "over 89" above that, "X" where it is not known. */
export function ageWords({ identity, start }: Recording): string {
  if (identity.birthYear === null || start.kind !== 'known') return 'X';
  const years = Number(start.local.slice(0, 4)) - identity.birthYear;
  return years > OLDEST_YEARS ? `over ${OLDEST_YEARS}` : String(years);
}

/**
 * The results of a review without whose they are: X for the identity fields, the recording's start and all other times moved
 * to the first day of 1985 by one shift, no free text, no names of reviewers, no texts of the log, no hash, no file name, none of the site's
 * reference values, whose words may say where it was. What
 * is computed stays as it is. A heartbeat trace can itself identify a person.
 */
export function resultsWithoutIdentity(input: ResultInput): ResultInput {
  const { recording, session, state, findings, evidence, stomach, heart } = input;
  const texts = identityTexts(recording, session);
  const phases = namesOfPhases([...session.start.phases, ...state.phases], texts);
  const plain = (text: string) => without(phases(text), texts);
  const shifted = timeShift(recording);
  const bare = (of: SessionState): SessionState => bareState(of, texts, plain, shifted);
  const bareSession: Session = {
    start: bare(session.start),
    log: session.log.map((line) => bareLine(line, session, plain, shifted)),
    state: bare(state),
  };
  return {
    ...input,
    recording: {
      ...recordingWithout(recording),
      fileName: 'X',
      identity: X,
      start:
        recording.start.kind === 'known'
          ? { kind: 'known', local: FIRST_DAY }
          : { kind: 'unknown', raw: '' },
    },
    session: bareSession,
    state: bareSession.state,
    sha256: null,
    age: ageWords(recording),
    siteReference: null,
    findings: deepTexts(findings, plain),
    evidence: deepTexts(evidence, plain),
    stomach: deepTexts(stomach, plain),
    heart: deepTexts(heart, plain),
    openDoubts: deepTexts(input.openDoubts, plain),
  };
}

/** Moves a time of day and date by what brings the recording's start to the first day; unknown starts move nothing but the date away. */
function timeShift({ start }: Recording): (utc: string) => string {
  if (start.kind !== 'known') return () => `${FIRST_DAY}Z`;
  const byMs = clockMs(FIRST_DAY) - clockMs(start.local);
  return (utc) => clockText(clockMs(utc) + byMs);
}

function bareState(
  state: SessionState,
  texts: readonly string[],
  plain: (text: string) => string,
  shifted: (utc: string) => string,
): SessionState {
  const { kcal, ml, minutes, partEatenPercent, fastHours } = state.protocol;
  const known = stateWithout(state, texts);
  return {
    ...known,
    study: { ...known.study, code: 'X' },
    protocol: { ...known.protocol, kcal, ml, minutes, partEatenPercent, fastHours },
    phases: state.phases.map((one) => ({ ...one, name: plain(one.name) })),
    bookmarks: [],
    signed: state.signed.map((one) => bareSignature(one, plain, shifted)),
  };
}

const bareSignature = (
  signature: Signature,
  plain: (text: string) => string,
  shifted: (utc: string) => string,
): Signature => ({
  ...signature,
  name: 'X',
  atUtc: shifted(signature.atUtc),
  sha256: null,
  reason: '',
  notes: '',
  conclusion: '',
  findings: deepTexts(signature.findings, plain),
});

/** A line of the log without words: who is a number, the edit what it changed. */
function bareLine(
  line: LogLine,
  { log }: Session,
  plain: (text: string) => string,
  shifted: (utc: string) => string,
): LogLine {
  const reviewers = [...new Set(log.map(({ reviewer }) => reviewer))];
  const who = `reviewer ${reviewers.indexOf(line.reviewer) + 1}`;
  const { act } = line;
  const bare = { ...line, reviewer: who, atUtc: shifted(line.atUtc) };
  if (act.kind !== 'edit') return bare;
  const changes = act.edit.changes.flatMap((change): Change[] => {
    if (change.kind === 'sign')
      return [{ kind: 'sign', signature: bareSignature(change.signature, plain, shifted) }];
    const ofBeats = change.kind === 'beats' || change.kind === 'all-beats';
    return ofBeats || change.kind === 'doubts' ? [change] : [];
  });
  return { ...bare, act: { kind: 'edit', edit: { name: 'edit', changes } } };
}
