import { parseHex } from './hex-colour';

const STEPS = 256;

/** 256 colours (RGBA bytes in the order of the machine's memory) along a ramp of at least two "#rrggbb" stops. */
export function rampTable(stops: readonly string[]): Uint8ClampedArray {
  const colours = stops.map(parseHex);
  const table = new Uint8ClampedArray(STEPS * 4);
  for (let i = 0; i < STEPS; i += 1) {
    const place = (i / (STEPS - 1)) * (colours.length - 1);
    const before = Math.min(Math.floor(place), colours.length - 2);
    const share = place - before;
    for (let part = 0; part < 3; part += 1)
      table[i * 4 + part] = Math.round(
        colours[before][part] * (1 - share) + colours[before + 1][part] * share,
      );
    table[i * 4 + 3] = 255;
  }
  return table;
}

/**
 * Colours levels (dB, column after column from the lowest bin up) as an image of `columns` by `bins` pixels with the lowest
 * bin at the bottom. Levels at or below `lowDb` get the ramp's first colour, at or above `highDb` its last; NaN stays clear.
 */
export function colourLevels(
  levelDb: ArrayLike<number>,
  columns: number,
  bins: number,
  [lowDb, highDb]: readonly [number, number],
  table: Uint8ClampedArray,
): Uint8ClampedArray<ArrayBuffer> {
  const pixels = new Uint8ClampedArray(columns * bins * 4);
  const scale = (STEPS - 1) / (highDb - lowDb);
  for (let column = 0; column < columns; column += 1) {
    for (let bin = 0; bin < bins; bin += 1) {
      const level = levelDb[column * bins + bin];
      if (Number.isNaN(level)) continue;
      const place = Math.round((level - lowDb) * scale);
      const from = Math.min(STEPS - 1, Math.max(0, place)) * 4;
      const to = ((bins - 1 - bin) * columns + column) * 4;
      for (let part = 0; part < 4; part += 1) pixels[to + part] = table[from + part];
    }
  }
  return pixels;
}

const DB_STEP = 5;
const LEAST_RANGE_DB = 20;

/**
 * Limits of the level scale for a whole study, on whole fives: from the level a tenth of all values lie below to the one a
 * two-hundredth lie above, at least 20 dB apart. [0, 60] without values.
 */
export function fittedLevels(levelDb: ArrayLike<number>): readonly [number, number] {
  const stride = Math.max(1, Math.floor(levelDb.length / 50_000));
  const values: number[] = [];
  for (let i = 0; i < levelDb.length; i += stride)
    if (Number.isFinite(levelDb[i])) values.push(levelDb[i]);
  if (values.length === 0) return [0, 60];
  values.sort((a, b) => a - b);
  const at = (share: number) => values[Math.floor(share * (values.length - 1))];
  const high = Math.ceil(at(0.995) / DB_STEP) * DB_STEP;
  const low = Math.floor(at(0.1) / DB_STEP) * DB_STEP;
  return [Math.min(low, high - LEAST_RANGE_DB), high];
}
