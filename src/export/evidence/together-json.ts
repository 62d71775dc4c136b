import type {
  PhaseModulation,
  Rivals,
  SharedMedian,
  SharedPhase,
  SharedWindow,
  TogetherEvidence,
} from '../../recording/evidence/together';
import { EXPLORATORY } from '../../recording/evidence/together-words';
import { roundedTo } from '../write-number';

const rounded = (value: number | null, decimals: number) =>
  value === null ? null : roundedTo(value, decimals);

const windowJson = (one: SharedWindow) => ({
  phase: one.phase,
  from_s: roundedTo(one.fromS, 6),
  to_s: roundedTo(one.toS, 6),
  rhythm: one.rhythm,
  df_cpm: rounded(one.dfCpm, 2),
  dp_db: rounded(one.dpDb, 1),
  heart_rate_bpm: rounded(one.heartRateBpm, 1),
  hf_ms2: rounded(one.hfMs2, 0),
  breathing_per_min: rounded(one.breathingPerMin, 1),
});

const medianJson = ({ value, windows }: SharedMedian, decimals: number) => ({
  median: rounded(value, decimals),
  windows,
});

const rivalsJson = ({ breathing, waves, leak }: Rivals) => ({
  breathing: {
    verdict: breathing.verdict,
    coherence_at_df: rounded(breathing.coherence, 3),
    coherence_of_noise_95: rounded(breathing.level, 3),
    per_min: rounded(breathing.perMin, 1),
    near_multiple_of_df: breathing.multiple,
  },
  waves_0_1_hz: {
    verdict: waves.verdict,
    power_at_twice_df_over_df: rounded(waves.powerRatio, 2),
    second_depth_pct: roundedTo(waves.secondDepthPct, 3),
  },
  leak: {
    verdict: leak.verdict,
    leak_uv: rounded(leak.leakUv, 2),
    slow_wave_uv: roundedTo(leak.slowUv, 1),
    depth_without_pct: rounded(leak.withoutDepthPct, 3),
    p_without: rounded(leak.withoutP, 4),
    p_of_r_height: rounded(leak.heightP, 4),
  },
});

function modulationJson(one: PhaseModulation) {
  if (one.kind === 'withheld') return { withheld: one.reason };
  return {
    df_cpm: roundedTo(one.dfCpm, 2),
    cycles: roundedTo(one.cycles, 0),
    minutes: roundedTo(one.minutes, 1),
    rr_mean_ms: roundedTo(one.rrMeanMs, 1),
    depth_pct: roundedTo(one.depthPct, 3),
    chance_95_pct: roundedTo(one.chancePct, 3),
    rr_longest_at_deg: roundedTo(one.longestDeg, 0),
    p: roundedTo(one.p, 4),
    p_of_surrogates: roundedTo(one.pOfSurrogates, 4),
    surrogates: one.surrogates,
    least_shift_s: one.leastShiftS,
    steadiness: roundedTo(one.steadiness, 2),
    rr_by_phase_ms: one.binsMs.map((value) => roundedTo(value, 2)),
    rivals: rivalsJson(one.rivals),
  };
}

const phaseJson = (phase: SharedPhase) => ({
  name: phase.name,
  from_s: roundedTo(phase.fromS, 6),
  to_s: roundedTo(phase.toS, 6),
  windows: phase.windows,
  shared: phase.shared,
  df_cpm: medianJson(phase.dfCpm, 2),
  dp_db: medianJson(phase.dpDb, 1),
  heart_rate_bpm: medianJson(phase.heartRateBpm, 1),
  hf_ms2: medianJson(phase.hfMs2, 0),
  breathing_per_min: medianJson(phase.breathingPerMin, 1),
  rr_by_slow_wave_phase: modulationJson(phase.modulation),
});

/** The part `together` of findings.json. */
export const togetherJson = (value: TogetherEvidence): unknown => ({
  note: EXPLORATORY,
  hf_windows: 'as long as an epoch: not the 5 min of the HF among the figures',
  breathing_from: value.breathingFrom,
  phases: value.phases.map(phaseJson),
  windows: value.windows.map(windowJson),
});
