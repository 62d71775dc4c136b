import type { Columns, HeartResults } from '../../workers/analysis-api';
import type { BreathingSeries } from '../recording/heart-series';
import { leadKey } from '../recording/lead';
import { isFasting, isFed, type Phase, phasesOrWhole } from '../recording/phase';
import type { SlowWaveRhythm } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import { type Interval, joinIntervals, spansOf } from '../recording/span';
import type { SessionState } from '../session/document';
import { spectrogramWords, trendWords, wavesWords } from './picture-words';
import { spectrogramPicture } from './pictures/spectrogram-picture';
import { trendPicture } from './pictures/trend-picture';
import { breathingRow, heartRateRow, powerRow } from './pictures/trend-rows';
import { wavesPicture } from './pictures/waves-picture';

/** A stretch of slow wave to show: the middle of a phase. */
export interface Excerpt {
  readonly name: string;
  readonly fromS: number;
  readonly toS: number;
}

const EXCERPT_S = 240;

/** Four minutes from the middle of fasting and of each fed phase; of the whole study where no phase is marked. */
export function excerptsOf(phases: readonly Phase[], durationS: number): readonly Excerpt[] {
  const some = phases.filter((phase) => isFasting(phase) || isFed(phase));
  return phasesOrWhole(some, durationS).map(({ name, fromS, toS }) => {
    const length = Math.min(EXCERPT_S, toS - fromS);
    const start = Math.round((fromS + toS - length) / 2);
    return { name, fromS: start, toS: start + length };
  });
}

export interface PictureInput {
  readonly state: SessionState;
  readonly settings: Settings;
  readonly rhythm: SlowWaveRhythm;
  readonly heart: HeartResults | null;
  readonly breathing: BreathingSeries | null;
  readonly durationS: number;
  readonly waves: readonly { readonly excerpt: Excerpt; readonly columns: Columns }[];
}

/** A picture of the printed page as SVG text, and in words for those who do not see it. */
export interface ReportPicture {
  readonly svg: string;
  readonly words: string;
}

export interface ReportPictures {
  readonly spectrogram: ReportPicture;
  readonly trend: ReportPicture;
  /** Null where the file is not at hand to draw from. */
  readonly waves: ReportPicture | null;
}

/** The pictures of the printed page: pure functions of the results, so that no canvas is needed. */
export function reportPictures(input: PictureInput): ReportPictures {
  const spoiled = spoiledOf(input.state);
  const excerpts = input.waves.map(({ excerpt, columns }) => ({ ...excerpt, signal: columns }));
  return {
    spectrogram: spectrogramOf(input, spoiled.stomach),
    trend: trendOf(input, spoiled),
    waves:
      excerpts.length > 0
        ? { svg: wavesPicture(excerpts, spoiled.stomach), words: wavesWords(excerpts) }
        : null,
  };
}

function spoiledOf({ roles, spans }: SessionState) {
  const of = (key: string, organ: 'stomach' | 'heart'): readonly Interval[] =>
    joinIntervals(spansOf(spans, key, organ));
  return {
    stomach: of(leadKey(roles.slow[roles.reported]), 'stomach'),
    heart: roles.heart ? of(leadKey(roles.heart), 'heart') : [],
  };
}

function spectrogramOf(
  { state, settings, rhythm, durationS, waves }: PictureInput,
  spoiled: readonly Interval[],
): ReportPicture {
  const phases = phasesOrWhole(state.phases, durationS);
  const { rhythmBands, epoch } = settings;
  const svg = spectrogramPicture({
    rhythm,
    phases,
    spoiled,
    bands: rhythmBands,
    durationS,
    stepS: epoch.stepS,
    marked: waves.map(({ excerpt }) => excerpt),
  });
  return { svg, words: spectrogramWords(rhythm.epochs, phases, rhythmBands, spoiled) };
}

function trendOf(
  { state, rhythm, heart, breathing, durationS }: PictureInput,
  spoiled: ReturnType<typeof spoiledOf>,
): ReportPicture {
  const rows = [
    powerRow(rhythm.epochs),
    heartRateRow(heart?.rr ?? null, durationS),
    breathingRow(breathing),
  ];
  const phases = phasesOrWhole(state.phases, durationS);
  return { svg: trendPicture({ rows, phases, spoiled, durationS }), words: trendWords(rows) };
}
