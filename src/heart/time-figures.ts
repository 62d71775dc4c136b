import { type Figures, type FigureValue, numberFigure, withheld } from '../recording/figure';
import {
  irregularMarks,
  irregularSeconds,
  minutes,
  nothingRegular,
  type PartOfHeart,
  sparseMarks,
} from './part';
import { rmssdFloorMs } from './timing-floor';
import { triangularIndex } from './variability';

const TRIANGULAR_NEEDS_S = 1200;

/** A number, or the reason where there is too little for it. */
function given(value: number, basis: string, marks: readonly string[], lack: string): FigureValue {
  return Number.isFinite(value) ? numberFigure(value, basis, marks) : withheld(lack);
}

function rateFigures({ allTime, first, end }: PartOfHeart): Figures {
  const basis = `${allTime.nnCount} NN`;
  const lack = end === first ? 'no two beats in this part' : 'no NN interval in this part';
  return {
    heart_rate_bpm: given(allTime.heartRateBpm, basis, [], lack),
    nn_mean_ms: given(allTime.meanMs, basis, [], lack),
  };
}

function percentOfPairs(heart: PartOfHeart, basis: string, lack: string): FigureValue {
  if (heart.adequacy === 'not-reportable')
    return withheld('over half of the part is lost: no percentage');
  return given(heart.regularTime.pnn50Pct, basis, irregularMarks(heart), lack);
}

function triangular(heart: PartOfHeart): FigureValue {
  const leftS = heart.keptS - irregularSeconds(heart);
  if (leftS < TRIANGULAR_NEEDS_S - 1e-6)
    return withheld(`the triangular index needs 20 min; ${minutes(leftS)} min are left`);
  const value = triangularIndex(heart.rr.rrMs, heart.regular, heart.first, heart.end);
  const { nnCount, nnSeconds } = heart.regularTime;
  return numberFigure(value, `${nnCount} NN, ${minutes(nnSeconds)} min`, irregularMarks(heart));
}

function spreadFigures(heart: PartOfHeart): Figures {
  const { regularTime: time } = heart;
  const marks = [...irregularMarks(heart), ...sparseMarks(heart)];
  const pairs = `${time.pairCount} pairs`;
  const whole = `${time.nnCount} NN, ${minutes(time.nnSeconds)} min`;
  const count = (needed: number, there: number, what: string) =>
    `needs ${needed} ${what}; ${there} ${there === 1 ? 'is' : 'are'} left`;
  const twoNn = count(2, time.nnCount, 'NN');
  const onePair = 'needs two neighbouring NN; none are left';
  const twoPairs = count(2, time.pairCount, 'pairs of neighbouring NN');
  const sd2Lack = time.pairCount < 2 ? twoPairs : 'the pairs left do not stand for all NN';
  return {
    rmssd_ms: given(time.rmssdMs, pairs, marks, onePair),
    sdnn_whole_ms: given(time.sdnnMs, whole, marks, twoNn),
    sdsd_ms: given(time.sdsdMs, pairs, marks, twoPairs),
    pnn50_pct: percentOfPairs(heart, pairs, onePair),
    sd1_ms: given(time.sd1Ms, pairs, marks, twoPairs),
    sd2_ms: given(time.sd2Ms, whole, marks, sd2Lack),
    triangular_index: triangular(heart),
  };
}

const SPREAD_KEYS = [
  'rmssd_ms',
  'sdnn_whole_ms',
  'sdsd_ms',
  'pnn50_pct',
  'sd1_ms',
  'sd2_ms',
  'triangular_index',
] as const;

/** The RMSSD that the timing error alone gives, with the error it stands on. */
function floorFigure({ timingSdMs }: PartOfHeart): FigureValue {
  return given(
    rmssdFloorMs(timingSdMs),
    `R times to ${timingSdMs.toFixed(2)} ms`,
    [],
    'the error of the R times is not known',
  );
}

/** The figures of a part in the time domain, each a number or withheld with its reason. */
export function timeFigures(heart: PartOfHeart): Figures {
  const nothing = nothingRegular(heart);
  const spread = nothing
    ? Object.fromEntries(SPREAD_KEYS.map((key) => [key, nothing]))
    : spreadFigures(heart);
  return { ...rateFigures(heart), ...spread, rmssd_floor_ms: floorFigure(heart) };
}
