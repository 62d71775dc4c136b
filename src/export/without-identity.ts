import type { Channel } from '../recording/channel';
import type { Findings } from '../recording/findings';
import type { Phase } from '../recording/phase';
import { EMPTY_PROTOCOL } from '../recording/protocol';
import type { Recording } from '../recording/recording';
import type { Session, SessionState } from '../session/document';

/** Shorter parts of a name or code stand in ordinary words too. */
const LEAST_LETTERS = 3;

/** Texts that say whose study it is: code, name and its parts, text of the header, file's name, who reviewed and signed. */
export function identityTexts(recording: Recording, session: Session): readonly string[] {
  const { identity, fileName } = recording;
  const { state, start, log } = session;
  const people = [
    ...log.map(({ reviewer }) => reviewer),
    ...state.signed.map(({ name }) => name),
    identity.name ?? '',
  ];
  const texts = [
    ...people,
    ...people.flatMap((name) => name.split(/[\s_,;.^-]+/)),
    state.study.code,
    start.study.code,
    identity.code ?? '',
    identity.recordingText,
    fileName,
    fileName.replace(/\.[^.]*$/, ''),
  ].map((text) => text.trim());
  const long = texts.filter((text) => text.length >= LEAST_LETTERS);
  return [...new Set(long)].sort((a, b) => b.length - a.length);
}

/** A text with every text of an identity in it left out. */
export function without(text: string, identity: readonly string[]): string {
  return identity.reduce((left, one) => {
    const at = new RegExp(one.replaceAll(/[.*+?^${}()|[\]\\]/g, '\\$&'), 'gi');
    return left.replaceAll(at, '…');
  }, text);
}

/** Parts that labels of channels are made of, with or without a number; a label with any other part may be a name. */
const LABEL_PART =
  /^(\d+|[a-z]\d+|(egg|ecg|ekg|emg|eeg|eog|hr|lead|channel|chan|ch|abd|abdomen|abdominal|belly|stomach|gastric|heart|chest|thorax|resp|respiration|breath|breathing|flow|acc|accel|motion|movement|temp|spo2|ref|raw|minus|plus|left|right|upper|lower|mid|i{1,3}|av[rlf])\d*)$/i;

/** The label of a channel where it says nothing but what is measured, else its number. */
export function plainLabel(label: string, index: number): string {
  const parts = label.split(/[\s_./+−-]+/).filter((part) => part !== '');
  const plain = parts.length > 0 && parts.every((part) => LABEL_PART.test(part));
  return plain ? label : `channel ${index + 1}`;
}

const plainChannel = (channel: Channel): Channel => ({
  ...channel,
  label: plainLabel(channel.label, channel.index),
  unit: { ...channel.unit, text: channel.unit.kind === 'voltage' ? channel.unit.text : '' },
  transducer: '',
  prefilter: { ...channel.prefilter, text: '' },
});

/** A recording as far as its signals go: no person, file, date or text of the file. */
export function recordingWithout(recording: Recording): Recording {
  return {
    ...recording,
    fileName: '',
    sizeBytes: 0,
    identity: { code: null, name: null, sex: null, birthYear: null, recordingText: '' },
    start: { kind: 'unknown', raw: '' },
    channels: recording.channels.map(plainChannel),
    annotations: recording.annotations.map((one) => ({ ...one, text: '' })),
    found: [],
  };
}

/** A session's state without who it is and without free text but the names of phases and the notes of bookmarks. */
export function stateWithout(state: SessionState, identity: readonly string[]): SessionState {
  const { durationS, invented } = state.study;
  return {
    ...state,
    study: {
      code: '',
      sha256: null,
      quickKey: '',
      sizeBytes: 0,
      start: null,
      durationS,
      channelLabels: [],
      invented,
    },
    protocol: EMPTY_PROTOCOL,
    leadChoice: '',
    phases: state.phases.map((one) => ({ ...one, name: without(one.name, identity) })),
    spans: state.spans.map((one) => ({ ...one, note: '' })),
    events: state.events.map((one) => ({ ...one, text: 'event' })),
    symptoms: state.symptoms.map((one) => ({ ...one, text: 'symptom' })),
    bookmarks: state.bookmarks.map((one) => ({ ...one, note: without(one.note, identity) })),
    notes: '',
    conclusion: '',
    signed: [],
  };
}

/** Figures by phases whose names say nothing of who it is; nothing else that is written in words. */
export function findingsWithout(findings: Findings, identity: readonly string[]): Findings {
  const name = (text: string) => without(text, identity);
  return {
    edit: 0,
    phases: findings.phases.map((one) => ({
      ...one,
      name: name(one.name),
      phase: name(one.phase),
    })),
    changes: findings.changes.map((one) => ({ ...one, from: name(one.from), to: name(one.to) })),
    seen: [],
    warnings: [],
  };
}

/** Names of phases that say nothing but what was done; any other may be typed freely. */
const PLAIN_PHASE =
  /^(baseline|fasting|meal|drink|water|sham|fed|rest|sleep|recovery|whole study)(-\d+)?$/i;

/**
 * Puts a number for every phase whose name may say who it is, also where the name begins that of a part ("fed 0-30"), and
 * leaves all other texts as they are.
 */
export function namesOfPhases(
  phases: readonly Phase[],
  identity: readonly string[],
): (text: string) => string {
  const names = [...new Set(phases.map(({ name }) => name))];
  const plain = new Map(
    names.map((name, i) => [
      name,
      PLAIN_PHASE.test(name) && without(name, identity) === name ? name : `phase ${i + 1}`,
    ]),
  );
  return (text) => {
    const known = plain.get(text);
    if (known !== undefined) return known;
    const whole = names.find((name) => text.startsWith(`${name} `));
    return whole === undefined ? text : `${plain.get(whole)}${text.slice(whole.length)}`;
  };
}

/** The same plain data with every text in it changed; numbers, arrays of numbers and keys stay. */
export function deepTexts<T>(value: T, change: (text: string) => string): T;
export function deepTexts(value: unknown, change: (text: string) => string): unknown {
  if (typeof value === 'string') return change(value);
  if (Array.isArray(value)) return value.map((one) => deepTexts(one, change));
  if (typeof value !== 'object' || value === null || ArrayBuffer.isView(value)) return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, one]) => [key, deepTexts(one, change)]),
  );
}
