import type { Phase } from '../src/recording/phase';
import { type RouteName, SLOW_ROUTES } from '../src/recording/settings';
import { parseClock } from '../src/units/time';

/** What the command line asks for. */
export interface AnalyseRequest {
  readonly studies: readonly string[];
  readonly session: string | null;
  readonly code: string | null;
  readonly slow: readonly string[];
  readonly heart: string | null;
  readonly breath: string | null;
  readonly phases: readonly Phase[] | null;
  readonly route: RouteName | null;
  readonly rateHz: number | null;
  readonly unit: string | null;
  readonly out: string;
  /** File with the site's reference values. */
  readonly reference: string | null;
  /** Whether what is written says whose study it is. */
  readonly withoutIdentity: boolean;
}

export const USAGE = `npm run analyse -- STUDY... [options]
npm run analyse -- --self-check
  --session FILE   the review to compute from (one study only)
  --code CODE      what the study is called (one study only; default: the header's code, else study- and
                   the first 8 digits of its SHA-256)
  --slow LEAD      a slow-wave lead; the first one given is reported; may be repeated
  --heart LEAD     the heart lead
  --breath LEAD    the breathing lead
  --phases LIST    fasting:0-1800,meal:1800-2400,fed:2400-5400 (seconds or h:mm:ss)
  --route NAME     band, fractional or beat-average
  --rate HZ        sampling rate of delimited text without a time column
  --unit UNIT      unit of delimited text that names none: V, mV, uV, nV
  --reference FILE reference values of the site, to stand beside the figures they fit
  --out DIR        where the files go (default: here); several studies get a folder each and one studies.csv
  --without-identity
                   X for who it is, dates moved, no texts that people wrote, no file names
  --self-check     runs the program's check values on this machine and prints each; goes alone
LEAD is a label or #N; a difference of two is A~B (#2~#3). Exit status: 0 done, 1 a study could not be analysed or a check
failed, 2 wrong arguments.`;

/** Wrong arguments, in words for the person. */
export class WrongArguments extends Error {}

const OPTIONS = [
  'session',
  'code',
  'slow',
  'heart',
  'breath',
  'phases',
  'route',
  'rate',
  'unit',
  'out',
  'reference',
];
/** Options without a value. */
const FLAGS = ['without-identity'];

/** Reads the arguments after the program's name. Throws WrongArguments. */
export function parseArguments(words: readonly string[]): AnalyseRequest {
  const single = new Map<string, string>();
  const slow: string[] = [];
  const studies: string[] = [];
  const flags = new Set<string>();
  for (let i = 0; i < words.length; i += 1) {
    const word = words[i];
    if (!word.startsWith('--')) {
      studies.push(word);
      continue;
    }
    const name = word.slice(2);
    if (FLAGS.includes(name)) {
      flags.add(name);
      continue;
    }
    if (!OPTIONS.includes(name)) throw new WrongArguments(`there is no option ${word}`);
    const value = words.at(i + 1);
    if (value === undefined || value.startsWith('--'))
      throw new WrongArguments(`${word} wants a value`);
    i += 1;
    if (name === 'slow') slow.push(value);
    else if (single.has(name)) throw new WrongArguments(`${word} is given twice`);
    else single.set(name, value);
  }
  if (studies.length === 0) throw new WrongArguments('name at least one study file');
  for (const name of ['session', 'code'])
    if (single.has(name) && studies.length > 1)
      throw new WrongArguments(`--${name} goes with one study`);
  if (single.get('code')?.trim() === '') throw new WrongArguments('--code wants a value');
  const settled = ['code', 'heart', 'breath', 'phases', 'route'].filter((name) => single.has(name));
  if (single.has('session') && (slow.length > 0 || settled.length > 0))
    throw new WrongArguments(
      `a session settles code, leads, phases and route; leave out --${slow.length > 0 ? 'slow' : settled[0]} or --session`,
    );
  const phases = single.get('phases');
  return {
    studies,
    session: single.get('session') ?? null,
    code: single.get('code')?.trim() ?? null,
    slow,
    heart: single.get('heart') ?? null,
    breath: single.get('breath') ?? null,
    phases: phases === undefined ? null : parsePhases(phases),
    route: parseRoute(single.get('route')),
    rateHz: parseRate(single.get('rate')),
    unit: single.get('unit') ?? null,
    out: single.get('out') ?? '.',
    reference: single.get('reference') ?? null,
    withoutIdentity: flags.has('without-identity'),
  };
}

function parseRoute(name: string | undefined): RouteName | null {
  if (name === undefined) return null;
  const route = SLOW_ROUTES.find((one) => one === name);
  if (!route) throw new WrongArguments(`--route is ${SLOW_ROUTES.join(' or ')}, not "${name}"`);
  return route;
}

function parseRate(text: string | undefined): number | null {
  if (text === undefined) return null;
  const rate = Number(text);
  if (!(rate > 0) || !Number.isFinite(rate))
    throw new WrongArguments(`--rate wants a number of samples a second above 0, not "${text}"`);
  return rate;
}

function parsePhases(text: string): readonly Phase[] {
  const phases = text.split(',').map((part): Phase => {
    const match = /^([a-z]+(?:-\d+)?):([^-]+)-([^-]+)$/.exec(part.trim());
    const fromS = match ? parseClock(match[2]) : null;
    const toS = match ? parseClock(match[3]) : null;
    if (!match || fromS === null || toS === null || toS <= fromS)
      throw new WrongArguments(
        `"${part}" is no phase; write fasting:0-1800 (name:from-to in seconds)`,
      );
    return { name: match[1], fromS, toS };
  });
  const sorted = [...phases].sort((a, b) => a.fromS - b.fromS);
  sorted.forEach((phase, i) => {
    if (i > 0 && phase.fromS < sorted[i - 1].toS)
      throw new WrongArguments(`${phase.name} begins before ${sorted[i - 1].name} ends`);
    if (sorted.some((other, j) => j < i && other.name === phase.name))
      throw new WrongArguments(`${phase.name} is given twice`);
  });
  return sorted;
}
