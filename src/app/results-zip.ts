import { type ExportInput, exportFiles } from '../export/all-files';
import { storedZip } from '../export/stored-zip';

/** All files of results as one zip, the same bytes for the same review; a file of its own, since it is fetched when asked for. */
export function resultsZip(input: ExportInput): Uint8Array<ArrayBuffer> {
  return storedZip(exportFiles(input));
}
