import { beatDoubts } from '../../../src/heart/beat-doubts';
import type { Bench, Measured, Part } from '../measured';
import { type DoubtCase, hardCases, recordedCases, simulatedCases } from './cases';
import { type BeatError, errorsOf, isListed, isScored } from './errors';
import { plantErrors } from './planted';
import { workThrough } from './technician';

const PART = 'doubts';
const EACH = 20;
const SEED = 17;
/** A planted study in so many is worked through to its end. */
const WORKED = 5;

interface Listed {
  readonly beats: number;
  readonly doubts: number;
  /** Of these, in what is spoiled and not excluded. */
  readonly inSpoiled: number;
  readonly errors: readonly (BeatError & { readonly listed: boolean })[];
}

function listedOf(one: DoubtCase): Listed {
  const { beats } = one.input;
  const doubts = beatDoubts(one.input);
  return {
    beats: beats.ticks.length,
    doubts: doubts.length,
    inSpoiled: doubts.filter(({ toS }) => !isScored(one, toS)).length,
    errors: withListed(errorsOf(one, beats), doubts),
  };
}

const withListed = (errors: readonly BeatError[], doubts: ReturnType<typeof beatDoubts>) =>
  errors.map((error) => ({ ...error, listed: isListed(doubts, error) }));

const line = (
  what: string,
  value: number,
  unit: string,
  budget: string,
  note: string,
  decimals = 1,
): Measured => ({ part: PART, what, value, unit, decimals, budget, note });

/** Share of errors that stand in the list, with how many of each kind do. */
function shareLine(what: string, errors: Listed['errors'], budget: string): Measured {
  const words = (['missed', 'too many', 'wrong class'] as const).map((kind) => {
    const own = errors.filter((error) => error.kind === kind);
    return `${kind} ${own.filter(({ listed }) => listed).length} of ${own.length}`;
  });
  const listed = errors.filter((error) => error.listed).length;
  return line(what, (100 * listed) / errors.length, '%', budget, words.join(', '));
}

function linesOf(name: string, all: readonly Listed[], aims: readonly [string, string]) {
  const sum = (of: (one: Listed) => number) => all.reduce((total, one) => total + of(one), 0);
  const [beats, doubts] = [sum((one) => one.beats), sum((one) => one.doubts)];
  return [
    shareLine(
      `errors listed: ${name}`,
      all.flatMap(({ errors }) => errors),
      aims[0],
    ),
    line(
      `doubts per 1000 beats: ${name}`,
      (1000 * doubts) / beats,
      '',
      aims[1],
      `${doubts} at ${beats} beats; ${sum((one) => one.inSpoiled)} where the lead is spoiled or near its ends`,
    ),
  ];
}

/** Planted errors: those listed, and the work of mending them where the study is worked through. */
function plantedLines(name: string, cases: readonly DoubtCase[], each: number): Measured[] {
  const errors: Listed['errors'][number][] = [];
  let [strokes, settled, byHand, left, worked] = [0, 0, 0, 0, 0];
  cases.forEach((one, k) => {
    const planted = plantErrors(one, each, SEED + k);
    const doubts = beatDoubts({ ...one.input, beats: planted.beats });
    errors.push(...withListed(planted.errors, doubts));
    if (k % WORKED !== 0) return;
    const work = workThrough(one, planted.beats);
    strokes += work.strokes;
    settled += work.settled;
    byHand += work.byHand;
    worked += 1;
    left += errorsOf(one, work.beats).length;
  });
  return [
    shareLine(`planted errors listed: ${name}`, errors, '95'),
    line(
      `key strokes per doubt: ${name}`,
      strokes / settled,
      '',
      '1.3',
      `${settled} doubts of ${worked} ${worked === 1 ? 'study' : 'studies'}, ${byHand} put right by hand; ${left} errors left`,
      2,
    ),
  ];
}

/**
 * How many of the detector's errors (EC57: missed, too many, of another class) stand in the list of doubts and how long it is:
 * on the simulated studies, on the real record, and on the hard invented records; and the same for errors planted with a fixed
 * seed, which a technician who knows the truth mends by keys. Doubts of beats alone: those of spans and epochs are few.
 */
export const doubts: Part = async ({ say }: Bench): Promise<readonly Measured[]> => {
  const simulated = [...simulatedCases()];
  const lines: Measured[] = [
    ...linesOf('simulated studies, sinus rhythm', simulated.map(listedOf), ['95', '15']),
    ...plantedLines('simulated studies', simulated, EACH),
  ];
  const recorded = [...recordedCases()];
  lines.push(
    ...linesOf('record 208, three mixtures', recorded.map(listedOf), ['95', '']),
    ...plantedLines('record 208', recorded.slice(0, 1), EACH / 2),
  );
  const hard = [...hardCases()].map((one) => ({ one, listed: listedOf(one) }));
  for (const isSinus of [true, false]) {
    const own = hard.filter(({ one }) => one.isSinus === isSinus);
    const name = isSinus ? 'hard records, sinus rhythm and early beats' : 'hard records, others';
    lines.push(
      ...linesOf(
        name,
        own.map(({ listed }) => listed),
        ['', ''],
      ),
    );
    for (const { one, listed } of own)
      say(`  ${one.name}: ${listed.doubts} doubts at ${listed.beats} beats`);
  }
  return lines;
};
