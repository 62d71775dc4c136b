import type { BeatDoubtsInput } from '../../../src/heart/doubt-view';
import type { BeatClass } from '../../../src/recording/beat';
import type { Interval } from '../../../src/recording/span';
import { ecgRecord } from '../../../src/simulate/ecg-record';
import type { EcgOrigin } from '../../../src/simulate/ecg-rhythm';
import { simulateStudy } from '../../../src/simulate/simulate-study';
import { abdomenUv, RATE_HZ, reference } from '../../heart/record208';
import { drawStudies } from '../accuracy/families';
import { drawRecord } from '../accuracy/heartbeats-records';
import { atLevel, findAsProgram, type LeadToScore } from '../accuracy/heartbeats-run';

/** A beat that is known to be there; null where nobody says of what class it is. */
export interface KnownBeat {
  readonly timeS: number;
  readonly beatClass: BeatClass | null;
}

/** A lead with its known beats, and what the program made of it. */
export interface DoubtCase {
  readonly name: string;
  readonly isSinus: boolean;
  readonly known: readonly KnownBeat[];
  /** Not scored: what is spoiled, and the ends, where beats may be cut off. */
  readonly left: readonly Interval[];
  readonly input: BeatDoubtsInput;
}

const MARGIN_S = 1;
const STUDIES = 1;

function caseOf(
  name: string,
  isSinus: boolean,
  lead: LeadToScore,
  known: readonly KnownBeat[],
  spoiled: readonly Interval[],
): DoubtCase {
  const { doubted, proposed } = findAsProgram(lead);
  const endS = lead.signal.length / lead.rateHz;
  const left = [...spoiled, ...proposed].map(({ fromS, toS }) => ({
    fromS: fromS - MARGIN_S,
    toS: toS + MARGIN_S,
  }));
  const ends = [
    { fromS: 0, toS: MARGIN_S },
    { fromS: endS - MARGIN_S, toS: endS },
  ];
  return { name, isSinus, known, left: [...left, ...ends], input: doubted };
}

/** The forty studies of the accuracy bench; all are sinus rhythm with early beats. */
export function* simulatedCases(): Generator<DoubtCase> {
  for (const { family, spec } of drawStudies(STUDIES)) {
    const { signals, truth } = simulateStudy(spec);
    const { digitiser, rateHz } = spec;
    if (!digitiser) throw new Error('a study for a file has a digitiser');
    const { stepUv, railUv } = digitiser;
    const signal = signals[0].map((uv) =>
      Math.max(-railUv, Math.min(railUv, Math.round(uv / stepUv) * stepUv)),
    );
    yield caseOf(family, true, { signal, rateHz, stepUv, railUv }, truth.beats, truth.spoiled);
  }
}

/** The three abdominal mixtures of the real record; its rhythm is broken by ventricular beats, a quarter of all. */
export function* recordedCases(): Generator<DoubtCase> {
  const known = reference.beats.map((one) => ({ timeS: one.time_s, beatClass: one.class }));
  const left = reference.not_scored.map(({ from_s, to_s }) => ({ fromS: from_s, toS: to_s }));
  for (const channel of [0, 1, 2]) {
    const signal = abdomenUv(channel);
    const lead = { signal, rateHz: RATE_HZ, stepUv: 4000 / 65535, railUv: 2000 };
    yield caseOf(`record 208, mixture ${channel + 1}`, false, lead, known, left);
  }
}

/** Classes by where a beat comes from; of aberrant ones nobody can say it from one lead. */
const CLASSES: Readonly<Record<EcgOrigin, BeatClass | null>> = {
  sinus: 'N',
  paced: 'N',
  junctional: null,
  aberrant: null,
  atrial: 'S',
  ventricular: 'V',
  fusion: null,
};

const ECG_SECONDS = 400;

/** The invented ECG records made harder than real ones, mixed into an abdominal lead at 50 uV. */
export function* hardCases(): Generator<DoubtCase> {
  for (const first of [1, 1001])
    for (let seed = first; seed < first + 24; seed += 1) {
      const { spec, rhythm } = drawRecord(seed, ECG_SECONDS);
      const { signal, rateHz, beats } = ecgRecord(spec);
      const lead = atLevel({ signal, rateHz, stepUv: 5, railUv: 5120 }, spec.heightUv, 50, seed);
      const known = beats.map(({ timeS, origin }) => ({ timeS, beatClass: CLASSES[origin] }));
      yield caseOf(rhythm, rhythm.startsWith('sinus'), lead, known, []);
    }
}
