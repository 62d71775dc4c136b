import { openDoubtsWords } from '../recording/doubt';
import type { Evidence } from '../recording/evidence/evidence';
import { withEvidenceMarks } from '../recording/evidence/evidence-marks';
import { evidenceLines } from '../recording/evidence/evidence-words';
import type { Findings } from '../recording/findings';
import type { Recording } from '../recording/recording';
import { type RangesFor, rangesOf, type SiteReference } from '../recording/site-reference';
import type { Session, Signature } from '../session/document';
import { formatClock } from '../units/time';
import { type AdequacyTable, adequacyTable } from './report-adequacy';
import { withChances } from './report-chances';
import { type EventRow, eventRows } from './report-events';
import { type FindingsTable, mainTables, otherTables } from './report-findings';
import { type Hide, identityHider, nothingHidden } from './report-hiding';
import {
  type Fact,
  identityFacts,
  identityNote,
  type ProtocolFacts,
  protocolFacts,
} from './report-identity';
import {
  beatFacts,
  doubtFact,
  logFact,
  type SpanRow,
  settingFacts,
  spanRows,
  studyFacts,
} from './report-making';
import { type SignatureRow, signatureRows, statusWords } from './report-signatures';
import {
  differencesSinceSigning,
  type FigureDifference,
  type ReportStatus,
  reportStatus,
} from './report-status';

/** Everything the printed page says but its pictures; built from plain data, so that page and command line agree. */
export interface ReportModel {
  readonly kind: ReportStatus['kind'];
  /** "Draft: not signed". */
  readonly status: string;
  /** What every printed page carries at its foot: whose it is and how far it is. */
  readonly foot: string;
  readonly identityHidden: boolean;
  readonly identity: readonly Fact[];
  /** What has to be known of what the identity says. */
  readonly identityNote: string;
  readonly adequacy: AdequacyTable;
  /** What stands above the figures: filters, defects of the file. */
  readonly warnings: readonly string[];
  readonly protocol: ProtocolFacts;
  /** Events and symptoms, by time. */
  readonly events: readonly EventRow[];
  readonly main: readonly FindingsTable[];
  readonly others: readonly FindingsTable[];
  /** Seen in passing, by time. */
  readonly seen: readonly Fact[];
  /** How far the figures can be believed, line by line; empty until it has been computed. */
  readonly evidence: readonly Fact[];
  readonly notes: string;
  readonly conclusion: string;
  /** Newest last; the one in force is current. */
  readonly signatures: readonly SignatureRow[];
  readonly differences: readonly FigureDifference[];
  readonly making: readonly Fact[];
  readonly settings: readonly Fact[];
  readonly spans: readonly SpanRow[];
}

export interface ReportInput {
  readonly recording: Recording;
  readonly session: Session;
  readonly findings: Findings;
  readonly program: string;
  readonly identityHidden: boolean;
  /** How many doubts are open; null while they have not been looked for. */
  readonly openDoubts: number | null;
  /** Age in words where the results go out without identity; null where the header's own fields are printed. */
  readonly age: string | null;
  /** The parts of the evidence that belong to these figures. */
  readonly evidence: Partial<Evidence>;
  /** Reference values that the site keeps; null where it gave none. */
  readonly siteReference: SiteReference | null;
}

/** The report of a session as it stands; a signed one prints figures, settings and words as they were signed. */
export function reportModel(input: ReportInput): ReportModel {
  const { session, recording, identityHidden } = input;
  const { state } = session;
  const hide = identityHidden ? identityHider(recording, state.study) : nothingHidden;
  const status = reportStatus(session);
  const signed = status.kind === 'draft' ? null : status.signature;
  const findings = signed?.findings ?? withEvidenceMarks(input.findings, input.evidence);
  const differences = signed ? differencesSinceSigning(signed.findings, input.findings) : [];
  // Ranges are computed of the figures as they are now; they stand beside signed ones only where these are the same.
  const hold = differences.length === 0;
  const ranges = hiddenIn(rangesOf(input.siteReference, state.protocol), hide);
  const words = hide(statusWords(status, session.log.length, identityHidden));
  return {
    kind: status.kind,
    status: words,
    foot: [
      identityHidden ? 'identity hidden' : state.study.code,
      ...(recording.invented ? ['invented data'] : []),
      words.replace(/^Draft/, 'DRAFT'),
    ].join(' · '),
    identityHidden,
    identity: identityFacts(recording, state, identityHidden, input.age),
    identityNote: identityNote(identityHidden, input.age),
    adequacy: adequacyTable(findings, state.roles.heart !== null),
    warnings: [
      ...warningsOf(recording, findings),
      ...(input.openDoubts ? [openDoubtsWords(input.openDoubts)] : []),
    ].map(hide),
    protocol: protocolFacts(state.protocol, hide),
    events: eventRows(state, hide),
    main: mainTables(findings, ranges).map((table) =>
      withChances(table, hold ? (input.evidence.ranges ?? null) : null),
    ),
    others: otherTables(findings, ranges),
    seen: findings.seen.map(({ fromS, toS, text }) => ({
      name: `${formatClock(fromS)}–${formatClock(toS)}`,
      words: hide(text),
    })),
    evidence: evidenceLines(input.evidence).map(({ name, words, mark }) => ({
      name,
      words: hide(mark === null ? words : `${words} (${mark})`),
    })),
    notes: hide(signed?.notes ?? state.notes),
    conclusion: hide(signed?.conclusion ?? state.conclusion),
    signatures: signatureRows(status, identityHidden, hide),
    differences,
    ...makingOf(input, signed, hide),
  };
}

/** The site's ranges with what could identify a person taken out of their words. */
const hiddenIn =
  (ranges: RangesFor, hide: Hide): RangesFor =>
  (figure, part) =>
    ranges(figure, part).map((range) => ({
      ...range,
      posture: hide(range.posture),
      meal: hide(range.meal),
      population: hide(range.population),
      source: hide(range.source),
    }));

function warningsOf({ found }: Recording, { warnings }: Findings): readonly string[] {
  const inFile = found.filter(({ severity }) => severity === 'warning').map(foundWords);
  return [...warnings.map(({ text }) => text), ...inFile];
}

const foundWords = ({ what, place }: Recording['found'][number]): string =>
  place === null ? what : `${what} (${place})`;

function makingOf(
  { recording, session, program, identityHidden, openDoubts, age }: ReportInput,
  signed: Signature | null,
  hide: Hide,
): Pick<ReportModel, 'making' | 'settings' | 'spans'> {
  const { state } = session;
  const notes = recording.found.filter(({ severity }) => severity === 'note').map(foundWords);
  return {
    making: [
      ...studyFacts(
        recording,
        state,
        signed?.program ?? program,
        signed,
        identityHidden ? hide : null,
        age === null ? 'not computed yet' : 'left out',
      ),
      ...beatFacts(session, recording),
      doubtFact(state, openDoubts),
      logFact(session, identityHidden),
      ...(notes.length > 0 ? [{ name: 'Of the file', words: hide(notes.join('; ')) }] : []),
    ],
    settings: settingFacts(signed?.settings ?? state.settings),
    spans: spanRows(state, recording.durationS),
  };
}
