import { NO_BEATS } from '../recording/beat';
import { gapBetween } from '../recording/lost';
import { beatsCsv } from './beats-csv';
import { epochsCsv } from './epochs-csv';
import type { ExportInput } from './export-input';
import { findingsJson } from './findings-json';
import { leadRate, minutesCsv } from './minutes-csv';
import type { ResultFile } from './result-file';
import { spansCsv } from './spans-csv';

/** The tables and figures of a review, in a fixed order. */
export function tableFiles(input: ExportInput): readonly ResultFile[] {
  const { recording, state, stomach, heart, openDoubts } = input;
  const rateHz = leadRate(state.roles.heart, recording);
  const beats = rateHz === null ? NO_BEATS : state.beats;
  return [
    {
      name: 'beats.csv',
      content: beatsCsv({
        beats,
        rateHz: rateHz ?? 1,
        rr: heart?.rr ?? null,
        doubts: { open: openDoubts, settled: state.doubts },
        gapBetween: (fromS, toS) =>
          state.roles.heart !== null && gapBetween(state.roles.heart, recording.gaps, fromS, toS),
      }),
    },
    { name: 'epochs.csv', content: epochsCsv(stomach) },
    { name: 'minutes.csv', content: minutesCsv(input) },
    { name: 'spans.csv', content: spansCsv(state.spans) },
    { name: 'findings.json', content: findingsJson(input) },
  ];
}
