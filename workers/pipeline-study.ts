import type { Detection } from '../src/heart/detect';
import type { Lead } from '../src/recording/lead';
import type { SignalSource } from '../src/recording/recording';
import { breathingReference, type ReferenceInputs, referenceKey } from './breathing-reference';
import type { Job } from './job';
import type { KeptHeartPart } from './pipeline-average';
import { type Computed, createResults, type ResultInputs, type Results } from './pipeline-results';
import { SignalStore } from './pipeline-signals';
import type { QrsMeasure } from './propose-roles';
import { type Remembered, remember } from './remember';

/** Results with what they were computed from. */
export interface Reckoned {
  readonly from: ResultInputs;
  readonly computed: Computed;
}

/** An opened study and what is kept of it between one piece of work and the next. */
export interface Study {
  readonly source: SignalSource;
  readonly signals: SignalStore;
  readonly results: Results;
  qrs: readonly QrsMeasure[] | null;
  detection: { readonly key: string; readonly found: Detection } | null;
  heartLead: Lead | null;
  readonly reference: Remembered<ReferenceInputs, Float64Array | null>;
  /** What the heartbeats leave in each lead, by its key, and what that was made of; used by route `beat-average` only. */
  readonly heartParts: Map<string, KeptHeartPart>;
  /** What the last analysis stood on and gave. */
  last: Reckoned | null;
  /** Ends when the long work under way does. */
  busy: Promise<void>;
}

/** A study just opened: nothing read of it yet. */
export function createStudy(source: SignalSource): Study {
  return {
    source,
    signals: new SignalStore(source),
    results: createResults(source.recording),
    qrs: null,
    detection: null,
    heartLead: null,
    reference: remember(referenceKey, breathingReference),
    heartParts: new Map(),
    last: null,
    busy: Promise.resolve(),
  };
}

/**
 * The same study with room of its own for what is found: it begins with the signals and beats that are there, and what it
 * adds is not seen by the other.
 */
export const apartFrom = (study: Study): Study => ({
  ...study,
  signals: study.signals.apart(),
  results: createResults(study.source.recording),
  reference: remember(referenceKey, breathingReference),
  heartParts: new Map(study.heartParts),
});

/** Long work on one study is done one piece after the other, since each piece changes what the next one finds. */
export function inLine<T>(study: Study, job: Job, work: (study: Study) => Promise<T>): Promise<T> {
  const done = study.busy.then(async () => {
    await job.breathe();
    return work(study);
  });
  study.busy = done.then(
    () => undefined,
    () => undefined,
  );
  return done;
}
