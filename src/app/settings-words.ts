import { truncationBound } from '../numeric/grunwald-letnikov';
import type { BreathingOut, SlowGain } from '../recording/settings';
import { numberText, readNumber } from './number-field';
import { SETTING_FIELDS, type SettingKey, type SettingsDraft } from './settings-draft';

function typedNumber(draft: SettingsDraft, key: SettingKey): number | null {
  const bounds = SETTING_FIELDS.find((one) => one.key === key)?.bounds;
  const read = bounds ? readNumber(draft.texts[key], bounds) : null;
  return read?.ok ? read.value : null;
}

/** The first sentence of what is in force: "Slow wave by ..." as "Now: slow wave by ...". */
export const nowWords = (note: string): string =>
  `Now: ${note.charAt(0).toLowerCase()}${note.slice(1)}`;

/** How the frequencies of the band may be weighed, in words. */
export const SLOW_GAIN_CHOICES: readonly (readonly [SlowGain, string])[] = [
  ['fitted', 'by how far each stands out of the background'],
  ['even', 'all alike'],
];

/** What may become of breathing in the drawn wave, in words. */
export const BREATHING_OUT_CHOICES: readonly (readonly [BreathingOut, string])[] = [
  ['where-it-helps', 'taken out where that measurably helps'],
  ['never', 'left in'],
];

const GAIN_WORDS: Readonly<Record<SlowGain, string>> = {
  fitted:
    'Drawn: the lead within this band, with what does not stand out of its own background lowered to a tenth, and harmonics kept up to 15 cpm.',
  even: 'Drawn: the lead within this band.',
};

/** What the chosen route of the slow wave draws, and what its rhythm is computed on. */
export function slowRouteWords({
  slowRoute,
  slowGain,
}: Pick<SettingsDraft, 'slowRoute' | 'slowGain'>): string {
  if (slowRoute === 'beat-average')
    return `The average heartbeat is taken out of the lead first. ${GAIN_WORDS[slowGain]} The rhythm is computed on the lead without heartbeats, before the band. For weak waves under large T waves or early beats; a beat that was missed stays in, so mend the beats first.`;
  return slowRoute === 'band'
    ? `${GAIN_WORDS[slowGain]} The rhythm is computed on the lead before it.`
    : 'Drawn: the derivative of the lead, smoothed, with no band limits. The rhythm is computed on it, with what the derivative does to each frequency divided out.';
}

/** What the chosen route of the heartbeat finds beats on. */
export function heartRouteWords({ heartRoute }: Pick<SettingsDraft, 'heartRoute'>): string {
  return heartRoute === 'band'
    ? 'Beats are found on the lead within this band.'
    : 'Beats are found on the derivative of the smoothed lead, with no band limits.';
}

/** What the fixed memory of the derivative leaves out at most, in words; '' while order or memory cannot be read. */
export function truncationWords(draft: SettingsDraft): string {
  const order = typedNumber(draft, 'order');
  const memory = typedNumber(draft, 'memory');
  if (order === null || memory === null) return '';
  if (order === 0 || order === 1) return 'At this order nothing older than one sample enters.';
  const bound = truncationBound(order, memory);
  const size = bound >= 0.1 ? bound.toFixed(2) : bound.toPrecision(2);
  return `What is older than ${numberText(memory)} s is left out. At worst, for a lead that stands still at 1 µV, the derivative is off by ${size} µV per second to the power ${numberText(order)}; the mean is removed first, and a wave that swings about zero loses far less.`;
}
