import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { detectBeats } from '../../src/heart/detect';
import { rrSeries } from '../../src/heart/rr-series';
import { timeDomain } from '../../src/heart/variability';
import { createPyramidBuilder } from '../../src/numeric/min-max-pyramid';
import { createRandom } from '../../src/numeric/random';
import type { SignalSource } from '../../src/recording/recording';
import { DEFAULT_SETTINGS, type RouteName } from '../../src/recording/settings';
import { createSeparation } from '../../src/separate/separation';
import { rhythmOf } from '../../src/stomach/rhythm-class';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';
import { createSpoilWatch } from '../../src/trust/spoil-watch';
import { startJob } from '../../workers/job';
import { passOverLeads } from '../../workers/lead-pass';
import { noise } from '../numeric/signals';
import { always, cutAt, cuts, times } from '../properties';
import { ALL_ROUTES } from '../separate/all-routes';

const RATE_HZ = 250;
const MINUTES = 30;

/** Times of beats about 75 a minute, swinging with breath and chance. */
function beatTimesS(minutes: number): number[] {
  const random = createRandom(14);
  const found: number[] = [];
  for (let t = 0.7; t < 60 * minutes - 0.7; ) {
    found.push(t);
    t += 0.8 * (1 + 0.03 * Math.sin(2 * Math.PI * 0.25 * t) + 0.02 * random.gaussian());
  }
  return found;
}

const trueBeatsS = beatTimesS(MINUTES);

/** Slow wave of 100 uV at 3 cpm, breathing of 40 uV at 15 a minute, beats of 300 uV, a little noise. */
function mixture(): Float64Array {
  const x = times(2, noise(MINUTES * 60 * RATE_HZ, 3));
  for (let i = 0; i < x.length; i += 1) {
    const t = i / RATE_HZ;
    x[i] += 100 * Math.sin(2 * Math.PI * 0.05 * t) + 40 * Math.sin(2 * Math.PI * 0.25 * t);
  }
  for (const at of trueBeatsS)
    for (let i = Math.ceil((at - 0.1) * RATE_HZ); i < (at + 0.1) * RATE_HZ; i += 1)
      x[i] += 300 * Math.exp(-0.5 * ((i / RATE_HZ - at) / 0.012) ** 2);
  return x;
}

/** A lead through separation, rhythm, detection and intervals, as the pipeline joins them. */
function chain(signal: Float64Array, slowRoute: RouteName) {
  const settings = { ...DEFAULT_SETTINGS, slowRoute };
  const separation = createSeparation({
    lead: '#1',
    rateHz: RATE_HZ,
    sampleCount: signal.length,
    settings,
    routes: ALL_ROUTES,
    wants: { slow: true, heart: true },
  });
  separation.push(signal);
  const { slow, heart } = separation.finish();
  if (!slow || !heart) throw new Error('both outputs were asked for');
  const { epochs } = slowWaveRhythm({
    slow,
    spoiled: [],
    phases: [{ name: 'whole', fromS: 0, toS: signal.length / RATE_HZ }],
    settings,
    breathing: null,
  }).rhythm;
  const detection = detectBeats({
    heartbeat: heart.heartbeat,
    rateHz: heart.rateHz,
    ticksPerSample: 64 * heart.decimation,
  });
  const rr = rrSeries(detection.beats, RATE_HZ, []);
  return { epochs, detection, rr, time: timeDomain(rr.rrMs, rr.nn) };
}

type Chain = ReturnType<typeof chain>;
/** What of the epochs no gain changes. */
const rhythms = ({ epochs }: Chain) =>
  epochs.map(({ rhythm, dfCpm, flags }) => [rhythm, dfCpm?.toFixed(6), flags.includes('harmonic')]);

describe.each(['band', 'fractional'] as const)(
  'one lead by route %s, from samples to figures',
  (route) => {
    const signal = mixture();
    const plain = chain(signal, route);

    it('has 27 epochs of DF 3.00, all normogastria, and every beat once (CV-14)', () => {
      expect(plain.epochs).toHaveLength(27);
      for (const { rhythm, dfCpm } of plain.epochs) {
        expect(rhythm).toBe('normo');
        expect(Math.abs((dfCpm ?? 0) - 3)).toBeLessThan(0.02);
      }
      const { ticks } = plain.detection.beats;
      expect(ticks).toHaveLength(trueBeatsS.length);
      trueBeatsS.forEach((at, i) => {
        expect(Math.abs(ticks[i] / (64 * RATE_HZ) - at)).toBeLessThan(0.002);
      });
    });

    it('has the same beats, intervals and rhythm upside down, and the other sign (CV-60)', () => {
      const turned = chain(times(-1, signal), route);
      expect(turned.detection.beats).toEqual(plain.detection.beats);
      expect(turned.rr).toEqual(plain.rr);
      expect(turned.detection.sign).toBe(-plain.detection.sign);
      expect(rhythms(turned)).toEqual(rhythms(plain));
      expect(turned.epochs.map(({ dpDb }) => dpDb)).toEqual(plain.epochs.map(({ dpDb }) => dpDb));
    });

    it('on 1000 uV and a line of 10 uV a minute has the same DF, rhythm and beats (CV-61)', () => {
      const moved = chain(
        signal.map((uv, i) => uv + 1000 + i / RATE_HZ / 6),
        route,
      );
      moved.epochs.forEach((epoch, i) => {
        expect(epoch.rhythm).toBe('normo');
        expect(Math.abs((epoch.dfCpm ?? 0) - (plain.epochs[i].dfCpm ?? 0))).toBeLessThan(1e-3);
        expect(Math.abs((epoch.dpDb ?? 0) - (plain.epochs[i].dpDb ?? 0))).toBeLessThan(0.1);
      });
      const [a, b] = [moved.detection.beats.ticks, plain.detection.beats.ticks];
      expect(a).toHaveLength(b.length);
      a.forEach((tick, i) => {
        expect(Math.abs(tick - b[i])).toBeLessThanOrEqual(1);
      });
    });

    it('twice as large has every DP 6.021 dB higher and nothing else changed (CV-62)', () => {
      const doubled = chain(times(2, signal), route);
      expect(rhythms(doubled)).toEqual(rhythms(plain));
      doubled.epochs.forEach(({ dpDb }, i) => {
        expect((dpDb ?? 0) - (plain.epochs[i].dpDb ?? 0)).toBeCloseTo(6.021, 3);
      });
      expect(doubled.rr).toEqual(plain.rr);
      expect(doubled.time).toEqual(plain.time);
      expect(doubled.detection.heightUv / plain.detection.heightUv).toBeCloseTo(2, 6);
    });

    it('has the variability of the beats that were put in', () => {
      const put = Float64Array.from(trueBeatsS.slice(1), (at, i) => 1000 * (at - trueBeatsS[i]));
      const wanted = timeDomain(put, new Uint8Array(put.length).fill(1));
      expect(plain.time.nnCount).toBe(put.length);
      expect(plain.time.meanMs).toBeCloseTo(wanted.meanMs, 1);
      expect(Math.abs(plain.time.sdnnMs / wanted.sdnnMs - 1)).toBeLessThan(0.01);
      expect(Math.abs(plain.time.rmssdMs / wanted.rmssdMs - 1)).toBeLessThan(0.01);
    });
  },
);

describe('a step from 3 to 5 cpm at half an hour, under beats (CV-15)', () => {
  it.each(['band', 'fractional'] as const)(
    'by route %s leaves 29 of 57 epochs in 2-4 cpm',
    (route) => {
      const turns = (t: number) => (t < 1800 ? 3 * t : 3 * 1800 + 5 * (t - 1800)) / 60;
      const signal = Float64Array.from({ length: 3600 * RATE_HZ }, (_, i) => {
        const t = i / RATE_HZ;
        const sinceBeat = ((t + 0.4) % 0.8) - 0.4;
        return (
          100 * Math.cos(2 * Math.PI * turns(t)) + 300 * Math.exp(-0.5 * (sinceBeat / 0.012) ** 2)
        );
      });
      const { epochs } = chain(signal, route);
      expect(epochs).toHaveLength(57);
      const normal = epochs.filter(
        ({ dfCpm }) => rhythmOf(dfCpm ?? 0, DEFAULT_SETTINGS.rhythmBands) === 'normo',
      );
      expect(Math.abs(normal.length - 29)).toBeLessThanOrEqual(1);
    },
  );
});

describe('the pass over the file', () => {
  const [plus, minus] = [noise(40_000, 1), noise(40_000, 2)];
  minus.fill(Number.NaN, 9_000, 9_500);

  /** A source that gives two channels in blocks cut at the shares. */
  const cutSource = (shares: readonly number[]) => {
    const [a, b] = [cutAt(plus, shares), cutAt(minus, shares)];
    async function* blocks() {
      for (let i = 0; i < a.length; i += 1)
        yield { fromS: 0, firstSamples: [0, 0], samples: [a[i], b[i]], done: (i + 1) / a.length };
    }
    return { blocks } as unknown as SignalSource;
  };

  async function read(shares: readonly number[]) {
    const rateHz = 100;
    const pyramid = createPyramidBuilder(rateHz);
    const watch = createSpoilWatch({ lead: '#1~#2', rateHz, railsUv: null, stepUv: 0 });
    const separation = createSeparation({
      lead: '#1~#2',
      rateHz,
      sampleCount: plus.length,
      settings: DEFAULT_SETTINGS,
      routes: ALL_ROUTES,
      wants: { slow: true, heart: true },
    });
    const lead = { kind: 'difference', plus: 0, minus: 1 } as const;
    const { job } = startJob(() => undefined);
    const consumers = [pyramid, watch, separation];
    await passOverLeads(cutSource(shares), [{ lead, consumers }], job, 'reading');
    const { slow, heart } = separation.finish();
    return {
      columns: pyramid.finish().columns(0, 400, 300),
      spans: watch.finish(),
      slowWave: slow?.slowWave,
      recorded: slow?.recorded,
      heartbeat: heart?.heartbeat,
    };
  }

  it('gives pyramid, watch and separation the same bits wherever the file’s blocks end', async () => {
    const whole = await read([]);
    expect(whole.slowWave).toHaveLength(1_600);
    await fc.assert(
      fc.asyncProperty(cuts, async (shares) => {
        expect(await read(shares)).toEqual(whole);
      }),
      always(10),
    );
  });
});
