import { pow } from '../src/numeric/elementary';
import { type Figures, type FigureValue, numberFigure, withheld } from '../src/recording/figure';
import { FIGURES, type FigureDefinition, type Organ } from '../src/recording/figure-catalogue';
import type { FigureChange, PhaseFindings } from '../src/recording/findings';
import { isFasting, isFed, type Phase } from '../src/recording/phase';
import { coveredSeconds, type Span, type SpanCause } from '../src/recording/span';

/** Parts in which a fed phase is shown beside the whole of it. */
const FED_PART_S = 1800;
/** A shorter rest of a fed phase is no part of its own. */
const LEAST_PART_S = 600;

/** A phase, or a named part of one, that figures are computed for. */
export interface Part extends Phase {
  readonly phase: string;
}

/** Every phase whole, and each fed phase also as its first and second half hour as far as it lasts. */
export function partsOf(phases: readonly Phase[]): readonly Part[] {
  return phases.flatMap((phase) => {
    const whole: Part = { ...phase, phase: phase.name };
    return isFed(phase) ? [whole, ...fedParts(phase)] : [whole];
  });
}

function fedParts(phase: Phase): readonly Part[] {
  const lengthS = phase.toS - phase.fromS;
  return [0, FED_PART_S].flatMap((fromS) => {
    const toS = Math.min(fromS + FED_PART_S, lengthS);
    if (toS - fromS < LEAST_PART_S || (fromS === 0 && toS === lengthS)) return [];
    const name = `${phase.name} ${fromS / 60}-${Math.floor(toS / 60)}`;
    return [{ name, phase: phase.name, fromS: phase.fromS + fromS, toS: phase.fromS + toS }];
  });
}

/** What each fed phase and part changed, from the figures as printed, against fasting; empty without a fasting phase. */
export function changesOf(phases: readonly PhaseFindings[]): readonly FigureChange[] {
  const fasting = phases.find((one) => isFasting(one));
  if (!fasting) return [];
  const fed = phases.filter((one) => isFed({ ...one, name: one.phase }));
  return fed.flatMap((after) =>
    FIGURES.filter(({ change }) => change === 'difference').map((figure) => ({
      key: figure.key,
      from: fasting.name,
      to: after.name,
      value: changeOf(fasting.figures, after.figures, figure),
    })),
  );
}

function changeOf(before: Figures, after: Figures, figure: FigureDefinition): FigureValue {
  const from = numberAt(before, figure);
  const to = numberAt(after, figure);
  if (from === null || to === null) return withheld('only where both phases have the figure');
  return numberFigure(
    to - from,
    figure.unit === 'dB' ? `× ${pow(10, (to - from) / 10).toFixed(1)}` : null,
  );
}

/** A figure as it is printed, so that what stands side by side adds up. */
function numberAt(figures: Figures, { key, decimals }: FigureDefinition): number | null {
  const figure = figures[key];
  return figure?.kind === 'number' ? Number(figure.value.toFixed(decimals)) : null;
}

/** Causes that say the person moved; the others are of the equipment. */
const MOVEMENT: ReadonlySet<SpanCause> = new Set([
  'talk',
  'move',
  'cough',
  'eat',
  'electrode',
  'step',
  'burst',
]);

/** Share of a part of the study under spans that tell of movement. */
export function movementFigure(spans: readonly Span[], { fromS, toS }: Phase): FigureValue {
  if (!(toS > fromS)) return withheld('the phase has no length');
  const moved = spans.filter(({ cause }) => MOVEMENT.has(cause));
  return numberFigure((100 * coveredSeconds(moved, fromS, toS)) / (toS - fromS));
}

/** The figures with every one of an organ withheld; as they are where the reason is null. */
export function withholdOrgan(figures: Figures, organ: Organ, reason: string | null): Figures {
  if (reason === null) return figures;
  return {
    ...figures,
    ...Object.fromEntries(
      FIGURES.filter((figure) => figure.organ === organ).map(({ key }) => [key, withheld(reason)]),
    ),
  };
}
