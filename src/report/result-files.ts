import type { HeartResults, SeparatedSignals } from '../../workers/analysis-api';
import { edfFiles } from '../export/edf-files';
import type { ExportInput } from '../export/export-input';
import { reportModel } from '../export/report-model';
import type { ResultFile } from '../export/result-file';
import { tableFiles } from '../export/table-files';
import type { Session } from '../session/document';
import { reportHtml } from './report-html';
import { type PictureInput, type ReportPictures, reportPictures } from './report-pictures';

export interface ResultInput extends ExportInput {
  /** Age in words where the results go out without identity; null where they do not. */
  readonly age: string | null;
  readonly session: Session;
  readonly heart: HeartResults | null;
  readonly signals: SeparatedSignals;
  /** The slow wave of the excerpts that the report shows. */
  readonly waves: PictureInput['waves'];
}

/** The pictures of a review; null where no slow wave was analysed. */
function picturesOf(input: ResultInput): ReportPictures | null {
  const { state, stomach, heart, breathing, recording, waves } = input;
  const rhythm = stomach[state.roles.reported];
  if (!rhythm) return null;
  const { settings } = state;
  const { durationS } = recording;
  return reportPictures({ state, settings, rhythm, heart, breathing, durationS, waves });
}

/** Pictures for a letter or a slide, each as one file. */
function pictureFiles(pictures: ReportPictures | null): readonly ResultFile[] {
  if (!pictures) return [];
  const { spectrogram, waves, trend } = pictures;
  return [
    { name: 'spectrogram.svg', content: spectrogram.svg },
    ...(waves ? [{ name: 'slow-waves.svg', content: waves.svg }] : []),
    { name: 'trend.svg', content: trend.svg },
  ];
}

/** All files of results, in a fixed order: what the page puts into one zip and the command line into a folder. */
export function resultFiles(input: ResultInput): readonly ResultFile[] {
  const { recording, session, findings, program, openDoubts, evidence } = input;
  const pictures = picturesOf(input);
  const model = reportModel({
    recording,
    session,
    findings,
    program,
    identityHidden: false,
    openDoubts: openDoubts.length,
    evidence,
    siteReference: input.siteReference,
    age: input.age,
  });
  return [
    ...tableFiles(input),
    { name: 'report.html', content: reportHtml(model, pictures) },
    ...pictureFiles(pictures),
    ...edfFiles(input, input.signals),
  ];
}
