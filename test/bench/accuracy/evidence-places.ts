import { afterWaveCosts, usualCourses } from '../../../src/heart/after-wave';
import { energyPass, type HeartSignal, levelsOf } from '../../../src/heart/energy-pass';
import { placeEvidence, sizeEvidence } from '../../../src/heart/evidence';
import { findBeats } from '../../../src/heart/find-beats';
import { qrsBands } from '../../../src/heart/qrs-bands';
import { rhythmOf } from '../../../src/heart/rhythm-path';
import { rhythmFromBeats } from '../../../src/heart/rhythm-track';
import { type Candidate, shapePass } from '../../../src/heart/shape-pass';
import { usableRanges } from '../../../src/heart/usable-signal';
import { firstAtOrAfter } from '../../../src/numeric/first-at-or-after';
import { atOnce } from '../../../src/numeric/in-steps';
import { median } from '../../../src/numeric/statistics';

/** A place is a true beat within so much of one; what lies a little farther is neither. */
const AT_BEAT_S = 0.1;
const BESIDE_BEAT_S = 0.13;
/** Where no part of a beat is: so long after one and before the next. */
const AFTER_BEAT_S = 0.45;
const BEFORE_BEAT_S = 0.3;
/** Beats about one whose median size is the usual one. */
const NEIGHBOURS = 7;

/** A place as the detector weighs it, with the truth. */
export interface KnownPlace {
  readonly isBeat: boolean;
  readonly candidate: Candidate;
  /** Log-odds without what rhythm and T waves say. */
  readonly evidence: number;
  /** Size beside the usual one near it. */
  readonly size: number;
  readonly beatUv: number;
  readonly noiseUv: number;
  /** What the time and energy of a T wave say against it, at weight 1. */
  readonly waveCost: number;
}

/** What the lead of an invented record shows of its evidence. */
export interface KnownLead {
  readonly places: readonly KnownPlace[];
  /** Energy of crests where no part of a beat is, over the noise of their second. */
  readonly noiseCrests: readonly number[];
}

function usualSize(beats: readonly Candidate[]): (sample: number) => number {
  const samples = beats.map(({ sample }) => sample);
  return (sample) => {
    const at = firstAtOrAfter(samples, sample);
    const near = beats.slice(Math.max(0, at - NEIGHBOURS), at + NEIGHBOURS + 1);
    return Math.min(4, Math.max(0.25, median(near.map(({ size }) => size))));
  };
}

/** The place with the greatest evidence within AT_BEAT_S of each true beat. */
function placesOfBeats(
  trueS: readonly number[],
  timesS: readonly number[],
  evidence: readonly number[],
) {
  const found = new Set<number>();
  for (const timeS of trueS) {
    let best = -1;
    const from = firstAtOrAfter(timesS, timeS - AT_BEAT_S);
    for (let i = from; i < timesS.length && timesS[i] <= timeS + AT_BEAT_S; i += 1)
      if (best < 0 || evidence[i] > evidence[best]) best = i;
    if (best >= 0) found.add(best);
  }
  return found;
}

const distanceTo = (ascending: readonly number[], s: number) => {
  const next = firstAtOrAfter(ascending, s);
  return {
    after: s - (ascending[next - 1] ?? Number.NEGATIVE_INFINITY),
    before: (ascending[next] ?? Number.POSITIVE_INFINITY) - s,
  };
};

/** All places of a heartbeat signal that the detector weighs, with what the truth (s) says of them. */
export function knownPlaces(
  samples: Float32Array,
  rateHz: number,
  trueS: readonly number[],
): KnownLead {
  const usable = usableRanges(samples, rateHz, []);
  const signal: HeartSignal = { samples, rateHz, usable, bands: qrsBands(rateHz) };
  const energy = atOnce(energyPass(signal));
  const levels = atOnce(levelsOf(energy, Math.ceil(samples.length / rateHz)));
  const { beats, shapes } = atOnce(findBeats(signal));
  const first = beats.map(({ sample }) => sample);
  const candidates = atOnce(shapePass(signal, shapes, energy, first));
  const second = (sample: number) => Math.min(levels.beat.length - 1, Math.floor(sample / rateHz));
  const usual = usualSize(beats);
  const evidence = candidates.map((one) => {
    const s = second(one.sample);
    return placeEvidence(one, levels.beat[s], levels.noise[s]) + sizeEvidence(one, usual);
  });
  const rhythm = atOnce(
    rhythmFromBeats(
      first.map((sample) => sample / rateHz),
      () => rhythmOf(0.8, 0.3, 0.1),
    ),
  );
  const weighed = candidates.map((one, i) => ({ ...one, score: evidence[i], asT: 0 }));
  const courses = atOnce(usualCourses(beats, energy, rateHz));
  const rrAt = (sample: number) => rhythm(sample / rateHz).rrS;
  const costs = atOnce(afterWaveCosts(weighed, courses, energy, rateHz, rrAt, 1));
  const timesS = candidates.map(({ sample }) => sample / rateHz);
  const ofBeats = placesOfBeats(trueS, timesS, evidence);
  const places = candidates.flatMap((candidate, i): readonly KnownPlace[] => {
    const { after, before } = distanceTo(trueS, timesS[i]);
    if (!ofBeats.has(i) && Math.min(after, before) < BESIDE_BEAT_S) return [];
    const s = second(candidate.sample);
    return [
      {
        isBeat: ofBeats.has(i),
        candidate,
        evidence: evidence[i],
        size: candidate.size / usual(candidate.sample),
        beatUv: levels.beat[s],
        noiseUv: levels.noise[s],
        waveCost: costs[i],
      },
    ];
  });
  const noiseCrests = energy.crests
    .filter(({ sample }) => {
      const { after, before } = distanceTo(trueS, sample / rateHz);
      return after > AFTER_BEAT_S && before > BEFORE_BEAT_S;
    })
    .map(({ sample, energyUv }) => energyUv / levels.noise[second(sample)]);
  return { places, noiseCrests };
}
