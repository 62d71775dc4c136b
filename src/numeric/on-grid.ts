/**
 * A course through values at ascending times, by straight lines, at firstS + k / rateHz for k from 0 on; NaN before the first
 * value, from the last one on, and where two values lie further apart than `longestS`.
 */
export function onGrid(
  timesS: Float64Array,
  values: Float64Array,
  grid: { readonly firstS: number; readonly rateHz: number; readonly length: number },
  longestS: number,
): Float64Array {
  const { firstS, rateHz, length } = grid;
  const out = new Float64Array(length).fill(Number.NaN);
  let next = 0;
  for (let i = 0; i < length; i += 1) {
    const timeS = firstS + i / rateHz;
    while (next < timesS.length && timesS[next] <= timeS) next += 1;
    if (next === 0 || next === timesS.length) continue;
    const [from, to] = [timesS[next - 1], timesS[next]];
    if (to - from > longestS) continue;
    const part = (timeS - from) / (to - from);
    out[i] = values[next - 1] + part * (values[next] - values[next - 1]);
  }
  return out;
}
