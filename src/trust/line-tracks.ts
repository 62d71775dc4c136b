import type { Epoch } from '../recording/rhythm';
import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';

/** The course of one line of a lead's spectrum: straight between points at ascending times, held outside them. */
export interface LineTrack {
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly centresS: Float64Array;
  readonly cpm: Float64Array;
}

/** From one epoch to the next a wave wanders by less than this; what lies farther is another line. */
const SAME_LINE_CPM = 0.4;
/** A line goes on across so long a time without it: what is taken out there is put back as noise. */
const GOES_ON_S: Seconds = 900;
/** A line is taken out so much longer than its epochs say: one that comes late into an epoch does not name it. */
const LONGER_S: Seconds = 240;

/** Frequency of a line at a time. */
export function trackCpm({ centresS, cpm }: LineTrack, atS: Seconds): Cpm {
  const last = centresS.length - 1;
  if (atS <= centresS[0]) return cpm[0];
  if (atS >= centresS[last]) return cpm[last];
  let [low, high] = [0, last];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (centresS[middle] <= atS) low = middle;
    else high = middle;
  }
  const part = (atS - centresS[low]) / (centresS[high] - centresS[low]);
  return cpm[low] + part * (cpm[high] - cpm[low]);
}

/** The same line at a multiple of its frequency. */
export const harmonicOf = (track: LineTrack, multiple: number): LineTrack => ({
  ...track,
  cpm: track.cpm.map((one) => multiple * one),
});

const isLine = ({ kept, rhythm, dfCpm }: Epoch) =>
  kept && dfCpm !== null && rhythm !== null && rhythm !== 'none' && rhythm !== 'undecided';

interface Chain {
  readonly epochs: Epoch[];
}

const dfOf = ({ dfCpm }: Epoch): Cpm => dfCpm ?? Number.NaN;

/** The open chain whose last DF lies nearest, near enough and not too long ago. */
function chainFor(chains: readonly Chain[], epoch: Epoch): Chain | null {
  let best: Chain | null = null;
  let nearest = SAME_LINE_CPM;
  for (const chain of chains) {
    const last = chain.epochs[chain.epochs.length - 1];
    const apart = Math.abs(dfOf(epoch) - dfOf(last));
    if (epoch.fromS > last.toS + GOES_ON_S || apart > nearest) continue;
    best = chain;
    nearest = apart;
  }
  return best;
}

const trackOf = (epochs: readonly Epoch[]): LineTrack => ({
  fromS: epochs[0].fromS - LONGER_S,
  toS: epochs[epochs.length - 1].toS + LONGER_S,
  centresS: Float64Array.from(epochs, ({ fromS, toS }) => (fromS + toS) / 2),
  cpm: Float64Array.from(epochs, dfOf),
});

/** The lines of a lead, and those whose double was flagged as the stronger one. */
export interface FoundLines {
  readonly tracks: readonly LineTrack[];
  /** Of each track: true where an epoch's highest peak was its locked double. */
  readonly doubled: readonly boolean[];
}

/**
 * The lines that gave a lead's epochs their rhythm: DF of epochs one after the other within 0.4 cpm is one line, from the
 * first of them to the last. Epochs without a rhythm, and those whose peak may be breathing or drift, have none; a line goes
 * on across up to a quarter of an hour of them, and across what lies between phases.
 */
export function lineTracks(epochs: readonly Epoch[]): FoundLines {
  const chains: Chain[] = [];
  const inTime = epochs.filter(isLine).sort((a, b) => a.fromS - b.fromS);
  for (const epoch of inTime) {
    const chain = chainFor(chains, epoch);
    if (chain) chain.epochs.push(epoch);
    else chains.push({ epochs: [epoch] });
  }
  return {
    tracks: chains.map((chain) => trackOf(chain.epochs)),
    doubled: chains.map((chain) => chain.epochs.some(({ flags }) => flags.includes('harmonic'))),
  };
}
