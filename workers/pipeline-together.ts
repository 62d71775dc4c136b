import { intervalsWithin, rhythmFlags } from '../src/heart/rr-series';
import { segmentOf } from '../src/heart/segments';
import { timeDomain } from '../src/heart/variability';
import { median } from '../src/numeric/statistics';
import type {
  SharedMedian,
  SharedPhase,
  SharedWindow,
  TogetherEvidence,
} from '../src/recording/evidence/together';
import { type Phase, phasesOrWhole } from '../src/recording/phase';
import type { Epoch } from '../src/recording/rhythm';
import { isWithin } from '../src/recording/span';
import { hasRhythm } from '../src/stomach/rhythm-class';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';
import { modulationOf } from './pipeline-modulation';

/** Least share of a window that NN intervals must fill for its heart rate. */
const LEAST_NN_FOR_RATE = 0.5;

/** Stomach and heart over the same minutes: a row an epoch, a summary a phase, and what RR owes to the slow wave's phase. */
export async function togetherOf(from: EvidenceInputs, job: Job): Promise<TogetherEvidence> {
  const { inputs, computed, recording } = from;
  const { epochs } = computed.stomach[inputs.roles.reported].rhythm;
  const heartOf = heartReader(from);
  const windows: SharedWindow[] = [];
  for (const epoch of epochs) {
    windows.push({ ...stomachPart(epoch), ...heartOf(epoch), ...breathingPart(from, epoch) });
    job.progress('Both rhythms', (0.3 * windows.length) / epochs.length);
    await job.breathe();
  }
  const phases: SharedPhase[] = [];
  for (const phase of phasesOrWhole(inputs.phases, recording.durationS))
    phases.push({
      ...summaryOf(
        phase,
        windows.filter((one) => one.phase === phase.name),
      ),
      modulation: await modulationOf(from, phase, job),
    });
  return {
    heartRead: computed.heart !== null,
    breathingFrom: computed.breathing?.from ?? 'none',
    windows: windows.sort((a, b) => a.fromS - b.fromS),
    phases,
  };
}

function stomachPart(epoch: Epoch) {
  const { phase, fromS, toS, rhythm } = epoch;
  const known = hasRhythm(epoch);
  return {
    phase,
    fromS,
    toS,
    rhythm,
    dfCpm: known ? epoch.dfCpm : null,
    dpDb: known ? epoch.dpDb : null,
  };
}

/** Heart rate and HF of a window as long as an epoch; HF is held to the same rules as a 5 min segment's. */
function heartReader({ inputs, computed, heartRateHz, blocked }: EvidenceInputs) {
  const { heart } = computed;
  if (!heart) return () => ({ heartRateBpm: null, hfMs2: null });
  const { rr } = heart;
  const settings = inputs.settings.variability;
  const rhythm = rhythmFlags(inputs.beats, heartRateHz, blocked);
  return ({ phase, fromS, toS }: Epoch) => {
    const { shown } = segmentOf({ rr, rhythm, settings }, phase, { fromS, toS, full: true }, true);
    const { first, end } = intervalsWithin(rr, fromS, toS);
    const { heartRateBpm } = timeDomain(rr.rrMs, rr.nn, first, end);
    return {
      heartRateBpm: shown.nnShare >= LEAST_NN_FOR_RATE ? heartRateBpm : null,
      hfMs2: shown.hfMs2,
    };
  };
}

function breathingPart({ computed: { breathing } }: EvidenceInputs, epoch: Epoch) {
  if (!breathing) return { breathingPerMin: null };
  const rates = breathing.perMinute.filter(
    (rate, i) => !Number.isNaN(rate) && isWithin(breathing.centresS[i], [epoch]),
  );
  return { breathingPerMin: rates.length > 0 ? median(rates) : null };
}

function summaryOf(
  phase: Phase,
  windows: readonly SharedWindow[],
): Omit<SharedPhase, 'modulation'> {
  const shared = windows.filter((one) => one.dfCpm !== null && one.heartRateBpm !== null);
  const of = (value: (one: SharedWindow) => number | null): SharedMedian => {
    const values = shared.flatMap((one) => value(one) ?? []);
    return { value: values.length > 0 ? median(values) : null, windows: values.length };
  };
  return {
    name: phase.name,
    fromS: phase.fromS,
    toS: phase.toS,
    windows: windows.length,
    shared: shared.length,
    dfCpm: of(({ dfCpm }) => dfCpm),
    dpDb: of(({ dpDb }) => dpDb),
    heartRateBpm: of(({ heartRateBpm }) => heartRateBpm),
    hfMs2: of(({ hfMs2 }) => hfMs2),
    breathingPerMin: of(({ breathingPerMin }) => breathingPerMin),
  };
}
