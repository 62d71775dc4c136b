import type { BreathingSeries } from '../../../src/recording/heart-series';
import type { Epoch } from '../../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import type { Interval } from '../../../src/recording/span';
import { windowSpectra } from '../../../src/stomach/window-spectrum';
import {
  BACKGROUNDS,
  EPOCH_SAMPLES,
  fieldWave,
  leftovers,
  SAWTOOTH,
  SPOILINGS,
  spoiledLead,
  sumOf,
  type WaveSpec,
} from '../../stomach/field';
import { RATE_HZ, rhythmOfLead } from '../../stomach/leads';
import type { Measured } from '../measured';

/** Epochs of 240 s side by side, made at 4 Hz. */
const EACH = 150;
const LENGTH = EACH * EPOCH_SAMPLES;
/** Patterns also tried with what artefacts leave behind them. */
const LEAVING: readonly string[] = ['20 s', 'eight of 5 s'];
const SETTINGS = {
  ...DEFAULT_SETTINGS,
  epoch: { ...DEFAULT_SETTINGS.epoch, stepS: DEFAULT_SETTINGS.epoch.lengthS },
};
const BACKGROUND = '1/f';

interface Around {
  readonly spoiled?: readonly Interval[];
  readonly breathing?: BreathingSeries;
}

const keptOf = (signal: Float64Array, around: Around = {}): readonly Epoch[] =>
  rhythmOfLead(signal, { settings: SETTINGS, ...around }).rhythm.epochs.filter(({ kept }) => kept);
const sharePct = (epochs: readonly Epoch[], is: (one: Epoch) => boolean) =>
  (100 * epochs.filter(is).length) / epochs.length;
const claims = ({ rhythm }: Epoch) => rhythm !== 'none' && rhythm !== 'undecided';
const steady = (cpm: number, uv: number, more: Partial<WaveSpec> = {}) =>
  fieldWave(LENGTH, { cpmAt: () => cpm, uvAt: () => uv, seed: 8, ...more });
const WANDER = { wanderCpm: 0.05, wanderShare: 0.15 } as const;

const row = (what: string, value: number, budget: string, note = ''): Measured => ({
  part: 'accuracy',
  what,
  value,
  unit: '%',
  decimals: 1,
  budget,
  note,
});

function falseRhythms(): readonly Measured[] {
  return Object.entries(BACKGROUNDS).map(([name, make]) => {
    const signal = make(LENGTH, 77);
    const shares = Object.keys(SPOILINGS).flatMap((kind) => {
      const spoiled = spoiledLead(kind, EACH, 5);
      const tails = sumOf(signal, leftovers(LENGTH, spoiled, 60, 4, 3));
      const all = LEAVING.includes(kind) ? [signal, tails] : [signal];
      return all.map((one) => sharePct(keptOf(one, { spoiled }), claims));
    });
    const mean = shares.reduce((sum, one) => sum + one, 0) / shares.length;
    const [clean] = shares;
    return row(
      `epochs of ${name} called a rhythm`,
      mean,
      '5',
      `${clean.toFixed(1)} with nothing spoiled, worst pattern ${Math.max(...shares).toFixed(1)}; ${EACH} epochs each`,
    );
  });
}

/** Mean power within 1 cpm on either side of a frequency, uV2. */
function powerAround(signal: Float64Array, cpm: number): number {
  const kept = new Uint8Array(signal.length).fill(1);
  const spectra = windowSpectra({
    signal,
    kept,
    rateHz: RATE_HZ,
    lengthS: SETTINGS.epoch.lengthS,
    powerResponse: null,
  });
  let power = 0;
  for (let k = 0; k < EACH; k += 1)
    spectra.density(spectra.prepare(k * EPOCH_SAMPLES)).forEach((value, bin) => {
      if (Math.abs(bin * spectra.binCpm - cpm) < 1) power += (value * spectra.binCpm) / 60 / EACH;
    });
  return power;
}

function foundWaves(): readonly Measured[] {
  const noise = BACKGROUNDS[BACKGROUND](LENGTH, 31);
  return [1.5, 3, 5.5].flatMap((cpm) =>
    [0, 3, 6, 10].map((gainDb) => {
      const uv = Math.sqrt(2 * powerAround(noise, cpm) * 10 ** (gainDb / 10));
      const signal = sumOf(noise, steady(cpm, uv, WANDER).uv);
      const near = ({ dfCpm }: Epoch) => dfCpm !== null && Math.abs(dfCpm - cpm) < 0.4;
      const found = (epochs: readonly Epoch[]) =>
        sharePct(epochs, (one) => claims(one) && near(one));
      const clean = keptOf(signal);
      const spoiled = keptOf(signal, { spoiled: spoiledLead('eight of 5 s', EACH, 4) });
      return row(
        `found at ${cpm} cpm, ${gainDb} dB over the background within 1 cpm`,
        found(clean),
        gainDb === 0 && cpm > 2 ? '95' : '',
        `${found(spoiled).toFixed(0)} with eight spans of 5 s; DF is the wave's in ${sharePct(clean, near).toFixed(0)} %`,
      );
    }),
  );
}

function waveShapes(): readonly Measured[] {
  const noise = BACKGROUNDS[BACKGROUND](LENGTH, 3).map((value) => value / 2);
  const spoiled = spoiledLead('four of 10 s', EACH, 4);
  const shapes: readonly (readonly [string, NonNullable<WaveSpec['harmonics']>])[] = [
    ['sawtooth', SAWTOOTH],
    ['second harmonic 1.5 times its wave', [[1.5, 0.7]]],
    ['second harmonic 3 times its wave', [[3, 0.7]]],
  ];
  return shapes.map(([name, harmonics]) => {
    const signal = sumOf(noise, steady(3, 60, { wanderCpm: 0.1, wanderShare: 0.2, harmonics }).uv);
    const tachy = ({ rhythm }: Epoch) => rhythm === 'tachy';
    const [clean, holed] = [keptOf(signal), keptOf(signal, { spoiled })];
    return row(
      `3 cpm as a ${name}: tachy`,
      sharePct(clean, tachy),
      '0',
      `${sharePct(holed, tachy).toFixed(1)} with four spans of 10 s; mixed ${sharePct(clean, ({ rhythm }) => rhythm === 'mixed').toFixed(1)}`,
    );
  });
}

function changes(): readonly Measured[] {
  const noise = BACKGROUNDS[BACKGROUND](LENGTH, 3);
  const mixed = ({ rhythm }: Epoch) => rhythm === 'mixed';
  const changing = (from: number, to: number, place: number, ratio: number) => {
    const before = (t: number) => t % 240 < place * 240;
    const wave = fieldWave(LENGTH, {
      cpmAt: (t) => (before(t) ? from : to),
      uvAt: (t) => (before(t) ? 100 : 100 * ratio),
      ...WANDER,
      seed: 4,
    });
    return sharePct(keptOf(sumOf(noise, wave.uv)), mixed);
  };
  const pairs = [
    [3, 5],
    [3, 6],
    [5, 3],
    [3, 1.5],
    [1.5, 3],
  ] as const;
  const places = [0.2, 0.3, 0.5, 0.7, 0.8];
  const rows = pairs.map(([from, to]) => {
    const at = places.map((place) => changing(from, to, place, 1).toFixed(0)).join(', ');
    const unequal = [0.5, 2].map((ratio) => changing(from, to, 0.5, ratio).toFixed(0));
    return row(
      `mixed where ${from} cpm turns into ${to} half-way`,
      changing(from, to, 0.5, 1),
      '',
      `at ${places.join(', ')} of the epoch: ${at}; half-way to half and double the amplitude: ${unequal.join(', ')}`,
    );
  });
  const frequencies = [1.5, 2.5, 3, 3.5, 5, 7];
  const steadyShares = frequencies.map((cpm) =>
    sharePct(
      keptOf(sumOf(noise, steady(cpm, 80, { wanderCpm: 0.15, wanderShare: 0.3 }).uv)),
      mixed,
    ),
  );
  const mean = steadyShares.reduce((sum, one) => sum + one, 0) / steadyShares.length;
  return [
    ...rows,
    row(
      'mixed where one rhythm wanders by 0.15 cpm and 30 %',
      mean,
      '2',
      `${frequencies.join(', ')} cpm: ${steadyShares.map((one) => one.toFixed(1)).join(', ')}`,
    ),
  ];
}

/** The mean rate of each minute, as an ideal belt would give it. */
function ratesOf(cpm: Float64Array): BreathingSeries {
  const windowed = Math.floor(cpm.length / RATE_HZ / 30) - 1;
  return {
    centresS: Float64Array.from({ length: windowed }, (_, k) => 30 * k + 30),
    perMinute: Float64Array.from({ length: windowed }, (_, k) => {
      const part = cpm.subarray(30 * k * RATE_HZ, (30 * k + 60) * RATE_HZ);
      return part.reduce((sum, one) => sum + one, 0) / part.length;
    }),
    from: 'lead',
  };
}

function slowBreathing(): readonly Measured[] {
  const noise = BACKGROUNDS[BACKGROUND](LENGTH, 3).map((value) => value / 2);
  return [5, 6, 7, 8].map((rate) => {
    const shares = [0.1, 0.5, 1].map((wanderCpm) => {
      const breath = fieldWave(LENGTH, {
        cpmAt: () => rate,
        uvAt: () => 100,
        harmonics: [
          [0.5, 0.4],
          [0.25, 0.8],
        ],
        wanderCpm,
        wanderS: 20,
        wanderShare: 0.2,
        seed: 5,
      });
      const epochs = keptOf(sumOf(noise, breath.uv), { breathing: ratesOf(breath.cpm) });
      const unknown = keptOf(sumOf(noise, breath.uv));
      return [sharePct(epochs, claims), sharePct(unknown, claims)] as const;
    });
    const list = (k: 0 | 1) => shares.map((pair) => pair[k].toFixed(1)).join(', ');
    return row(
      `breathing at ${rate} a minute called a rhythm`,
      Math.max(...shares.map(([known]) => known)),
      '0',
      `where the rate wanders by 0.1, 0.5, 1 a minute: ${list(0)}; rate not known: ${list(1)}`,
    );
  });
}

/** Rhythm of single epochs made at 4 Hz, thousands of them: what whole studies are too few for. */
export function epochLines(): readonly Measured[] {
  return [...falseRhythms(), ...foundWaves(), ...waveShapes(), ...changes(), ...slowBreathing()];
}
