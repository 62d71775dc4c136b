import { positivePredictivity, sensitivity } from '../../heart/score';
import { type Measured, median } from '../measured';
import { FAMILIES, type Family } from './families';
import type { HeartScore, SegmentErrors } from './heart-score';
import { line, meanSize, sum, worst } from './line';

interface OfFamily {
  readonly family: Family;
  readonly heart: HeartScore;
}

const HOURS_A_STUDY = 2 / 3;
type Pick = (one: SegmentErrors) => number;
const FIGURES: readonly (readonly [name: string, pick: Pick, cleanBudget: string])[] = [
  ['SDNN', (one) => one.sdnnPct, '1'],
  ['RMSSD', (one) => one.rmssdPct, '1'],
  ['LF', (one) => one.lfPct, '2'],
  ['HF', (one) => one.hfPct, '2'],
];

/** Within the timing floor an RMSSD of a clean segment is as good as it can be. */
const beyondFloor: Pick = ({ rmssdPct, rmssdMs, floorMs }) =>
  Math.abs(rmssdMs) <= floorMs ? 0 : rmssdPct;

/** Mean size, and what nineteen of twenty stay within. */
function spreadOf(values: readonly number[]): string {
  const sizes = values.map(Math.abs).sort((a, b) => a - b);
  const most = sizes[Math.ceil(0.95 * sizes.length) - 1] ?? Number.NaN;
  return `mean ${meanSize(values).toFixed(2)} %, 95 % within ${most.toFixed(2)} %; ${values.length} segments`;
}

function beatLines(scores: readonly HeartScore[]): readonly Measured[] {
  const count = (key: 'truePositive' | 'falseNegative' | 'falsePositive') =>
    sum(scores.map(({ beats }) => beats[key]));
  const pool = {
    truePositive: count('truePositive'),
    falseNegative: count('falseNegative'),
    falsePositive: count('falsePositive'),
  };
  const [se, pp] = [sensitivity(pool), positivePredictivity(pool)];
  const all = pool.truePositive + pool.falseNegative;
  const missed = `${pool.falseNegative} missed of ${all}`;
  const classLines = (['N', 'S', 'V'] as const).map((name) => {
    const of = sum(scores.map(({ classes }) => classes[name].of));
    const right = sum(scores.map(({ classes }) => classes[name].right));
    const note = `${right} of ${of}`;
    return line(`class ${name} given to those of it`, (100 * right) / of, '%', 2, '', note);
  });
  const timing = scores.map((one) => one.timingSdMs);
  const slowest = `worst ${Math.max(...timing).toFixed(2)} ms`;
  return [
    line('heartbeat sensitivity, gross', se, '%', 3, '100', missed),
    line(
      'heartbeat positive predictivity, gross',
      pp,
      '%',
      3,
      '100',
      `${pool.falsePositive} false`,
    ),
    ...classLines,
    line('timing of N beats, median study', median(timing), 'ms', 2, '', slowest),
  ];
}

function familyLine(name: string, scores: readonly HeartScore[]): Measured {
  const segments = scores.flatMap((one) => one.segments);
  const worsts = FIGURES.map(([, pick]) => worst(segments.map(pick)));
  const each = FIGURES.map(([figure], k) => `${figure} ${worsts[k].toFixed(1)}`).join(', ');
  const note = `${each}; ${segments.length} of ${sum(scores.map((one) => one.all))} segments used`;
  return line(`figures of all segments, worst: ${name}`, worst(worsts), '%', 2, '10', note);
}

/** The lines about beats and variability figures. */
export function heartLines(scored: readonly OfFamily[]): readonly Measured[] {
  const scores = scored.map(({ heart }) => heart);
  const segments = scores.flatMap((one) => one.segments);
  const clean = segments.filter((one) => one.clean);
  const worstLine = (what: string, values: readonly number[], budget: string) =>
    line(what, worst(values), '%', 2, budget, spreadOf(values));
  const total = (key: 'irregular' | 'withheld' | 'seen' | 'wrongMarks') =>
    sum(scores.map((one) => one[key]));
  return [
    ...beatLines(scores),
    ...FIGURES.map(([name, pick, budget]) =>
      name === 'RMSSD'
        ? worstLine(
            'RMSSD of clean segments beyond the floor, worst',
            clean.map(beyondFloor),
            budget,
          )
        : worstLine(`${name} of clean segments, worst`, clean.map(pick), budget),
    ),
    ...FIGURES.map(([name, pick]) =>
      worstLine(`${name} of all segments, worst`, segments.map(pick), '10'),
    ),
    ...FAMILIES.map((family) =>
      familyLine(
        family,
        scored.filter((one) => one.family === family).map(({ heart }) => heart),
      ),
    ),
    line('segments without spoil withheld', total('withheld'), '', 0, '0'),
    line('normal segments called irregular', total('irregular'), '', 0, '0'),
    line('seen in passing where nothing was', total('seen'), '', 0, '0'),
    line('phases wrongly marked for slow breathing', total('wrongMarks'), '', 0, '0'),
  ];
}

/** The lines about spoiled spans. */
export function spanLines(scored: readonly OfFamily[]): readonly Measured[] {
  return (['heart', 'stomach'] as const).flatMap((organ) => {
    const scores = scored.map(({ heart }) => heart.spans[organ]);
    const [of, found] = [sum(scores.map((one) => one.ofS)), sum(scores.map((one) => one.foundS))];
    const wrong = scores.map((one) => one.wrongS / HOURS_A_STUDY);
    const most = `worst study ${Math.max(...wrong).toFixed(1)} s/h`;
    const seconds = `of ${of.toFixed(0)} s`;
    return [
      line(`spoiled seconds found: ${organ}`, (100 * found) / of, '%', 1, '', seconds),
      line(`clean seconds proposed: ${organ}`, sum(wrong) / wrong.length, 's/h', 2, '', most),
    ];
  });
}
