/** Bells of 12 ms every 0.8 s, breathing, slow wave, offset and noise: as test/reference/separate-scipy.py makes it. */
export function mixture(rateHz: number, seconds: number): Float64Array {
  const x = new Float64Array(seconds * rateHz);
  let state = 1n;
  for (let i = 0; i < x.length; i++) {
    const t = i / rateHz;
    state = (state * 1103515245n + 12345n) % 2147483648n;
    const noise = 20 * (Number(state) / 2147483648 - 0.5);
    const beat = ((t + 0.4) % 0.8) - 0.4;
    x[i] =
      1500 +
      100 * Math.sin(2 * Math.PI * 0.05 * t) +
      40 * Math.sin(2 * Math.PI * 0.25 * t) +
      300 * Math.exp(-0.5 * (beat / 0.012) ** 2) +
      noise;
  }
  return x;
}
