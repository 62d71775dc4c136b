import { writeFile } from 'node:fs/promises';
import { placeEvidence } from '../../../src/heart/evidence';
import { createRandom } from '../../../src/numeric/random';
import { median, medianAbsoluteDeviation } from '../../../src/numeric/statistics';
import { ecgRecord } from '../../../src/simulate/ecg-record';
import type { Bench, Measured, Part } from '../measured';
import { type KnownLead, type KnownPlace, knownPlaces } from './evidence-places';
import { drawRecord } from './heartbeats-records';
import { atLevel, findAsProgram, LEVELS } from './heartbeats-run';
import { line } from './line';

const SECONDS = 300;
const SEEDS = [1, 24] as const;
const SAMPLED = 10_000;
/** Normal standard deviation over the median absolute deviation. */
const SD_PER_MAD = 1.4826;
/** What a usual beat's likeness loses to noise, in bins. */
const NOISY_BINS = [0, 0.02, 0.05, 0.1, 0.2, 0.3, 0.4, 0.6, 1] as const;

function* leads(): Generator<KnownLead> {
  for (let seed = SEEDS[0]; seed <= SEEDS[1]; seed += 1) {
    const { spec } = drawRecord(seed, SECONDS);
    const { signal, rateHz, beats } = ecgRecord(spec);
    const ecg = { signal, rateHz, stepUv: 5, railUv: 5120 };
    const trueS = beats.map(({ timeS }) => timeS);
    for (const level of LEVELS) {
      const { doubted } = findAsProgram(atLevel(ecg, spec.heightUv, level, seed));
      yield knownPlaces(Float32Array.from(doubted.heartbeat), doubted.heartbeatHz, trueS);
    }
  }
}

const spreadOf = (logs: readonly number[]) => SD_PER_MAD * medianAbsoluteDeviation(logs);

/** What has to be added to some log-odds so that as many are beats as they say: by bisection. */
function lacking(places: readonly KnownPlace[], oddsOf: (place: KnownPlace) => number): number {
  const beats = places.filter(({ isBeat }) => isBeat).length;
  const odds = places.map(oddsOf);
  let [low, high] = [-20, 20];
  for (let k = 0; k < 50; k += 1) {
    const more = (low + high) / 2;
    const expected = odds.reduce((sum, one) => sum + 1 / (1 + Math.exp(-one - more)), 0);
    if (expected < beats) low = more;
    else high = more;
  }
  return (low + high) / 2;
}

const shareLine = (what: string, places: readonly KnownPlace[], given: string, value: number) =>
  line(
    what,
    value,
    '',
    1,
    '',
    `${given}; ${places.filter(({ isBeat }) => isBeat).length} beats of ${places.length} places`,
  );

/** By how much noise hides a usual beat: what the evidence gives back for it, and what it would still lack. */
function noisyLines(places: readonly KnownPlace[]): readonly Measured[] {
  return NOISY_BINS.slice(1).flatMap((to, k) => {
    const from = NOISY_BINS[k];
    const own = places.filter(({ candidate: { bestLikeness } }) => {
      const lost = 1 - bestLikeness;
      return lost >= from && lost < to;
    });
    const given = ({ candidate, beatUv, noiseUv }: KnownPlace) =>
      placeEvidence(candidate, beatUv, noiseUv) -
      placeEvidence({ ...candidate, bestLikeness: 1 }, beatUv, noiseUv);
    if (own.length < 100) return [];
    const less = lacking(own, (one) => one.evidence - given(one));
    const words = `given ${median(own.filter(({ isBeat }) => isBeat).map(given)).toFixed(1)} to beats, with it lacking ${lacking(own, ({ evidence }) => evidence).toFixed(1)}`;
    return [
      shareLine(
        `log-odds lacking where noise takes ${from} to ${to} of likeness`,
        own,
        words,
        less,
      ),
    ];
  });
}

/** Places of which no shape is known are weighed by energy alone, at a cost. */
function shapelessLine(places: readonly KnownPlace[]): Measured {
  const odds = ({ candidate, beatUv, noiseUv }: KnownPlace) =>
    placeEvidence({ ...candidate, shape: -1 }, beatUv, noiseUv);
  const value = lacking(places, odds);
  return shareLine(
    'log-odds lacking where no shape is known',
    places,
    'its cost is in them',
    value,
  );
}

const COLUMNS = 'beat,unlike,size,share,like_wave,quick,over_noise,energy,wave_cost';
const within = (x: number, low: number, high: number) => Math.min(high, Math.max(low, x));
const two = (x: number) => String(Math.round(100 * x) / 100);

/** A place as a row of test/reference/heart-evidence-places.csv. */
function rowOf({ isBeat, candidate, size, beatUv, waveCost }: KnownPlace): string {
  const { likeness, share, likeP, overNoise, energyUv, rmsUv } = candidate;
  return [
    isBeat ? '1' : '0',
    two(Math.max(-3.5, 0.5 * Math.log(Math.max(1e-3, 1 - likeness ** 2)))),
    two(within(Math.log(Math.max(1e-4, size)), -4, 3)),
    two(Math.log(share)),
    two(likeP),
    two(within(Math.log(Math.max(1e-4, energyUv / rmsUv)), -3, 2)),
    two(within(Math.log(Math.max(1e-4, overNoise)), -2, 5)),
    two(within(Math.log(Math.max(1e-4, energyUv / beatUv)), -4, 3)),
    two(waveCost),
  ].join();
}

/** Writes places drawn at random, as the regression of test/reference/heart-evidence.py reads them. */
async function writePlaces(places: readonly KnownPlace[], path: string): Promise<void> {
  const random = createRandom(1);
  const rows = Array.from({ length: SAMPLED }, () => rowOf(places[random.below(places.length)]));
  await writeFile(path, `${[COLUMNS, ...rows].join('\n')}\n`);
}

/**
 * Where the constants of src/heart/evidence.ts come from, measured on the invented records that the detector was set on, at all
 * four heights: spreads of energies, and the log-odds that places of some kind lack. EVIDENCE_PLACES=PATH writes the places
 * that the weights are fitted to by test/reference/heart-evidence.py.
 */
export const evidence: Part = async (_: Bench): Promise<readonly Measured[]> => {
  const all = [...leads()];
  const places = all.flatMap((lead) => lead.places).filter(({ candidate }) => candidate.shape >= 0);
  if (process.env.EVIDENCE_PLACES) await writePlaces(places, process.env.EVIDENCE_PLACES);
  const beats = places.filter(({ isBeat }) => isBeat);
  const logEnergy = beats.map(({ candidate, beatUv }) => Math.log(candidate.energyUv / beatUv));
  const crests = all.flatMap(({ noiseCrests }) => noiseCrests).filter((one) => one > 0);
  const logCrests = crests.map(Math.log);
  const note = (count: number, what: string) => `${count} ${what}`;
  return [
    line(
      'spread of log energy of beats',
      spreadOf(logEnergy),
      '',
      2,
      '',
      note(beats.length, 'beats'),
    ),
    line(
      'crests of noise over its level',
      median(crests),
      '',
      2,
      '',
      note(crests.length, 'crests'),
    ),
    line('spread of their logarithm', spreadOf(logCrests), '', 2, '', ''),
    ...noisyLines(places),
    shapelessLine(places),
  ];
};
