import { openAsBlob } from 'node:fs';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import type { Proposal, ReviewInputs } from '../../../workers/analysis-api';
import { type Job, startJob } from '../../../workers/job';
import { createPipeline } from '../../../workers/pipeline';
import { inventedStudy, writeStudy } from '../invented-study';
import { type Bench, type Measured, medianTimed, timed, timeLine } from '../measured';

const TICKET = 1;

/** A job that notes the processor's longest step between two places where it could rest, in ms. */
function watchedJob(): { readonly job: Job; readonly longestMs: () => number } {
  const { job } = startJob(() => undefined);
  let longest = 0;
  let since = process.cpuUsage();
  return {
    longestMs: () => longest,
    job: {
      progress: job.progress,
      async breathe() {
        const { user, system } = process.cpuUsage(since);
        longest = Math.max(longest, (user + system) / 1000);
        await job.breathe();
        since = process.cpuUsage();
      },
    },
  };
}

function reviewOf({ roles, phases, spans, beats }: Proposal, edit: number): ReviewInputs {
  const settings = DEFAULT_SETTINGS;
  return {
    edit,
    roles,
    phases,
    settings,
    spans: spans.map((span, i) => ({ ...span, id: i + 1 })),
    beats: {
      ticks: beats.ticks.filter((_, i) => i !== 99 * edit || edit === 0),
      classes: beats.classes.filter((_, i) => i !== 99 * edit || edit === 0),
      origins: beats.origins.filter((_, i) => i !== 99 * edit || edit === 0),
    },
  };
}

/** The time of all ranges of the invented study: the first time, after a beat was taken away, and when nothing changed. */
export async function timeLines({ minutes, folder }: Bench): Promise<readonly Measured[]> {
  const path = await writeStudy(inventedStudy(minutes), folder);
  const pipeline = createPipeline();
  const { job } = startJob(() => undefined);
  const file = await openAsBlob(path);
  await pipeline.open(TICKET, file, 'invented.edf', null, job);
  pipeline.accept(TICKET);
  const given = { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS };
  const proposal = await pipeline.propose(given, job);
  let longest = 0;
  const rangesOf = async (edit: number) => {
    const inputs = reviewOf(proposal, edit);
    await pipeline.analyse(inputs, job);
    await pipeline.openDoubts(inputs, [], job);
    const watched = watchedJob();
    const took = await timed(() => pipeline.evidence(inputs, [], 'ranges', watched.job));
    if (edit > 1) longest = Math.max(longest, watched.longestMs());
    return took;
  };
  const first = await rangesOf(0);
  const edited = [await rangesOf(1), await rangesOf(2), await rangesOf(3)];
  const again = await rangesOf(3);
  return [
    timeLine('ranges', 'all ranges, the first time', first),
    timeLine('ranges', 'all ranges after a beat was taken away', medianTimed(edited)),
    timeLine('ranges', 'all ranges where nothing changed', again),
    {
      part: 'ranges',
      what: 'longest step between two places to rest, after an edit',
      value: longest,
      unit: 'ms',
      decimals: 0,
      budget: 'at most 10',
      note: 'processor time',
    },
  ];
}
