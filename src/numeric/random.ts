import { log } from './elementary';

/** Pseudo-random numbers that depend on the seed alone. */
export interface Random {
  /** A whole number from 0 to 2^32 - 1. */
  uint32(): number;
  /** A number in [0, 1) with 53 random bits. */
  uniform(): number;
  /** A whole number in 0..count - 1, all alike probable; count from 1 to 2^32. */
  below(count: number): number;
  /** A number from the standard normal distribution. */
  gaussian(): number;
}

const STATE = 624;
const AHEAD = 397;

function seeded(seed: number): Uint32Array {
  const state = new Uint32Array(STATE);
  state[0] = seed;
  for (let i = 1; i < STATE; i++) {
    const before = state[i - 1] ^ (state[i - 1] >>> 30);
    state[i] = Math.imul(1812433253, before) + i;
  }
  return state;
}

function twist(state: Uint32Array): void {
  for (let i = 0; i < STATE; i++) {
    const mixed = (state[i] & 0x80000000) | (state[(i + 1) % STATE] & 0x7fffffff);
    const turned = (mixed >>> 1) ^ (mixed & 1 ? 0x9908b0df : 0);
    state[i] = state[(i + AHEAD) % STATE] ^ turned;
  }
}

/**
 * The 32-bit Mersenne Twister (Matsumoto & Nishimura 1998), seeded by a whole number from 0 to
 * 2^32 - 1: integer arithmetic only, so the same numbers everywhere. Normal numbers by the polar
 * method (Marsaglia & Bray 1964).
 */
export function createRandom(seed: number): Random {
  const state = seeded(seed);
  let next = STATE;
  let spare = Number.NaN;

  function uint32(): number {
    if (next === STATE) {
      twist(state);
      next = 0;
    }
    let y = state[next++];
    y ^= y >>> 11;
    y ^= (y << 7) & 0x9d2c5680;
    y ^= (y << 15) & 0xefc60000;
    y ^= y >>> 18;
    return y >>> 0;
  }

  function uniform(): number {
    const high = uint32() >>> 5;
    const low = uint32() >>> 6;
    return (high * 67108864 + low) / 9007199254740992;
  }

  function below(count: number): number {
    const limit = 4294967296 - (4294967296 % count);
    let drawn = uint32();
    while (drawn >= limit) drawn = uint32();
    return drawn % count;
  }

  function gaussian(): number {
    if (!Number.isNaN(spare)) {
      const kept = spare;
      spare = Number.NaN;
      return kept;
    }
    for (;;) {
      const a = 2 * uniform() - 1;
      const b = 2 * uniform() - 1;
      const square = a * a + b * b;
      if (square >= 1 || square === 0) continue;
      const factor = Math.sqrt((-2 * log(square)) / square);
      spare = factor * a;
      return factor * b;
    }
  }

  return { uint32, uniform, below, gaussian };
}
