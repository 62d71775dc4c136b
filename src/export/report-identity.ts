import type { Protocol } from '../recording/protocol';
import type { Recording } from '../recording/recording';
import type { SessionState } from '../session/document';
import type { Hide } from './report-hiding';

/** A name and what is said of it, as the report's lists print it. */
export interface Fact {
  readonly name: string;
  readonly words: string;
}

const INVENTED: Fact = { name: 'Data', words: 'invented by the program, of no person' };

/** Said where identity is hidden: what people typed is printed as they typed it. */
const HIDDEN_WARNING =
  'Code, name, dates, file name and hash are left out. Texts typed by people may still say who it is: read them before you hand this on.';

/** What has to be known of the identity as it is printed. */
export function identityNote(hidden: boolean, age: string | null): string {
  if (hidden) return HIDDEN_WARNING;
  return age === null
    ? 'Identity as the file’s header has it, not verified.'
    : 'Without identity: X stands for it, all dates are moved by one shift, and what people wrote is left out. A heartbeat trace can itself identify a person.';
}

/** Who the study is of, as the file's header says; a hidden identity says only that it is. */
export function identityFacts(
  { identity, start, invented }: Recording,
  { study }: SessionState,
  hidden: boolean,
  age: string | null,
): readonly Fact[] {
  const data = invented || study.invented ? [INVENTED] : [];
  if (hidden) return [{ name: 'Identity', words: 'identity hidden' }, ...data];
  const { name, sex, birthYear } = identity;
  return [
    { name: 'Code', words: study.code },
    ...(name === null ? [] : [{ name: 'Name', words: name }]),
    ...(birthYear === null ? [] : [{ name: 'Born', words: String(birthYear) }]),
    ...(age === null ? [] : [{ name: 'Age', words: age }]),
    ...(sex === null ? [] : [{ name: 'Sex', words: sex }]),
    { name: 'Recorded', words: start.kind === 'known' ? recordedWords(start.local) : 'not known' },
    ...data,
  ];
}

const recordedWords = (local: string): string => local.slice(0, 16).replace('T', ', ');

export interface ProtocolFacts {
  readonly stated: readonly Fact[];
  /** Names of what nobody stated. */
  readonly notStated: readonly string[];
}

/** What was done around the recording: only what is stated, and by name what is not. */
export function protocolFacts(protocol: Protocol, hide: Hide): ProtocolFacts {
  const number = (value: number | null, unit: string) => (value === null ? '' : `${value} ${unit}`);
  const all: readonly Fact[] = [
    { name: 'Meal', words: protocol.meal },
    { name: 'Energy', words: number(protocol.kcal, 'kcal') },
    { name: 'Volume', words: number(protocol.ml, 'ml') },
    { name: 'Eaten in', words: number(protocol.minutes, 'min') },
    { name: 'Part eaten', words: number(protocol.partEatenPercent, '%') },
    { name: 'Fasted', words: number(protocol.fastHours, 'h') },
    { name: 'Posture', words: protocol.posture },
    { name: 'Medicines', words: protocol.medicines },
    { name: 'Implants', words: protocol.implants },
  ];
  const stated = all.filter(({ words }) => words.trim() !== '');
  return {
    stated: stated.map(({ name, words }) => ({ name, words: hide(words) })),
    notStated: all.filter((fact) => !stated.includes(fact)).map(({ name }) => name.toLowerCase()),
  };
}
