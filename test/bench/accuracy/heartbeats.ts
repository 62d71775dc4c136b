import { ecgRecord } from '../../../src/simulate/ecg-record';
import {
  type Matching,
  matchBeats,
  overRecords,
  positivePredictivity,
  sensitivity,
} from '../../heart/score';
import type { Bench, Measured, Part } from '../measured';
import { type DrawnRecord, drawRecord } from './heartbeats-records';
import { atLevel, findAsProgram, LEVELS, type Level, levelWords } from './heartbeats-run';

const PART = 'heartbeats';
const SECONDS = 400;
/** Some of the records the detector's weights were set on, and some of those only looked at to check them: two of each rhythm. */
const SETS = [
  { name: 'set on', seeds: [1, 24] },
  { name: 'held out', seeds: [1001, 1024] },
] as const;
const AIMS: ReadonlyMap<Level, string> = new Map([
  [null, '99.75/99.8'],
  [100, '99.75/99.8'],
  [50, '99.6/99.6'],
  [25, '99.0/97'],
]);
const WORST = 5;

interface Scored {
  readonly record: DrawnRecord;
  readonly matching: Matching;
  /** Beats missed, by where they come from, and beats too many, by where they lie. */
  readonly errors: ReadonlyMap<string, number>;
  /** Beats within spans the program proposed itself. */
  readonly inSpans: number;
}

/** What a beat too many was taken from, as far as its place beside the true beats tells. */
function extraWords(timeS: number, trueS: readonly number[]): string {
  const next = trueS.findIndex((one) => one > timeS);
  const before = trueS[(next < 0 ? trueS.length : next) - 1] ?? Number.NEGATIVE_INFINITY;
  const after = next < 0 ? Number.POSITIVE_INFINITY : trueS[next];
  if (timeS - before < 0.45) return 'T wave or noise after a beat taken';
  if (after - timeS < 0.3) return 'P wave or noise before a beat taken';
  return 'lone P wave or noise taken';
}

function scoreRecord(seed: number, level: Level): Scored {
  const record = drawRecord(seed, SECONDS);
  const { signal, rateHz, beats } = ecgRecord(record.spec);
  const ecg = { signal, rateHz, stepUv: 5, railUv: 5120 };
  const lead = atLevel(ecg, record.spec.heightUv, level, seed);
  const found = findAsProgram(lead);
  const trueS = beats.map(({ timeS }) => timeS);
  const matching = matchBeats(trueS, found.timesS);
  const errors = new Map<string, number>();
  const count = (words: string) => errors.set(words, (errors.get(words) ?? 0) + 1);
  for (const i of matching.missed) count(`${beats[i].origin} missed`);
  for (const i of matching.extra) count(extraWords(found.timesS[i], trueS));
  const inSpans = trueS.filter((s) =>
    found.proposed.some(({ fromS, toS }) => s >= fromS && s < toS),
  ).length;
  return { record, matching, errors, inSpans };
}

function line(what: string, scored: readonly Scored[], budget: string): readonly Measured[] {
  const all = scored.map(({ matching }) => matching);
  const turned = all.map(({ truePositive, falsePositive }) => ({
    truePositive,
    falseNegative: falsePositive,
  }));
  const [se, pp] = [overRecords(all), overRecords(turned)];
  const sum = (of: (one: Matching) => number) => all.reduce((total, one) => total + of(one), 0);
  const missed = sum((one) => one.falseNegative);
  const extra = sum((one) => one.falsePositive);
  const row = { part: PART, unit: '%', decimals: 2, budget };
  return [
    {
      ...row,
      what: `${what}: sensitivity, gross`,
      value: se.gross,
      note: `average ${se.average.toFixed(2)}; ${missed} missed`,
    },
    {
      ...row,
      what: `${what}: positive predictivity, gross`,
      value: pp.gross,
      note: `average ${pp.average.toFixed(2)}; ${extra} too many`,
    },
  ];
}

const words = (errors: ReadonlyMap<string, number>) =>
  [...errors].map(([name, count]) => `${name} ${count}`).join(', ');

function worstLines(scored: readonly Scored[]): string[] {
  const wrong = ({ matching }: Scored) => matching.falseNegative + matching.falsePositive;
  return [...scored]
    .sort((a, b) => wrong(b) - wrong(a))
    .slice(0, WORST)
    .map(({ record, matching, errors }) => {
      const { name, rhythm, shape, noise } = record;
      const [se, pp] = [sensitivity(matching), positivePredictivity(matching)];
      return `  ${name} ${rhythm}, ${shape}, ${noise}: ${se.toFixed(1)}/${pp.toFixed(1)}; ${words(errors)}`;
    });
}

/** Sensitivity and positive predictivity by rhythm, shape and noise. */
function familyLines(scored: readonly Scored[]): string[] {
  return (['rhythm', 'shape', 'noise'] as const).flatMap((by) =>
    [...new Set(scored.map(({ record }) => record[by]))].sort().map((family) => {
      const [se, pp] = line(
        '',
        scored.filter(({ record }) => record[by] === family),
        '',
      );
      return `  ${by} ${family}: ${se.value.toFixed(2)}/${pp.value.toFixed(2)}`;
    }),
  );
}

/**
 * Beats found in invented surface ECGs of known beats, as recorded and mixed into an abdominal lead at three heights, scored
 * by ANSI/AAMI EC57 over the whole record, spans the program proposes itself included; how many true beats lie in those is a
 * line of its own.
 */
export const heartbeats: Part = async ({ say }: Bench): Promise<readonly Measured[]> => {
  const lines: Measured[] = [];
  for (const { name, seeds } of SETS)
    for (const level of LEVELS) {
      const what = `${name}, ${levelWords(level)}`;
      const scored: Scored[] = [];
      for (let seed = seeds[0]; seed <= seeds[1]; seed += 1) scored.push(scoreRecord(seed, level));
      say([what, ...familyLines(scored), ...worstLines(scored)].join('\n'));
      lines.push(...line(what, scored, AIMS.get(level) ?? ''));
      const beats = scored.reduce(
        (sum, { matching }) => sum + matching.truePositive + matching.falseNegative,
        0,
      );
      lines.push({
        part: PART,
        what: `${what}: beats in spans proposed`,
        value: (100 * scored.reduce((sum, { inSpans }) => sum + inSpans, 0)) / beats,
        unit: '%',
        decimals: 2,
        budget: '',
        note: 'lost to sensitivity where the program is left alone',
      });
    }
  return lines;
};
