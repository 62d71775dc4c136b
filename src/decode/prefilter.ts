import type { Prefilter } from '../recording/channel';
import type { Hertz } from '../units/rate';

const NUMBER = '([0-9]+(?:[.,][0-9]*)?|[.,][0-9]+)';
const UNIT = '\\s*(m|k)?(?:hz|c/s)?';
const HIGH_PASS = '(?:hp|hpf|hff?|hi(?:gh)?[- ]?pass(?:[- ]?filter)?|lower[- ]?cut[- ]?off)';
const LOW_PASS = '(?:lp|lpf|low?[- ]?pass(?:[- ]?filter)?|upper[- ]?cut[- ]?off)';
const BAND_PASS = '(?:bp|bpf|bw|band[- ]?pass(?:[- ]?filter)?|bandwidth|band)';
const JOIN = '\\s*[:=]?\\s*';

const EDGE = `(?:(dc|none|off|no)|${NUMBER}${UNIT})`;
const highPass = new RegExp(`(?:^|[^a-z])${HIGH_PASS}${JOIN}${EDGE}`, 'i');
const lowPass = new RegExp(`(?:^|[^a-z])${LOW_PASS}${JOIN}${EDGE}`, 'i');
const bandPass = new RegExp(
  `(?:^|[^a-z])${BAND_PASS}${JOIN}${NUMBER}${UNIT}\\s*(?:-|–|to|\\.\\.)\\s*${NUMBER}${UNIT}`,
  'i',
);
const timeConstant = new RegExp(
  `(?:^|[^a-z])(?:tc|time[- ]?constant)${JOIN}${NUMBER}\\s*(m)?s`,
  'i',
);

/**
 * Reads the prefiltering text of a header ("HP:0.016Hz LP:35Hz N:50Hz", Kemp & Olivan 2003, and looser spellings: other
 * names, blanks, decimal comma, mHz and kHz, a band "0.05-40 Hz", a time constant TC in s as 1/(2 pi TC)). "DC" as the high
 * pass gives 0 Hz. Kind `unknown` where no edge can be read.
 */
export function readPrefilter(text: string): Prefilter {
  const band = bandPass.exec(text);
  const tc = timeConstant.exec(text);
  const high = edge(highPass.exec(text), 0);
  const low = edge(lowPass.exec(text), null);
  const highPassHz =
    high ?? (band ? hertz(band[1], band[2] ?? band[4]) : tc ? cornerHz(tc[1], tc[2]) : null);
  const lowPassHz = low ?? (band ? hertz(band[3], band[4]) : null);
  return highPassHz === null && lowPassHz === null
    ? { kind: 'unknown', text }
    : { kind: 'stated', text, highPassHz, lowPassHz };
}

function edge(match: RegExpExecArray | null, open: Hertz | null): Hertz | null {
  if (!match) return null;
  return match[1] === undefined ? hertz(match[2], match[3]) : open;
}

function decimal(text: string): number {
  return Number(text.replace(',', '.'));
}

function hertz(text: string, prefix: string | undefined): Hertz {
  const factor = prefix === undefined ? 1 : prefix.toLowerCase() === 'k' ? 1000 : 0.001;
  return decimal(text) * factor;
}

function cornerHz(text: string, milli: string | undefined): Hertz | null {
  const seconds = decimal(text) * (milli === undefined ? 1 : 0.001);
  return seconds > 0 ? 1 / (2 * Math.PI * seconds) : null;
}
