import type { Session } from './document';

/** Names that some systems keep for devices, whatever stands after the first point. */
const DEVICE = /^(con|prn|aux|nul|com\d|lpt\d)(\.|$)/i;

/** A study's code as a part of file names: letters, digits, point, hyphen and underscore, at most 80 characters. */
export function safeCode(code: string): string {
  const safe = code
    .trim()
    .replaceAll(/[^A-Za-z0-9._-]+/g, '_')
    .replace(/^[._-]+/, '')
    .slice(0, 80);
  if (safe === '') return 'study';
  return DEVICE.test(safe) ? `study-${safe}` : safe;
}

/** The name a session is downloaded under: "CODE.bicadence.json". */
export function sessionFileName(session: Session): string {
  return `${safeCode(session.state.study.code)}.bicadence.json`;
}
