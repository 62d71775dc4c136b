import type { ShapeAverage } from './beat-average';
import type { Decided, Judged } from './place-odds';

/** Places less likely to be wrong than this are not worth a look. */
const LEAST_WRONG = 0.01;

/** Places where the detector may have decided wrongly, ascending. */
export interface UnsurePlaces {
  /** Where the beat stands, or would stand. */
  readonly ticks: Float64Array;
  /** The chance of being wrong, 0 to 1. */
  readonly wrong: Float64Array;
  /** 1 where a beat was taken. */
  readonly taken: Uint8Array;
}

export const NONE_UNSURE: UnsurePlaces = {
  ticks: new Float64Array(0),
  wrong: new Float64Array(0),
  taken: new Uint8Array(0),
};

/** A place as it was weighed, with the shape that fits it best. */
export interface Place extends Judged {
  readonly shape: number;
}

/**
 * The places of a detection that are worth a second look: `decided` belongs to `places`; `beats` are those taken, `times`
 * theirs in samples. A place not taken is timed as a beat of its shape would be.
 */
export function unsurePlaces(
  { places, decided }: { readonly places: readonly Place[]; readonly decided: Decided },
  { beats, times }: { readonly beats: readonly Place[]; readonly times: readonly number[] },
  averages: readonly ShapeAverage[],
  ticksPerSample: number,
): UnsurePlaces {
  const taken = new Map(beats.map(({ sample }, i) => [sample, times[i]]));
  const offsets = new Map(
    averages.map(({ shape, fiducial, middle }) => [shape, fiducial - middle]),
  );
  const rows = places
    .flatMap(({ sample, shape }, j) => {
      const wrong = decided.wrong[j];
      if (!(wrong >= LEAST_WRONG)) return [];
      const time = taken.get(sample) ?? sample + (offsets.get(shape) ?? 0);
      return [{ tick: Math.round(time * ticksPerSample), wrong, taken: taken.has(sample) }];
    })
    .sort((a, b) => a.tick - b.tick);
  return {
    ticks: Float64Array.from(rows, ({ tick }) => tick),
    wrong: Float64Array.from(rows, ({ wrong }) => wrong),
    taken: Uint8Array.from(rows, ({ taken: isTaken }) => (isTaken ? 1 : 0)),
  };
}
