import { writeEdfPlus } from '../src/export/edf-plus';
import { demoStudy } from '../src/simulate/demo';

/** The invented demo study as the bytes of an EDF+ file, so that it opens by the way every file does. */
export function demoStudyFile(): Blob {
  return new Blob(writeEdfPlus(demoStudy()), { type: 'application/octet-stream' });
}
