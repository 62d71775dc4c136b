import { storedZip } from '../export/stored-zip';
import { type ResultInput, resultFiles } from '../report/result-files';
import { resultsWithoutIdentity } from '../report/results-without-identity';

export { bytesOf, type ResultFile } from '../export/result-file';
export { storedZip };

/** The files of a review, with or without whose it is; fetched when it is asked for. */
export const filesOf = (input: ResultInput, withoutIdentity: boolean) =>
  resultFiles(withoutIdentity ? resultsWithoutIdentity(input) : input);
