import { NO_BREATHING } from '../src/heart/breathing';
import { breathingFigure } from '../src/heart/breathing-figure';
import { type HeartFigures, withheldHeartFigures } from '../src/heart/heart-figures';
import type { Figures, SeenInPassing } from '../src/recording/figure';
import type { Findings, PhaseFindings } from '../src/recording/findings';
import type { BreathingSeries } from '../src/recording/heart-series';
import { type Lead, leadChannels, leadKey } from '../src/recording/lead';
import type { Phase } from '../src/recording/phase';
import type { Recording } from '../src/recording/recording';
import type { Interval } from '../src/recording/span';
import { filterWarnings } from '../src/separate/filter-warnings';
import { stomachFigures } from '../src/stomach/figures';
import type { StomachAnalysis } from '../src/stomach/slow-wave-rhythm';
import type { ReviewInputs } from './analysis-api';
import { changesOf, movementFigure, type Part, partsOf, withholdOrgan } from './findings';

/** Heart and breathing of a part where no heart lead is read: breathing from its own lead, or withheld with the reason. */
const withoutHeart = (breathing: BreathingSeries | null, part: Phase): Figures => ({
  ...withheldHeartFigures('no heart lead is chosen'),
  breathing_bpm: breathingFigure(breathing ?? NO_BREATHING, part),
});

/** What the findings are put together from. */
export interface FindingsInputs {
  readonly recording: Recording;
  readonly inputs: ReviewInputs;
  readonly phases: readonly Phase[];
  /** Null where no heart lead is read. */
  readonly heart: {
    readonly figuresOf: (part: Part) => Generator<void, HeartFigures>;
    readonly seen: readonly SeenInPassing[];
  } | null;
  readonly stomach: readonly StomachAnalysis[];
  /** What is spoiled or missing for the stomach on the reported lead. */
  readonly spoiled: readonly Interval[];
  /** Of the breathing lead; null where there is none. */
  readonly breathing: BreathingSeries | null;
}

/**
 * The figures of every phase and part with their changes, what the filters of the leads mean for them, and what was seen.
 * Takes a rest after each part.
 */
export function* findingsInSteps(from: FindingsInputs): Generator<void, Findings> {
  const { recording, inputs, phases, heart, stomach, spoiled } = from;
  const { roles, settings, spans } = inputs;
  const reported = roles.slow[roles.reported];
  const stomachFilters = filterWarnings(channelsOf(recording, reported));
  const heartFilters = roles.heart ? filterWarnings(channelsOf(recording, roles.heart)) : null;
  const onReported = spans.filter(({ lead }) => lead === null || lead === leadKey(reported));
  const phaseFindings: PhaseFindings[] = [];
  for (const part of partsOf(phases)) {
    const slow = stomachFigures({
      analysis: stomach[roles.reported],
      phase: part,
      spoiled,
      settings,
    });
    yield;
    const beat = heart ? yield* heart.figuresOf(part) : null;
    yield;
    const figures = {
      ...slow.figures,
      ...(beat?.figures ?? withoutHeart(from.breathing, part)),
      movement_pct: movementFigure(onReported, part),
    };
    const withStomach = withholdOrgan(figures, 'stomach', stomachFilters.withholdStomach);
    phaseFindings.push({
      ...part,
      keptStomachS: slow.keptS,
      keptHeartS: beat?.keptS ?? 0,
      adequacyStomach: slow.adequacy,
      adequacyHeart: beat?.adequacy ?? 'not-reportable',
      figures: withholdOrgan(withStomach, 'heart', heartFilters?.withholdHeart ?? null),
    });
  }
  return {
    edit: inputs.edit,
    phases: phaseFindings,
    changes: changesOf(phaseFindings),
    seen: heart?.seen ?? [],
    warnings: [
      ...stomachFilters.warnings.filter(({ about }) => about !== 'heart'),
      ...(heartFilters?.warnings ?? []).filter(({ about }) => about === 'heart'),
    ],
  };
}

const channelsOf = (recording: Recording, lead: Lead) =>
  leadChannels(lead).map((index) => recording.channels[index]);
