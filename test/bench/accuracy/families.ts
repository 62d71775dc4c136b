import type { Phase } from '../../../src/recording/phase';
import {
  type ArtefactSpec,
  PLAIN_LEAD,
  PLAIN_STUDY,
  type SimulationSpec,
  type SlowWaveSpec,
  type TrackPoint,
} from '../../../src/simulate/spec';
import { createDraw, type Draw } from './draw';

const MINUTE_S = 60;
const MINUTES = 40;
export const PHASES: readonly Phase[] = [
  { name: 'fasting', fromS: 0, toS: 18 * MINUTE_S },
  { name: 'meal', fromS: 18 * MINUTE_S, toS: 21 * MINUTE_S },
  { name: 'fed', fromS: 21 * MINUTE_S, toS: MINUTES * MINUTE_S },
];

export const FAMILIES = [
  'ordinary',
  'heavy artefacts',
  'weak wave, strong heartbeat',
  'breathing at 12, strong harmonic',
  'changing rhythms',
] as const;
export type Family = (typeof FAMILIES)[number];

/** An invented study with the family it is drawn from. */
export interface DrawnStudy {
  readonly family: Family;
  readonly spec: SimulationSpec;
}

const EACH = 8;

/** Forty studies, eight of each family; the seed decides them all. */
export function drawStudies(seed: number): readonly DrawnStudy[] {
  return FAMILIES.flatMap((family, f) =>
    Array.from({ length: EACH }, (_, i) => {
      const own = seed * 1000 + f * EACH + i;
      const base = { ...ordinary(createDraw(own)), seed: own };
      return { family, spec: MAKERS[family](createDraw(own), base, i) };
    }),
  );
}

/** A slow wave that grows with the meal, of steady or gently wandering frequency. */
function mealWave(draw: Draw, amplitudeUv: number): SlowWaveSpec {
  const growth = draw.between(0.8, 2.2);
  const fasting = draw.between(2.6, 3.2);
  return {
    frequencyCpm: [
      { atS: 18 * MINUTE_S, value: fasting },
      { atS: 21 * MINUTE_S, value: fasting + draw.between(-0.1, 0.3) },
    ],
    wanderCpm: draw.between(0, 0.08),
    wanderS: 200,
    amplitudeUv: [
      { atS: 18 * MINUTE_S, value: amplitudeUv },
      { atS: 21 * MINUTE_S, value: amplitudeUv * growth },
    ],
    amplitudeWander: draw.between(0, 0.15),
    harmonics: [draw.between(0.05, 0.3), draw.between(0, 0.1)],
  };
}

function ordinary(draw: Draw): SimulationSpec {
  const heartUv = draw.between(60, 300);
  return {
    ...PLAIN_STUDY,
    durationS: MINUTES * MINUTE_S,
    rateHz: draw.pick([250, 250, 256, 500]),
    leads: [
      {
        ...PLAIN_LEAD,
        heartUv,
        heartAxisDeg: draw.between(-60, 240),
        breathingUv: draw.between(15, 90),
        driftUv: draw.between(-600, 600),
      },
    ],
    slowWave: mealWave(draw, draw.between(60, 250)),
    heart: {
      rateBpm: [
        { atS: 18 * MINUTE_S, value: draw.between(52, 78) },
        { atS: 22 * MINUTE_S, value: draw.between(58, 90) },
      ],
      respiratoryMs: draw.between(8, 60),
      lowFrequencyMs: draw.between(8, 45),
      jitterMs: draw.between(1, 8),
      ventricularPerHour: draw.chance(0.4) ? draw.between(2, 120) : 0,
      supraventricularPerHour: draw.chance(0.4) ? draw.between(2, 60) : 0,
      tWave: draw.between(0.12, 0.6),
      respiratoryHeight: draw.between(0, 0.25),
    },
    breathing: { ratePerMin: draw.between(12, 20), wanderPerMin: draw.between(0.2, 1) },
    noise: {
      whiteUv: draw.between(0.5, 2.5),
      muscleUv: draw.between(0.5, 4),
      backgroundUv: draw.between(8, 25),
      mainsUv: draw.between(0, 6),
      mainsHz: draw.pick([50, 60]),
      driftS: draw.between(200, 900),
    },
    artefacts: artefacts(draw, draw.whole(0, 3), 1),
    digitiser: { stepUv: 0.25, railUv: 8191.75 },
  };
}

/** Spoiled stretches spread over the study, at least half a minute apart. */
function artefacts(draw: Draw, count: number, scale: number): ArtefactSpec[] {
  const slotS = (MINUTES * MINUTE_S - 60) / Math.max(1, count);
  const made: ArtefactSpec[] = [];
  for (let k = 0; k < count; k += 1) {
    const cause = draw.pick([
      'talk',
      'move',
      'cough',
      'step',
      'burst',
      'electrode',
      'flat',
      'pop',
    ] as const);
    const [seconds, sizeUv] = SIZES[cause](draw);
    const length = Math.min(seconds, slotS - 30);
    const fromS = 30 + k * slotS + draw.between(0, slotS - 30 - length);
    made.push({
      cause: cause === 'pop' ? 'step' : cause,
      fromS,
      toS: fromS + length,
      leads: null,
      sizeUv: scale * sizeUv * draw.pick([1, -1]),
    });
  }
  return made;
}

const SIZES: Readonly<Record<string, (draw: Draw) => readonly [seconds: number, sizeUv: number]>> =
  {
    talk: (draw) => [draw.between(8, 40), draw.between(60, 150)],
    move: (draw) => [draw.between(5, 30), draw.between(300, 900)],
    cough: (draw) => [draw.between(2, 5), draw.between(300, 700)],
    step: (draw) => [draw.between(15, 60), draw.between(800, 5000)],
    burst: (draw) => [draw.between(3, 25), draw.between(40, 150)],
    electrode: (draw) => [draw.between(5, 30), draw.between(600, 2500)],
    flat: (draw) => [draw.between(3, 20), 0],
    pop: (draw) => [draw.between(0.4, 2), draw.between(500, 4000)],
  };

const onLead = (spec: SimulationSpec, lead: Partial<SimulationSpec['leads'][number]>) =>
  spec.leads.map((one) => ({ ...one, ...lead }));

/** Makes the study of a number (0 to 7) of a family. */
type Maker = (draw: Draw, base: SimulationSpec, number: number) => SimulationSpec;

const MAKERS: Readonly<Record<Family, Maker>> = {
  ordinary: (_, base) => base,
  'heavy artefacts': (draw, base) => ({
    ...base,
    artefacts: artefacts(draw, draw.whole(14, 22), 1),
  }),
  'weak wave, strong heartbeat': (draw, base) => ({
    ...base,
    leads: onLead(base, { heartUv: 400, breathingUv: draw.between(10, 25) }),
    slowWave: mealWave(draw, 50),
    noise: { ...base.noise, backgroundUv: draw.between(5, 12) },
  }),
  'breathing at 12, strong harmonic': (draw, base) => ({
    ...base,
    leads: onLead(base, { breathingUv: draw.between(100, 220) }),
    slowWave: { ...mealWave(draw, draw.between(80, 150)), harmonics: [draw.between(0.35, 0.5)] },
    breathing: { ratePerMin: 12, wanderPerMin: 0.4 },
  }),
  'changing rhythms': (draw, base, number) => changing(draw, base, CHANGING[number]),
};

/** What the eight studies of the family hold: bouts of other rhythms, a sawtooth, breathing inside the band, no slow wave at all. */
const CHANGING = [
  'bouts',
  'bouts',
  'bouts',
  'bouts',
  'sawtooth',
  'slow breathing beside a wave',
  'slow breathing alone',
  'no wave',
] as const;

function changing(
  draw: Draw,
  base: SimulationSpec,
  kind: (typeof CHANGING)[number],
): SimulationSpec {
  const wave = mealWave(draw, draw.between(100, 250));
  if (kind === 'no wave') return { ...base, slowWave: null };
  if (kind === 'sawtooth')
    return { ...base, slowWave: { ...wave, harmonics: [1 / 2, 1 / 3, 1 / 4] } };
  if (kind !== 'bouts')
    return {
      ...base,
      slowWave: kind === 'slow breathing alone' ? null : { ...wave, amplitudeUv: 60 },
      leads: onLead(base, { breathingUv: draw.between(80, 200) }),
      breathing: { ratePerMin: draw.between(5, 8), wanderPerMin: 0.1 },
    };
  const points: TrackPoint[] = [];
  for (let atS = 0; atS < MINUTES * MINUTE_S; atS += draw.between(6, 12) * MINUTE_S) {
    const value = draw.pick([draw.between(1.2, 1.8), draw.between(2.6, 3.3), draw.between(4.5, 7)]);
    if (points.length > 0) points.push({ atS: atS - 1, value: points[points.length - 1].value });
    points.push({ atS, value });
  }
  return { ...base, slowWave: { ...wave, frequencyCpm: points, wanderCpm: 0.02 } };
}
