import type { Failure } from '../recording/failure';
import type { Recording } from '../recording/recording';
import type { Session } from '../session/document';
import { formatClock } from '../units/time';
import type { KeptRow } from './controller';

/** Another file was chosen than the one a session waits for. */
export const otherFile = (fileName: string, code: string): Failure => ({
  kind: 'wrong-input',
  message: `${fileName} is not the file that session ${code} was made on. Nothing was opened or changed.`,
  place: null,
  remedy:
    'Continue the session again and choose its own file; or open this file once more to begin a review of its own.',
});

/** The worker was started again between opening a file and agreeing to it. */
export const LOST_OPENING: Failure = {
  kind: 'crashed',
  message: 'The file has to be opened once more: the part of the program that had read it stopped.',
  place: null,
  remedy: 'Open the file again. Nothing of your work is lost.',
};

/** Why a kept session does not fit the recording as it was read now; null where it does. */
export function otherReading({ state }: Session, recording: Recording): Failure | null {
  const { durationS, channelLabels, code } = state.study;
  const labels = recording.channels.map(({ label }) => label);
  const same = durationS === recording.durationS && channelLabels.join() === labels.join();
  return same
    ? null
    : {
        kind: 'wrong-input',
        message: `${recording.fileName} was read otherwise when session ${code} was made: it lasted ${formatClock(durationS)} then and ${formatClock(recording.durationS)} now.`,
        place: null,
        remedy:
          'Give the same rate and unit as before, so that beats and phases stand where they stood.',
      };
}

/** A session as the identity dialog tells of it. */
export function keptRow({ state, log }: Session): KeptRow {
  const { quickKey, code, start, invented } = state.study;
  return { quickKey, code, start, invented, edits: log.length, lastUtc: log.at(-1)?.atUtc ?? null };
}
