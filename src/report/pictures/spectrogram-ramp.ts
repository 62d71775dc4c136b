/** The light theme's spectrogram colours, low to high; lightness falls all the way, so that it reads in grey too. */
export const RAMP_STOPS: readonly string[] = [
  '#f7f5f0',
  '#deece7',
  '#b4d9d1',
  '#80beb5',
  '#4c9e95',
  '#1f7a72',
  '#0d5854',
  '#0e383c',
  '#101e28',
];

export const RAMP_STEPS = 128;

type Rgb = readonly [number, number, number];

const parts = (stop: string): Rgb => [
  Number.parseInt(stop.slice(1, 3), 16),
  Number.parseInt(stop.slice(3, 5), 16),
  Number.parseInt(stop.slice(5, 7), 16),
];

/** The colour at a share of the way from low (0) to high (1). */
export function rampColour(share: number): Rgb {
  const place = Math.min(1, Math.max(0, share)) * (RAMP_STOPS.length - 1);
  const before = Math.min(Math.floor(place), RAMP_STOPS.length - 2);
  const [from, to] = [parts(RAMP_STOPS[before]), parts(RAMP_STOPS[before + 1])];
  const mix = (part: 0 | 1 | 2) =>
    Math.round(from[part] + (to[part] - from[part]) * (place - before));
  return [mix(0), mix(1), mix(2)];
}

/** Index 0 is clear; 1 to RAMP_STEPS run from low to high. */
export const RAMP_PALETTE: readonly Rgb[] = [
  [255, 255, 255],
  ...Array.from({ length: RAMP_STEPS }, (_, step) => rampColour(step / (RAMP_STEPS - 1))),
];
