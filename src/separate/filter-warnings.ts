import { log10 } from '../numeric/elementary';
import type { Channel } from '../recording/channel';
import type { StudyWarning } from '../recording/findings';
import { SLOW_RATE_HZ } from '../recording/separated';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';

/** From these corners on a high-pass tilts the slow wave's band, or leaves nothing of it to judge. */
const TILTING_HIGH_PASS_HZ = 0.05;
const WITHHOLDING_HIGH_PASS_HZ = 0.3;
/** Below these no heartbeat can be read. */
const LEAST_LOW_PASS_HZ = 5;
const LEAST_HEART_RATE_HZ = 50;

/** What the filters of a lead do to its figures. */
export interface FilterWarnings {
  readonly warnings: readonly StudyWarning[];
  /** Why stomach figures are withheld; null where they are not. */
  readonly withholdStomach: string | null;
  readonly withholdHeart: string | null;
}

/** Gain in dB of a first-order high-pass at a frequency. */
export function firstOrderHighPassDb(cornerHz: Hertz, atCpm: Cpm): number {
  const square = cpmToHz(atCpm) ** 2;
  return 10 * log10(square / (square + cornerHz * cornerHz));
}

const labels = (channels: readonly Channel[]) =>
  channels.map((channel) => channel.label).join(' and ');

function tiltText(channels: readonly Channel[], cornerHz: Hertz): string {
  const [one, three, nine] = [1, 3, 9].map((cpm) => firstOrderHighPassDb(cornerHz, cpm));
  return (
    `${labels(channels)}: the file states a high-pass of ${cornerHz} Hz, which tilts the band of the slow wave ` +
    `towards fast rhythms (first order: ${one.toFixed(1)} dB at 1 cpm, ${three.toFixed(1)} dB at 3 cpm, ${nine.toFixed(1)} dB at 9 cpm).`
  );
}

/** The strongest corner any channel of the lead states; null where none states one. */
function strongest(
  channels: readonly Channel[],
  corner: 'highPassHz' | 'lowPassHz',
  pick: (...values: number[]) => number,
): Hertz | null {
  const corners = channels.flatMap(({ prefilter }) => {
    const value = prefilter.kind === 'stated' ? prefilter[corner] : null;
    return value === null ? [] : [value];
  });
  return corners.length > 0 ? pick(...corners) : null;
}

function heartReason(lowPassHz: Hertz | null, rateHz: Hertz): string | null {
  const why =
    rateHz < LEAST_HEART_RATE_HZ
      ? `the lead has ${rateHz} samples a second`
      : lowPassHz !== null && lowPassHz < LEAST_LOW_PASS_HZ
        ? `the file states a low-pass of ${lowPassHz} Hz`
        : null;
  return why && `no heartbeat can be read in this recording (${why})`;
}

const TILT_UNKNOWN = 'from 0.05 Hz on it would tilt the band of the slow wave';

/** What cannot be told of a lead, because the file does not state it. */
function unknownFilters(channels: readonly Channel[]): readonly StudyWarning[] {
  const unknown = channels.filter(({ prefilter }) => prefilter.kind === 'unknown');
  const noHighPass = channels.filter(
    ({ prefilter }) => prefilter.kind === 'stated' && prefilter.highPassHz === null,
  );
  const filters = `${labels(unknown)}: the filters of the recording are unknown`;
  const ofUnknown: readonly StudyWarning[] = [
    {
      about: 'stomach',
      text: `${filters}, so also whether there is a high-pass; ${TILT_UNKNOWN}.`,
    },
    {
      about: 'heart',
      text: `${filters}, so also whether there is a low-pass; under ${LEAST_LOW_PASS_HZ} Hz it would leave no heartbeat to read.`,
    },
  ];
  const ofNoHighPass: readonly StudyWarning[] = [
    {
      about: 'stomach',
      text: `${labels(noHighPass)}: the file states no high-pass, so whether there is one is unknown; ${TILT_UNKNOWN}.`,
    },
  ];
  return [...(unknown.length > 0 ? ofUnknown : []), ...(noHighPass.length > 0 ? ofNoHighPass : [])];
}

/**
 * What the filters and the rate of a lead's channels mean for its figures: a high-pass from 0.05 Hz
 * is warned of, from 0.3 Hz stomach figures are withheld; a low-pass under 5 Hz or a rate under
 * 50 Hz withholds heart figures; under 4 Hz an aliased heartbeat can look like a slow wave; where
 * the file does not state the filters, or no high-pass, that is said to be unknown for the organ it
 * matters to. Of a difference of two channels the stronger filter counts.
 */
export function filterWarnings(channels: readonly Channel[]): FilterWarnings {
  const warnings: StudyWarning[] = [];
  warnings.push(...unknownFilters(channels));
  const highPassHz = strongest(channels, 'highPassHz', Math.max);
  let withholdStomach: string | null = null;
  if (highPassHz !== null && highPassHz >= TILTING_HIGH_PASS_HZ)
    warnings.push({ about: 'stomach', text: tiltText(channels, highPassHz) });
  if (highPassHz !== null && highPassHz >= WITHHOLDING_HIGH_PASS_HZ)
    withholdStomach = `the file states a high-pass of ${highPassHz} Hz: the slow wave is filtered out`;
  const rateHz = Math.min(...channels.map((channel) => channel.rateHz));
  const withholdHeart = heartReason(strongest(channels, 'lowPassHz', Math.min), rateHz);
  if (withholdHeart)
    warnings.push({ about: 'heart', text: `${labels(channels)}: ${withholdHeart}.` });
  if (rateHz < SLOW_RATE_HZ)
    warnings.push({
      about: 'stomach',
      text: `${labels(channels)}: at ${rateHz} samples a second a heartbeat that was not filtered out before sampling can look like a slow wave.`,
    });
  return { warnings, withholdStomach, withholdHeart };
}
