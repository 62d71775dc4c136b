import { exp } from '../numeric/elementary';
import type { Random } from '../numeric/random';
import type { Hertz } from '../units/rate';
import { addWander, type CoarseGrid } from './coarse-grid';
import { sineOf } from './slow-sources';
import type { ArtefactSpec } from './spec';

/** What artefacts change on one lead, at each coarse point. */
export interface LeadDisturbance {
  readonly slowUv: Float64Array;
  readonly muscleUv: Float64Array;
  readonly mainsUv: Float64Array;
}

/** How a cause acts: share of its size that wanders (with its correlation time), that is muscle, hum, and its own course. */
interface Action {
  readonly wander: number;
  readonly wanderS: number;
  readonly muscle: number;
  readonly mains: number;
  /** Height at a place of the stretch (0 to 1) lasting some seconds, as a share of the size; null: none. */
  readonly course: ((place: number, seconds: number) => number) | null;
}

const STILL: Action = { wander: 0, wanderS: 1, muscle: 0, mains: 0, course: null };
const settling = (place: number) => exp(-5 * place);

const ACTIONS: Readonly<Record<ArtefactSpec['cause'], Action>> = {
  talk: { ...STILL, wander: 1, wanderS: 0.5, muscle: 0.15 },
  move: {
    ...STILL,
    wander: 1,
    wanderS: 1.5,
    muscle: 0.1,
    course: (place) => (place < 0.3 ? 0 : 1.5 * settling((place - 0.3) / 0.7)),
  },
  eat: { ...STILL, wander: 1, wanderS: 0.7, muscle: 0.3 },
  cough: {
    ...STILL,
    muscle: 0.15,
    course: (place, seconds) => Math.max(0, sineOf((place * seconds) / 0.8)),
  },
  electrode: { ...STILL, wander: 0.5, wanderS: 3, mains: 0.15, course: () => 1 },
  step: { ...STILL, course: settling },
  burst: { ...STILL, muscle: 1 },
  flat: STILL,
  rail: STILL,
};

/** Adds an artefact to what disturbs a lead. It fades in and out over a tenth of its length, at most 2 s; steps do not. */
export function disturb(
  lead: LeadDisturbance,
  artefact: ArtefactSpec,
  grid: CoarseGrid,
  random: Random,
): void {
  const action = ACTIONS[artefact.cause];
  const from = Math.max(0, Math.round(artefact.fromS / grid.stepS));
  const to = Math.min(grid.points, Math.round(artefact.toS / grid.stepS));
  if (to <= from) return;
  const wander = new Float64Array(to - from);
  addWander(wander, random, action.wander * artefact.sizeUv, action.wanderS, grid.stepS);
  const seconds = artefact.toS - artefact.fromS;
  const fadeS = Math.min(2, seconds / 10);
  const size = Math.abs(artefact.sizeUv);
  for (let i = from; i < to; i += 1) {
    const insideS = Math.min(i - from, to - 1 - i) * grid.stepS;
    const fade = Math.min(1, insideS / fadeS);
    const course = action.course?.((i - from) / (to - from), seconds) ?? 0;
    lead.slowUv[i] += fade * wander[i - from] + course * artefact.sizeUv;
    lead.muscleUv[i] += fade * action.muscle * size;
    lead.mainsUv[i] += fade * action.mains * size;
  }
}

/** Puts flat and rail stretches onto finished samples. */
export function hold(
  samples: Float64Array,
  artefact: ArtefactSpec,
  rateHz: Hertz,
  railUv: number,
): void {
  if (artefact.cause !== 'flat' && artefact.cause !== 'rail') return;
  const from = Math.max(0, Math.round(artefact.fromS * rateHz));
  const to = Math.min(samples.length, Math.round(artefact.toS * rateHz));
  const rail = artefact.sizeUv < 0 ? -railUv : railUv;
  samples.fill(
    artefact.cause === 'flat' ? samples[Math.max(0, from - 1)] : rail,
    from,
    Math.max(from, to),
  );
}
