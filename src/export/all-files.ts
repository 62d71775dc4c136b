import { NO_BEATS } from '../recording/beat';
import { gapBetween } from '../recording/lost';
import { beatsCsv } from './beats-csv';
import { epochsCsv } from './epochs-csv';
import type { ExportInput } from './export-input';
import { findingsJson } from './findings-json';
import { leadRate, minutesCsv } from './minutes-csv';
import { spansCsv } from './spans-csv';
import type { TextFile } from './stored-zip';

export type { ExportInput } from './export-input';

/** All files of results, in a fixed order: what the page puts into one zip and the command line into a folder. */
export function exportFiles(input: ExportInput): readonly TextFile[] {
  const { recording, state, stomach, heart, openDoubts } = input;
  const rateHz = leadRate(state.roles.heart, recording);
  const beats = rateHz === null ? NO_BEATS : state.beats;
  return [
    {
      name: 'beats.csv',
      text: beatsCsv({
        beats,
        rateHz: rateHz ?? 1,
        rr: heart?.rr ?? null,
        doubts: { open: openDoubts, settled: state.doubts },
        gapBetween: (fromS, toS) =>
          state.roles.heart !== null && gapBetween(state.roles.heart, recording.gaps, fromS, toS),
      }),
    },
    { name: 'epochs.csv', text: epochsCsv(stomach) },
    { name: 'minutes.csv', text: minutesCsv(input) },
    { name: 'spans.csv', text: spansCsv(state.spans) },
    { name: 'findings.json', text: findingsJson(input) },
  ];
}
