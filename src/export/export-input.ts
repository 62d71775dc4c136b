import type { Doubt } from '../recording/doubt';
import type { Evidence } from '../recording/evidence/evidence';
import type { Findings } from '../recording/findings';
import type { BreathingSeries, HeartSegment, RrSeries } from '../recording/heart-series';
import type { Recording } from '../recording/recording';
import type { SlowWaveRhythm } from '../recording/rhythm';
import type { SiteReference } from '../recording/site-reference';
import type { SessionState } from '../session/document';

/** What the page and the command line both have once a study is analysed. */
export interface ExportInput {
  readonly recording: Recording;
  readonly state: SessionState;
  /** SHA-256 of the study file in hex; null where it is not known yet. */
  readonly sha256: string | null;
  readonly program: string;
  /** Edit number that state, analysis and findings belong to. */
  readonly edit: number;
  readonly stomach: readonly SlowWaveRhythm[];
  /** Null where the study has no heart lead. */
  readonly heart: {
    readonly rr: RrSeries;
    readonly segments: readonly HeartSegment[];
  } | null;
  /** Of the breathing lead, else derived from the heartbeat; null where there is neither. */
  readonly breathing: BreathingSeries | null;
  readonly findings: Findings;
  /** The doubts that are open; those that are settled stand in the state. */
  readonly openDoubts: readonly Doubt[];
  readonly evidence: Evidence;
  /** Reference values that the site keeps; null where it gave none. */
  readonly siteReference: SiteReference | null;
}
