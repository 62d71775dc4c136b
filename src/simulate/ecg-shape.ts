import type { Random } from '../numeric/random';
import type { Seconds } from '../units/time';
import { about, between } from './ecg-rhythm';

/** One Gaussian wave of a complex: its middle after the beat's time, its width (SD), its size where R is 1. */
export interface EcgWave {
  readonly atS: Seconds;
  readonly sdS: Seconds;
  readonly size: number;
  /** How its size follows breathing, where that of R is 1. */
  readonly breath: number;
}

/** The waves of one kind of beat. The T wave's place is that at an RR interval of 1 s; it goes with the root of RR. */
export interface EcgComplex {
  readonly qrs: readonly EcgWave[];
  readonly t: readonly EcgWave[];
}

/** The usual shapes of a QRS complex as a surface lead may show it. */
export const ECG_FAMILIES = [
  'narrow',
  'rS',
  'qS',
  'leftBundle',
  'rightBundle',
  'biphasic',
  'tiny',
  'tallT',
] as const;
export type EcgFamily = (typeof ECG_FAMILIES)[number];

/** All shapes of one heart on one lead. */
export interface EcgHeart {
  readonly family: EcgFamily;
  readonly normal: EcgComplex;
  /** What the normal one turns into as posture changes. */
  readonly turned: EcgComplex;
  readonly aberrant: EcgComplex;
  readonly paced: EcgComplex;
  readonly foci: readonly EcgComplex[];
  /** P waves, each beside the P wave's middle. */
  readonly p: readonly EcgWave[];
}

/** A wave given in ms, its size and width varied by a tenth. */
function wave(random: Random, atMs: number, sdMs: number, size: number): EcgWave {
  return {
    atS: (atMs + 1.5 * random.gaussian()) / 1000,
    sdS: about(random, sdMs, 0.1) / 1000,
    size: about(random, 1, 0.12) * size,
    breath: between(random, 0.4, 1.6),
  };
}

/** QRS waves of each family (places and widths in ms, sizes where the greatest is about 1): invented, of usual widths. */
const QRS: Readonly<Record<EcgFamily, (r: Random) => readonly EcgWave[]>> = {
  narrow: (r) => [
    wave(r, -27, 8, -between(r, 0.02, 0.25)),
    wave(r, 0, between(r, 8.5, 13), 1),
    wave(r, 29, 10, -between(r, 0.02, 0.45)),
  ],
  rS: (r) => [wave(r, -26, 9, between(r, 0.15, 0.5)), wave(r, 2, between(r, 11, 16), -1)],
  qS: (r) => [wave(r, 0, between(r, 13, 19), -1), wave(r, 28, 11, -between(r, 0, 0.4))],
  leftBundle: (r) => [
    wave(r, -20, between(r, 11, 17), between(r, 0.7, 1)),
    wave(r, 27, between(r, 12, 19), between(r, 0.5, 1)),
  ],
  rightBundle: (r) => [
    wave(r, -34, 9, between(r, 0.25, 0.8)),
    wave(r, -8, 11, -between(r, 0.1, 0.7)),
    wave(r, 30, between(r, 13, 21), between(r, 0.4, 1)),
  ],
  biphasic: (r) => [wave(r, -12, 10, between(r, 0.6, 1)), wave(r, 17, 12, -between(r, 0.6, 1))],
  tiny: (r) => [
    wave(r, -20, 9, -between(r, 0.2, 0.5)),
    wave(r, 2, between(r, 10, 15), 1),
    wave(r, 30, 11, -between(r, 0.2, 0.8)),
  ],
  tallT: (r) => [
    wave(r, -27, 8, -between(r, 0.02, 0.2)),
    wave(r, 0, between(r, 9, 13), 1),
    wave(r, 29, 11, -between(r, 0.1, 0.6)),
  ],
};

/** Size of the T wave beside R, least and greatest. */
const T_SIZE: Readonly<Record<EcgFamily, readonly [number, number]>> = {
  narrow: [0.05, 0.4],
  rS: [-0.3, 0.4],
  qS: [0.1, 0.5],
  leftBundle: [-0.5, -0.2],
  rightBundle: [-0.4, 0.35],
  biphasic: [-0.3, 0.4],
  tiny: [0.3, 0.9],
  tallT: [0.7, 1.2],
};

function tWaves(random: Random, size: number, atMs: number): readonly EcgWave[] {
  const sdMs = between(random, 36, 56);
  return [
    wave(random, atMs - 0.6 * sdMs, 1.1 * sdMs, 0.55 * size),
    wave(random, atMs + 0.3 * sdMs, 0.75 * sdMs, 0.7 * size),
  ];
}

/** A wide complex of a ventricular focus: any polarity, 120-200 ms, of its own size; now and then small. */
function ventricular(random: Random): EcgComplex {
  const sign = random.uniform() < 0.5 ? 1 : -1;
  const size =
    sign * (random.uniform() < 0.2 ? between(random, 0.3, 0.55) : about(random, 1.1, 0.4));
  const sharp = (random.uniform() < 0.5 ? 1 : -1) * between(random, 0.1, 0.4);
  const second = random.uniform() < 0.6 ? -between(random, 0.2, 0.8) : between(random, 0.2, 0.7);
  return {
    qrs: [
      wave(random, between(random, -45, -20), between(random, 9, 15), sharp * size),
      wave(random, between(random, -10, 10), between(random, 16, 30), size),
      wave(random, between(random, 50, 85), between(random, 18, 34), second * size),
    ],
    t: tWaves(random, -between(random, 0.2, 0.6) * size, between(random, 290, 340)),
  };
}

/** A complex made wider and smaller, its T wave turned. */
function aberrantOf({ qrs, t }: EcgComplex, random: Random): EcgComplex {
  const stretch = between(random, 1.2, 1.7);
  const size = between(random, 0.3, 0.9);
  return {
    qrs: qrs.map((one) => ({
      ...one,
      atS: one.atS * stretch,
      sdS: one.sdS * stretch,
      size: one.size * size * about(random, 1, 0.25),
    })),
    t: t.map((one) => ({ ...one, size: -0.8 * size * one.size })),
  };
}

function turnedOf({ qrs, t }: EcgComplex, random: Random): EcgComplex {
  const gain = between(random, 0.6, 1.35);
  const turn = (one: EcgWave) => ({ ...one, size: gain * one.size * about(random, 1, 0.25) });
  return { qrs: qrs.map(turn), t: t.map(turn) };
}

/** Draws all shapes of one heart. `sign` -1 turns the normal complex over. */
export function drawHeart(family: EcgFamily, sign: 1 | -1, foci: number, random: Random): EcgHeart {
  const [leastT, mostT] = T_SIZE[family];
  const upright = {
    qrs: QRS[family](random),
    t: tWaves(random, between(random, leastT, mostT), between(random, 250, 310)),
  };
  const flip = (one: EcgWave) => ({ ...one, size: sign * one.size });
  const normal = { qrs: upright.qrs.map(flip), t: upright.t.map(flip) };
  const pSize = family === 'tiny' ? between(random, 0.3, 0.7) : between(random, 0.03, 0.17);
  return {
    family,
    normal,
    turned: turnedOf(normal, random),
    aberrant: aberrantOf(normal, random),
    paced: ventricular(random),
    foci: Array.from({ length: foci }, () => ventricular(random)),
    p: [
      wave(random, -9, 17, pSize),
      wave(random, 12, 18, pSize * (random.uniform() < 0.2 ? -0.7 : 0.8)),
    ],
  };
}
