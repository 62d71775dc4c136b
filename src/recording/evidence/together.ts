import type { Cpm } from '../../units/rate';
import type { Seconds } from '../../units/time';
import type { Rhythm } from '../rhythm';

/** Stomach and heart over the same minutes. Exploratory: there are no reference values. */
export interface TogetherEvidence {
  /** Whether there is a heart lead; without one the stomach stands alone. */
  readonly heartRead: boolean;
  readonly breathingFrom: 'lead' | 'derived' | 'none';
  /** One an epoch of the reported lead, of the same length, by time. */
  readonly windows: readonly SharedWindow[];
  readonly phases: readonly SharedPhase[];
}

/** Both organs over one epoch; null where the epoch or the window does not carry it. */
export interface SharedWindow {
  readonly phase: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly dfCpm: Cpm | null;
  readonly dpDb: number | null;
  readonly rhythm: Rhythm | null;
  readonly heartRateBpm: number | null;
  readonly hfMs2: number | null;
  readonly breathingPerMin: number | null;
}

/** Median over the windows of a phase in which a rhythm and a heart rate are known, with how many windows carry it. */
export interface SharedMedian {
  readonly value: number | null;
  readonly windows: number;
}

export interface SharedPhase {
  readonly name: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** Windows of the phase, and those with a rhythm and a heart rate. */
  readonly windows: number;
  readonly shared: number;
  readonly dfCpm: SharedMedian;
  readonly dpDb: SharedMedian;
  readonly heartRateBpm: SharedMedian;
  readonly hfMs2: SharedMedian;
  readonly breathingPerMin: SharedMedian;
  readonly modulation: PhaseModulation;
}

/** How RR follows the phase of the slow wave, or why that is not said. */
export type PhaseModulation =
  | { readonly kind: 'withheld'; readonly reason: string }
  | {
      readonly kind: 'found';
      readonly dfCpm: Cpm;
      readonly cycles: number;
      readonly minutes: number;
      readonly rrMeanMs: number;
      /** Peak of the fitted cosine in percent of mean RR, and what chance alone stays under in 95 of 100 surrogates. */
      readonly depthPct: number;
      readonly chancePct: number;
      /** Degrees after the crest of the slow wave at which RR is longest, 0 to 360. */
      readonly longestDeg: number;
      /** By shifts of all sizes, and by the surrogates alone, which is never the larger. */
      readonly p: number;
      readonly pOfSurrogates: number;
      readonly surrogates: number;
      readonly leastShiftS: Seconds;
      /** 0 to 1; near 1 the rhythm is so steady that the test tells little. */
      readonly steadiness: number;
      /** RR by phase in ms about its mean, bins of equal width from the crest on. */
      readonly binsMs: readonly number[];
      readonly rivals: Rivals;
    };

export const RIVAL_VERDICTS = ['seen', 'not-seen', 'not-tested'] as const;
export type RivalVerdict = (typeof RIVAL_VERDICTS)[number];

/** What else could make RR follow the slow wave. */
export interface Rivals {
  readonly breathing: {
    readonly verdict: RivalVerdict;
    /** Coherence of RR with breathing at DF, beside what unrelated noise stays under; null where it was not computed. */
    readonly coherence: number | null;
    readonly level: number | null;
    readonly perMin: number | null;
    /** The whole multiple of DF that breathing is near; null for none. */
    readonly multiple: number | null;
  };
  /** Waves of blood pressure near 0.1 Hz, twice the slow wave's rate. */
  readonly waves: {
    readonly verdict: RivalVerdict;
    /** Power of RR about twice DF over that about DF. */
    readonly powerRatio: number | null;
    /** Peak of the wave of twice DF in percent of mean RR. */
    readonly secondDepthPct: number;
  };
  /** The heartbeat's own slow course in the slow-wave lead. */
  readonly leak: {
    readonly verdict: RivalVerdict;
    /** Amplitudes near DF in uV: of what the beats put into the lead, and of the lead itself. */
    readonly leakUv: number | null;
    readonly slowUv: number;
    /** Depth and p with the beats' share taken out of the lead. */
    readonly withoutDepthPct: number | null;
    readonly withoutP: number | null;
    /** p of R height against the same phase. */
    readonly heightP: number | null;
  };
}
