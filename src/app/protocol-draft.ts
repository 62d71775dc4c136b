import type { Protocol } from '../recording/protocol';
import { type NumberBounds, numberText, readNumber } from './number-field';

export type ProtocolNumber = 'kcal' | 'ml' | 'minutes' | 'partEatenPercent' | 'fastHours';
export type ProtocolText = 'meal' | 'posture' | 'medicines' | 'implants';

interface ProtocolField<K> {
  readonly key: K;
  readonly label: string;
}

export const PROTOCOL_TEXTS: readonly ProtocolField<ProtocolText>[] = [
  { key: 'meal', label: 'Test meal' },
  { key: 'posture', label: 'Posture' },
  { key: 'medicines', label: 'Medicines' },
  { key: 'implants', label: 'Implants' },
];

export const PROTOCOL_NUMBERS: readonly (ProtocolField<ProtocolNumber> & {
  readonly bounds: NumberBounds;
})[] = [
  { key: 'kcal', label: 'Energy', bounds: { least: 0, most: 5000, unit: 'kcal' } },
  { key: 'ml', label: 'Volume', bounds: { least: 0, most: 5000, unit: 'ml' } },
  { key: 'minutes', label: 'Time to eat', bounds: { least: 0, most: 600, unit: 'min' } },
  { key: 'partEatenPercent', label: 'Part eaten', bounds: { least: 0, most: 100, unit: '%' } },
  { key: 'fastHours', label: 'Fasted before', bounds: { least: 0, most: 240, unit: 'h' } },
];

/** A protocol as it is being typed; '' where nothing is stated. */
export type ProtocolDraft = Readonly<Record<ProtocolNumber | ProtocolText, string>>;
export type ProtocolErrors = Readonly<Partial<Record<ProtocolNumber, string>>>;

export function protocolDraft(protocol: Protocol): ProtocolDraft {
  const text = (value: number | null) => (value === null ? '' : numberText(value));
  return {
    meal: protocol.meal,
    posture: protocol.posture,
    medicines: protocol.medicines,
    implants: protocol.implants,
    kcal: text(protocol.kcal),
    ml: text(protocol.ml),
    minutes: text(protocol.minutes),
    partEatenPercent: text(protocol.partEatenPercent),
    fastHours: text(protocol.fastHours),
  };
}

/** Reads what was typed; an empty number is "not stated". */
export function readProtocol(draft: ProtocolDraft): {
  readonly protocol: Protocol;
  readonly errors: ProtocolErrors;
} {
  const errors: Partial<Record<ProtocolNumber, string>> = {};
  const number = (key: ProtocolNumber): number | null => {
    const field = PROTOCOL_NUMBERS.find((one) => one.key === key);
    if (!field || draft[key].trim() === '') return null;
    const read = readNumber(draft[key], field.bounds);
    if (read.ok) return read.value;
    errors[key] = read.error;
    return null;
  };
  const protocol: Protocol = {
    meal: draft.meal.trim(),
    kcal: number('kcal'),
    ml: number('ml'),
    minutes: number('minutes'),
    partEatenPercent: number('partEatenPercent'),
    fastHours: number('fastHours'),
    posture: draft.posture.trim(),
    medicines: draft.medicines.trim(),
    implants: draft.implants.trim(),
  };
  return { protocol, errors };
}
