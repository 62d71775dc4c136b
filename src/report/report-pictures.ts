import type { Columns, HeartResults } from '../../workers/analysis-api';
import { leadKey } from '../recording/lead';
import { isFasting, isFed, type Phase, phasesOrWhole } from '../recording/phase';
import type { SlowWaveRhythm } from '../recording/rhythm';
import type { Settings } from '../recording/settings';
import { type Interval, joinIntervals, spansOf } from '../recording/span';
import type { SessionState } from '../session/document';
import { spectrogramPicture } from './pictures/spectrogram-picture';
import { trendPicture } from './pictures/trend-picture';
import { reachOf, wavePicture } from './pictures/wave-picture';

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
  readonly durationS: number;
  readonly waves: readonly { readonly excerpt: Excerpt; readonly columns: Columns }[];
}

export interface ReportPictures {
  readonly spectrogram: string;
  readonly trend: string;
  readonly waves: readonly { readonly name: string; readonly svg: string }[];
}

/** The pictures of the printed page as SVG text: pure functions of the results, so that no canvas is needed. */
export function reportPictures(input: PictureInput): ReportPictures {
  const { state, settings, rhythm, heart, durationS, waves } = input;
  const key = leadKey(state.roles.slow[state.roles.reported]);
  const spoiled: readonly Interval[] = joinIntervals(spansOf(state.spans, key, 'stomach'));
  const phases = phasesOrWhole(state.phases, durationS);
  const reachUv = reachOf(waves.map(({ columns }) => columns));
  return {
    spectrogram: spectrogramPicture({
      rhythm,
      phases,
      spoiled,
      bands: settings.rhythmBands,
      durationS,
      stepS: settings.epoch.stepS,
    }),
    trend: trendPicture({
      epochs: rhythm.epochs,
      rr: heart?.rr ?? null,
      breathing: heart?.breathing ?? null,
      phases,
      spoiled,
      durationS,
    }),
    waves: waves.map(({ excerpt, columns }) => ({
      name: excerpt.name,
      svg: wavePicture(columns, excerpt.name, excerpt.fromS, excerpt.toS, reachUv),
    })),
  };
}
