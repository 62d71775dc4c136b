import { type Figures, type FigureValue, numberFigure, withheld } from '../recording/figure';
import {
  counted,
  irregularMarks,
  judgedSegments,
  minutes,
  noSegmentReason,
  nothingRegular,
  type PartOfHeart,
} from './part';
import { HF_NEEDS_S, LF_NEEDS_S, type SegmentResult, VLF_NEEDS_S } from './segments';
import { bandFloorMs2 } from './timing-floor';
import { beatNyquistOf } from './variability-spectrum';

/** The stomach's usual 3 cpm. */
const STOMACH_HZ = 0.05;

/** An average over the segments that carry a figure, or why there is none. */
type Average =
  | { readonly ok: true; readonly value: number; readonly basis: string }
  | { readonly ok: false; readonly why: FigureValue };

function average(
  heart: PartOfHeart,
  carried: (segment: SegmentResult) => number | null,
  none: () => FigureValue,
): Average {
  const judged = judgedSegments(heart);
  const values = judged.map(carried).filter((value) => value !== null);
  if (values.length === 0) return { ok: false, why: nothingRegular(heart) ?? none() };
  const short = judged.find((segment) => !segment.full)?.shown;
  const length = short ? ` of ${minutes(short.toS - short.fromS)} min` : '';
  return {
    ok: true,
    value: values.reduce((sum, value) => sum + value, 0) / values.length,
    basis: `${values.length} of ${counted(judged.length)}${length}`,
  };
}

const figure = (one: Average, marks: readonly string[]): FigureValue =>
  one.ok ? numberFigure(one.value, one.basis, marks) : one.why;

/** Average of a band's power; too little time left is said before anything about the segments. */
function bandAverage(
  heart: PartOfHeart,
  name: string,
  needsS: number,
  carried: (segment: SegmentResult) => number | null,
): Average {
  const { segmentS } = heart.settings;
  if (heart.keptS < needsS - 1e-6) {
    const why = `${name} needs ${needsS / 60} min; ${minutes(heart.keptS)} min are left`;
    return { ok: false, why: withheld(why) };
  }
  if (segmentS < needsS - 1e-6) {
    const why = `${name} needs segments of ${needsS / 60} min; they are set to ${minutes(segmentS)} min`;
    return { ok: false, why: withheld(why) };
  }
  return average(heart, carried, () => noSegmentReason(heart));
}

const perMinute = (hz: number): string => String(Math.round(600 * hz) / 10);

/** What must be read beside each kind of spectral figure in this part. */
function marksOf(heart: PartOfHeart) {
  const { lfHz, hfHz } = heart.settings;
  const common = irregularMarks(heart);
  const breaths = heart.breathsPerMinute;
  const slow = breaths < 60 * hfHz[0] ? [`breathing below ${perMinute(hfHz[0])} a minute`] : [];
  const fast = breaths > 60 * hfHz[1] ? [`breathing above ${perMinute(hfHz[1])} a minute`] : [];
  const stomach =
    lfHz[0] <= STOMACH_HZ && STOMACH_HZ < lfHz[1] ? ['0.05 Hz of the stomach lies inside LF'] : [];
  const nyquistHz = beatNyquistOf(heart.regularTime.meanMs);
  const cut =
    nyquistHz < hfHz[1] ? [`counted up to ${nyquistHz.toFixed(2)} Hz, half the heart rate`] : [];
  return {
    lf: [...stomach, ...common],
    hf: [...fast, ...cut, ...common],
    both: [...slow, ...fast, ...stomach, ...common],
  };
}

/** Ratio and normalised units from the averaged powers. */
function balance(heart: PartOfHeart, lf: Average, hf: Average, marks: readonly string[]): Figures {
  const keys = ['lf_hf_ratio', 'lf_nu_pct', 'hf_nu_pct'] as const;
  const all = (why: FigureValue) => Object.fromEntries(keys.map((key) => [key, why]));
  if (!lf.ok) return all(lf.why);
  if (!hf.ok) return all(hf.why);
  if (!(hf.value > 0)) return all(withheld('there is no HF power to compare with'));
  const sum = lf.value + hf.value;
  const percent = (value: number) =>
    heart.adequacy === 'not-reportable'
      ? withheld('over half of the part is lost: no percentage')
      : numberFigure((100 * value) / sum, lf.basis, marks);
  return {
    lf_hf_ratio: numberFigure(lf.value / hf.value, lf.basis, marks),
    lf_nu_pct: percent(lf.value),
    hf_nu_pct: percent(hf.value),
  };
}

function sdnnFigure(heart: PartOfHeart): FigureValue {
  const { segmentS } = heart.settings;
  const none = () =>
    heart.segments.some((segment) => segment.full)
      ? noSegmentReason(heart)
      : withheld(
          `SDNN needs a segment of ${minutes(segmentS)} min; the part has ${minutes(heart.part.toS - heart.part.fromS)} min`,
        );
  const sdnn = average(heart, ({ full, shown }) => (full ? shown.sdnnMs : null), none);
  return figure(sdnn, irregularMarks(heart));
}

function hfFloor({ timingSdMs, regularTime, settings }: PartOfHeart): FigureValue {
  if (!Number.isFinite(timingSdMs)) return withheld('the error of the R times is not known');
  if (!(regularTime.nnCount > 0)) return withheld('no regular NN interval in this part');
  return numberFigure(
    bandFloorMs2(timingSdMs, regularTime.meanMs, settings.hfHz),
    `R times to ${timingSdMs.toFixed(2)} ms`,
  );
}

/** The figures of a part that stand on its segments, each a number or withheld with its reason. */
export function spectralFigures(heart: PartOfHeart): Figures {
  const marks = marksOf(heart);
  const lf = bandAverage(heart, 'LF', LF_NEEDS_S, ({ shown }) => shown.lfMs2);
  const hf = bandAverage(heart, 'HF', HF_NEEDS_S, ({ shown }) => shown.hfMs2);
  const vlf = bandAverage(heart, 'VLF', VLF_NEEDS_S, (segment) => segment.vlfMs2);
  const lfWelch = bandAverage(heart, 'LF', LF_NEEDS_S, (segment) => segment.lfWelchMs2);
  const hfWelch = bandAverage(heart, 'HF', HF_NEEDS_S, (segment) => segment.hfWelchMs2);
  return {
    sdnn_ms: sdnnFigure(heart),
    lf_ms2: figure(lf, marks.lf),
    hf_ms2: figure(hf, marks.hf),
    ...balance(heart, lf, hf, marks.both),
    vlf_ms2: figure(vlf, irregularMarks(heart)),
    lf_welch_ms2: figure(lfWelch, marks.lf),
    hf_welch_ms2: figure(hfWelch, marks.hf),
    hf_floor_ms2: hfFloor(heart),
  };
}
