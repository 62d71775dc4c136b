import type { EpochOpinions, OpinionsEvidence } from '../src/recording/evidence/opinions';
import { leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import type { Epoch } from '../src/recording/rhythm';
import { crestRateCpm } from '../src/stomach/epoch-flags';
import { keptSamples } from '../src/stomach/kept-samples';
import { hasRhythm } from '../src/stomach/rhythm-class';
import { secondOpinions } from '../src/stomach/second-opinions';
import type { StomachAnalysis } from '../src/stomach/slow-wave-rhythm';
import { windowSpectra } from '../src/stomach/window-spectrum';
import { partOpinions } from '../src/trust/opinions-agree';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';

const STEP = 'Asking other methods';

/** What was found for a rhythm stays with it: an edit that leaves it as it is asks nothing again. */
const known = new WeakMap<StomachAnalysis, readonly EpochOpinions[]>();

/** What other methods make of the epochs of the reported lead, and of the powers of the heart rate, by phase. */
export async function opinionsOf(from: EvidenceInputs, job: Job): Promise<OpinionsEvidence> {
  const { inputs, computed } = from;
  const lead = inputs.roles.slow[inputs.roles.reported];
  const epochs = await epochOpinions(from, job);
  const parts = computed.findings.phases.map((part) =>
    partOpinions(
      part,
      epochs.filter(({ epoch }) => isInside(epoch, part)).map(({ opinions }) => opinions),
    ),
  );
  return { lead: leadKey(lead), epochs: epochs.map(({ opinions }) => opinions), parts };
}

const EDGE_S = 1e-6;
const isInside = (epoch: Epoch, { fromS, toS }: { fromS: number; toS: number }): boolean =>
  epoch.fromS >= fromS - EDGE_S && epoch.toS <= toS + EDGE_S;

/** The kept epochs of the reported lead, each with its opinions. */
async function epochOpinions(from: EvidenceInputs, job: Job) {
  const { reported } = from.inputs.roles;
  const analysis = from.computed.stomach[reported];
  const kept = analysis.rhythm.epochs.filter((epoch) => epoch.kept);
  const before = known.get(analysis);
  const found: EpochOpinions[] = before ? [...before] : [];
  const opinionOf = before ? null : opinionOn(from, analysis);
  if (opinionOf)
    for (const epoch of kept) {
      job.progress(STEP, found.length / kept.length);
      await job.breathe();
      found.push(opinionOf(epoch));
    }
  known.set(analysis, found);
  return kept.map((epoch, i) => ({ epoch, opinions: found[i] }));
}

/** Asks the other methods about epochs of the reported lead, on the samples that its spectra are of. */
function opinionOn(
  { inputs, slow: leads, recording }: EvidenceInputs,
  { rhythm }: StomachAnalysis,
): (epoch: Epoch) => EpochOpinions {
  const { roles, spans, settings } = inputs;
  const { forSpectra: signal, rateHz, powerResponse } = leads[roles.reported];
  const spoiled = lostOn(roles.slow[roles.reported], 'stomach', spans, recording.gaps);
  const kept = keptSamples(signal, rateHz, spoiled);
  const { lengthS } = settings.epoch;
  const windows = windowSpectra({ signal, kept, rateHz, lengthS, powerResponse });
  const ask = secondOpinions({ rateHz, lengthS, band: settings.rhythmBands, powerResponse });
  const last = signal.length - windows.taper.length;
  return (epoch) => {
    const first = Math.max(0, Math.ceil(epoch.fromS * rateHz - 1e-6));
    return {
      phase: epoch.phase,
      centreS: (epoch.fromS + epoch.toS) / 2,
      hannCpm: hasRhythm(epoch) ? epoch.dfCpm : null,
      ...ask(windows.prepare(Math.min(first, last))),
      crestCpm: crestRateCpm(rhythm.crestsS, epoch.fromS, epoch.toS),
    };
  };
}
