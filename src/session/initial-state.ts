import type { BeatList } from '../recording/beat';
import type { Phase } from '../recording/phase';
import { EMPTY_PROTOCOL } from '../recording/protocol';
import type { Recording } from '../recording/recording';
import type { RoleReasons, Roles } from '../recording/roles';
import type { Settings } from '../recording/settings';
import type { Span } from '../recording/span';
import type { SessionState, StudyIdentity } from './document';

/** What a review begins with, before anybody has changed anything. */
export interface Beginning {
  readonly roles: Roles;
  readonly reasons: RoleReasons;
  readonly phases: readonly Phase[];
  readonly settings: Settings;
  readonly spans: readonly Omit<Span, 'id'>[];
  readonly beats: BeatList;
}

/** What a study is known by; the full hash follows once the whole file has been read. */
export function studyIdentity(recording: Recording, quickKey: string, code: string): StudyIdentity {
  return {
    code,
    sha256: null,
    quickKey,
    sizeBytes: recording.sizeBytes,
    start: recording.start.kind === 'known' ? recording.start.local : null,
    durationS: recording.durationS,
    channelLabels: recording.channels.map((channel) => channel.label),
    invented: recording.invented,
  };
}

/** The state a review begins with: everything as the program proposes it. */
export function initialState(study: StudyIdentity, beginning: Beginning): SessionState {
  return {
    study,
    protocol: EMPTY_PROTOCOL,
    roles: beginning.roles,
    leadChoice: beginning.reasons.reported,
    phases: beginning.phases,
    settings: beginning.settings,
    beats: beginning.beats,
    spans: beginning.spans.map((span, i) => ({ ...span, id: i + 1 })),
    events: [],
    symptoms: [],
    doubts: [],
    bookmarks: [],
    notes: '',
    conclusion: '',
    signed: [],
  };
}
