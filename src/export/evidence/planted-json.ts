import type {
  NotPlanted,
  OverStretches,
  PlantedBeats,
  PlantedEvidence,
  PlantedHeart,
  PlantedSlow,
  PlantedWave,
} from '../../recording/evidence/planted';
import { roundedTo } from '../write-number';

const spread = (value: OverStretches | null, decimals: number) =>
  value && {
    median: roundedTo(value.median, decimals),
    least: roundedTo(value.least, decimals),
    most: roundedTo(value.most, decimals),
  };

const notMade = ({ reason }: NotPlanted) => ({ withheld: reason });

const waveJson = (wave: PlantedWave) => ({
  planted: wave.rate.kind === 'drift' ? 'drift' : 'steady',
  cpm: wave.rate.kind === 'drift' ? null : wave.rate.cpm,
  uv: roundedTo(wave.uv, 1),
  epochs: wave.epochs,
  right_epochs: wave.right,
  right_pct: spread(wave.rightPct, 0),
  df_error_cpm: spread(wave.dfErrorCpm, 3),
  dp_error_db: spread(wave.dpErrorDb, 1),
  snr_db: spread(wave.snrDb, 1),
  scale: spread(wave.scale, 2),
  delay_s: spread(wave.delayS, 2),
});

const slowJson = (slow: PlantedSlow) => ({
  lead: slow.lead,
  own_uv: roundedTo(slow.ownUv, 1),
  own_from: slow.ownFrom === 'rhythm' ? 'epochs with a rhythm' : 'highest peaks',
  stretches: slow.stretches,
  stretch_s: roundedTo(slow.stretchS, 0),
  epochs: slow.epochs,
  rest_db: slow.restDb === null ? null : roundedTo(slow.restDb, 1),
  waves: slow.waves.map(waveJson),
  smallest: slow.smallest.map(({ cpm, uv, upToUv, mostPct }) => ({
    cpm,
    uv,
    tried_to_uv: upToUv,
    most_pct: mostPct,
  })),
});

const beatsJson = (beats: PlantedBeats) => ({
  share_of_own_height: beats.share,
  scored: beats.planted,
  sensitivity_pct: spread(beats.sensitivityPct, 2),
  predictivity_pct: spread(beats.predictivityPct, 2),
  timing_sd_ms: spread(beats.timingMs, 2),
  rmssd_error_ms: spread(beats.rmssdErrorMs, 2),
});

const heartJson = (heart: PlantedHeart) => ({
  lead: heart.lead,
  stretches: heart.stretches,
  stretch_s: roundedTo(heart.stretchS, 0),
  own_uv: roundedTo(heart.ownUv, 1),
  averaged_beats: heart.averaged,
  planted_rmssd_ms: roundedTo(heart.rmssdMs, 1),
  planted_mean_rr_ms: roundedTo(heart.meanRrMs, 1),
  beats: heart.beats.map(beatsJson),
});

/** The part `planted` of findings.json: the scores, without the pictures. */
export const plantedJson = ({ slow, heart }: PlantedEvidence): unknown => ({
  slow_wave: slow.kind === 'planted' ? slowJson(slow) : notMade(slow),
  heartbeat: heart.kind === 'planted' ? heartJson(heart) : notMade(heart),
});
