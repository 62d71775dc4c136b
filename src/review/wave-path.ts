/** A drawing's size in its own units, and the values at its lower and upper edge. */
export interface WaveFrame {
  readonly width: number;
  readonly height: number;
  readonly low: number;
  readonly high: number;
}

/** Evenly spaced values as the path of an SVG across the whole width, broken where a value is NaN; '' where all are. */
export function wavePath(values: ArrayLike<number>, frame: WaveFrame): string {
  const { width, height, low, high } = frame;
  const stepX = width / Math.max(1, values.length - 1);
  const perUnit = height / (high - low);
  const parts: string[] = [];
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i];
    if (Number.isNaN(value)) continue;
    const begins = i === 0 || Number.isNaN(values[i - 1]);
    const y = (high - value) * perUnit;
    parts.push(`${begins ? 'M' : 'L'}${(i * stepX).toFixed(1)} ${y.toFixed(1)}`);
  }
  return parts.join('');
}

/** The least and greatest of several series with a twentieth of room at both edges; [-1, 1] where nothing is there. */
export function waveRange(series: readonly ArrayLike<number>[]): readonly [number, number] {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const values of series)
    for (let i = 0; i < values.length; i += 1) {
      if (values[i] < low) low = values[i];
      if (values[i] > high) high = values[i];
    }
  if (!(high > low)) return [-1, 1];
  const room = (high - low) / 20;
  return [low - room, high + room];
}
