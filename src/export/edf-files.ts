import type { SeparatedSignals } from '../../workers/analysis-api';
import { NO_BEATS } from '../recording/beat';
import { leadChannels, leadKey } from '../recording/lead';
import type { Settings } from '../recording/settings';
import { notesOf } from '../session/note-edits';
import { annotationsEdf } from './annotations-edf';
import type { ExportInput } from './export-input';
import type { ResultFile } from './result-file';
import { type SeparatedSignal, separatedEdf } from './separated-edf';

/** What made the slow wave, in the 80 characters of a header's field. */
const slowPrefilter = ({ slowRoute, slowBandCpm, slowGain, breathingOut }: Settings): string =>
  slowRoute !== 'fractional'
    ? `slow wave, ${slowRoute} ${slowBandCpm.join('-')} cpm, gain ${slowGain}, breathing out ${breathingOut}`
    : `slow wave, ${slowRoute}`;

/** separated.edf and annotations.edf of a review. */
export function edfFiles(
  { recording, state, program }: ExportInput,
  { slow, heart }: SeparatedSignals,
): readonly ResultFile[] {
  const { roles, settings } = state;
  const common = {
    code: state.study.code,
    start: recording.start.kind === 'known' ? recording.start.local : null,
    durationS: recording.durationS,
    program,
    beats: heart ? state.beats : NO_BEATS,
    beatRateHz: roles.heart ? recording.channels[leadChannels(roles.heart)[0]].rateHz : 1,
    phases: state.phases,
    spans: state.spans,
    notes: notesOf(state),
  };
  const signals = slow.map(
    ({ lead, rateHz, samples }): SeparatedSignal => ({
      label: `slow ${lead}`,
      rateHz,
      samples,
      prefilter: slowPrefilter(settings),
    }),
  );
  const heartbeat: SeparatedSignal | null =
    roles.heart && heart
      ? {
          label: `heart ${leadKey(roles.heart)}`,
          rateHz: heart.rateHz,
          samples: heart.samples,
          prefilter: `heartbeat, route ${settings.heartRoute}`,
        }
      : null;
  return [
    {
      name: 'separated.edf',
      content: separatedEdf({ ...common, slow: signals, heart: heartbeat }),
    },
    { name: 'annotations.edf', content: annotationsEdf(common) },
  ];
}
