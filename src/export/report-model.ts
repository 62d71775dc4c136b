import { adequacyReason } from '../recording/adequacy';
import { BEAT_CLASSES, type BeatList } from '../recording/beat';
import type { Findings, PhaseFindings } from '../recording/findings';
import { leadName } from '../recording/lead';
import type { Protocol } from '../recording/protocol';
import type { Recording } from '../recording/recording';
import { bandsName, type Settings } from '../recording/settings';
import { coveredSeconds, type Span } from '../recording/span';
import type { Session, SessionState } from '../session/document';
import { formatClock } from '../units/time';
import {
  differencesSinceSigning,
  type FigureDifference,
  type ReportStatus,
  reportStatus,
} from './report-status';

/** A name and what is said of it, as the report's lists print it. */
export interface Fact {
  readonly name: string;
  readonly words: string;
}

/** How much of a phase the figures stand on. */
export interface AdequacyRow {
  readonly phase: string;
  readonly stretch: string;
  readonly minutes: string;
  readonly stomach: string;
  readonly heart: string;
  readonly words: string;
}

/** Everything the printed page says but its pictures; built from plain data, so that page and command line agree. */
export interface ReportModel {
  readonly status: ReportStatus;
  readonly identity: readonly Fact[];
  readonly study: readonly Fact[];
  readonly protocol: readonly Fact[];
  readonly adequacy: readonly AdequacyRow[];
  readonly findings: Findings;
  readonly differences: readonly FigureDifference[];
  readonly beats: readonly Fact[];
  readonly spans: readonly Fact[];
  readonly events: readonly Fact[];
  readonly settings: readonly Fact[];
  readonly notes: string;
  readonly conclusion: string;
}

export interface ReportInput {
  readonly recording: Recording;
  readonly session: Session;
  readonly findings: Findings;
  readonly program: string;
  readonly identityHidden: boolean;
}

/** The report of a session as it stands; a signed one prints the figures as they were signed. */
export function reportModel(input: ReportInput): ReportModel {
  const { session, recording, identityHidden } = input;
  const { state } = session;
  const status = reportStatus(session);
  const signed = status.kind === 'draft' ? null : status.signature;
  const findings = signed?.findings ?? input.findings;
  return {
    status,
    identity: identityHidden
      ? [{ name: 'Identity', words: 'hidden' }]
      : identityFacts(recording, state),
    study: studyFacts(recording, state, signed?.program ?? input.program, identityHidden),
    protocol: protocolFacts(state.protocol),
    adequacy: findings.phases.map(adequacyRow),
    findings,
    differences: signed ? differencesSinceSigning(signed.findings, input.findings) : [],
    beats: beatFacts(session),
    spans: spanFacts(state.spans, recording.durationS),
    events: state.events.map(({ atS, text }) => ({ name: formatClock(atS), words: text })),
    settings: settingFacts(signed?.settings ?? state.settings),
    notes: signed?.notes ?? state.notes,
    conclusion: signed?.conclusion ?? state.conclusion,
  };
}

function identityFacts({ identity, start }: Recording, { study }: SessionState): readonly Fact[] {
  const { name, sex, birthYear } = identity;
  return [
    { name: 'Code', words: study.code },
    ...(name === null
      ? []
      : [{ name: 'Name', words: `${name} (from the file header, not verified)` }]),
    ...(birthYear === null ? [] : [{ name: 'Birth year', words: String(birthYear) }]),
    ...(sex === null ? [] : [{ name: 'Sex', words: sex }]),
    {
      name: 'Recorded',
      words: start.kind === 'known' ? start.local.replace('T', ', ') : 'date not known',
    },
  ];
}

function studyFacts(
  recording: Recording,
  { roles, leadChoice, study }: SessionState,
  program: string,
  identityHidden: boolean,
): readonly Fact[] {
  const name = (index: number) => leadName(roles.slow[index], recording.channels);
  return [
    ...(study.invented ? [{ name: 'Data', words: 'invented by the program, of no person' }] : []),
    { name: 'Length', words: `${formatClock(recording.durationS)}, ${recording.format}` },
    { name: 'Slow-wave lead', words: `${name(roles.reported)}: ${leadChoice}` },
    { name: 'Heart lead', words: roles.heart ? leadName(roles.heart, recording.channels) : 'none' },
    {
      name: 'Breathing',
      words: roles.breath
        ? leadName(roles.breath, recording.channels)
        : 'derived from the heartbeat',
    },
    ...(identityHidden
      ? []
      : [{ name: 'SHA-256 of the study', words: study.sha256 ?? 'not computed yet' }]),
    { name: 'Program', words: program },
  ];
}

const stated = (value: number | null, unit: string): string =>
  value === null ? 'not stated' : `${value} ${unit}`;

function protocolFacts(protocol: Protocol): readonly Fact[] {
  const { meal, kcal, ml, minutes, partEatenPercent, fastHours, posture, medicines, implants } =
    protocol;
  return [
    { name: 'Meal', words: meal === '' ? 'not stated' : meal },
    { name: 'Energy', words: stated(kcal, 'kcal') },
    { name: 'Volume', words: stated(ml, 'ml') },
    { name: 'Eaten in', words: stated(minutes, 'min') },
    { name: 'Part eaten', words: stated(partEatenPercent, '%') },
    { name: 'Fasted', words: stated(fastHours, 'h') },
    { name: 'Posture', words: posture === '' ? 'not stated' : posture },
    { name: 'Medicines', words: medicines === '' ? 'not stated' : medicines },
    { name: 'Implants', words: implants === '' ? 'not stated' : implants },
  ];
}

const ADEQUACY_WORDS = {
  enough: 'enough',
  limited: 'limited',
  'not-reportable': 'not reportable',
} as const;

function adequacyRow(phase: PhaseFindings): AdequacyRow {
  const lengthS = phase.toS - phase.fromS;
  const kept = (seconds: number) =>
    `${(seconds / 60).toFixed(1)} (${Math.floor((100 * seconds) / lengthS)} %)`;
  const words = (organ: string, adequacy: PhaseFindings['adequacyStomach'], keptS: number) => {
    const reason = adequacyReason(adequacy, keptS, lengthS);
    return `${organ} ${ADEQUACY_WORDS[adequacy]}${reason === '' ? '' : ` (${reason})`}`;
  };
  return {
    phase: phase.name,
    stretch: `${formatClock(phase.fromS)}–${formatClock(phase.toS)}`,
    minutes: (lengthS / 60).toFixed(1),
    stomach: kept(phase.keptStomachS),
    heart: kept(phase.keptHeartS),
    words: [
      words('stomach', phase.adequacyStomach, phase.keptStomachS),
      words('heart', phase.adequacyHeart, phase.keptHeartS),
    ].join('; '),
  };
}

function classCounts(beats: BeatList): string {
  const counts = BEAT_CLASSES.map((beatClass, code) => {
    const count = beats.classes.reduce((sum, one) => sum + (one === code ? 1 : 0), 0);
    return `${beatClass} ${count}`;
  });
  return counts.join(', ');
}

/** Beats that differ between what the program found and what stands now. */
function beatFacts({ start, state }: Session): readonly Fact[] {
  const before = new Map<number, number>();
  start.beats.ticks.forEach((tick, i) => {
    before.set(tick, start.beats.classes[i]);
  });
  let put = 0;
  let classed = 0;
  state.beats.ticks.forEach((tick, i) => {
    const was = before.get(tick);
    if (was === undefined) put += 1;
    else if (was !== state.beats.classes[i]) classed += 1;
    before.delete(tick);
  });
  return [
    { name: 'Beats', words: `${state.beats.ticks.length} (${classCounts(state.beats)})` },
    {
      name: 'Changed by hand',
      words: `${put} put in or moved, ${before.size} taken out or moved, ${classed} given another class`,
    },
  ];
}

function spanFacts(spans: readonly Span[], durationS: number): readonly Fact[] {
  const causes = [...new Set(spans.map(({ cause }) => cause))].sort();
  return causes.map((cause) => {
    const some = spans.filter((span) => span.cause === cause);
    const minutes = coveredSeconds(some, 0, durationS) / 60;
    const drawn = some.filter(({ origin }) => origin === 'drawn').length;
    return {
      name: cause,
      words: `${some.length} spans, ${minutes.toFixed(1)} min; ${drawn} by hand, ${some.length - drawn} proposed`,
    };
  });
}

function settingFacts(settings: Settings): readonly Fact[] {
  const { fractional, epoch, variability } = settings;
  const usesFractional =
    settings.slowRoute === 'fractional' || settings.heartRoute === 'fractional';
  return [
    { name: 'Routes', words: `slow wave ${settings.slowRoute}, heartbeat ${settings.heartRoute}` },
    {
      name: 'Bands',
      words: `slow wave ${settings.slowBandCpm.join('–')} cpm, heartbeat ${settings.heartBandHz.join('–')} Hz`,
    },
    ...(usesFractional
      ? [
          {
            name: 'Fractional',
            words: `order ${fractional.order}, memory ${fractional.memoryS} s, windows ${fractional.slowWindowMs} and ${fractional.heartWindowMs} ms, polynomial ${fractional.polynomialOrder}`,
          },
        ]
      : []),
    { name: 'Rhythm limits', words: bandsName(settings.rhythmBands) },
    {
      name: 'Epochs',
      words: `${epoch.lengthS} s every ${epoch.stepS} s, kept up to ${Math.round(100 * epoch.maxSpoiled)} % spoiled, false alarm ${Math.round(100 * epoch.falseAlarm)} %`,
    },
    {
      name: 'Variability',
      words: `segments of ${variability.segmentS} s, LF ${variability.lfHz.join('–')} Hz, HF ${variability.hfHz.join('–')} Hz, at least ${Math.round(100 * variability.minNnShare)} % NN`,
    },
  ];
}
