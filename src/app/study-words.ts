import type { Recording, StartTime } from '../recording/recording';
import type { KeptWhere } from '../session/store';
import { formatClock } from '../units/time';

/** Local date and time as the header has it: "2024-05-03, 09:12". */
export function startWords(start: StartTime): string {
  return start.kind === 'known'
    ? localWords(start.local)
    : `not known${start.raw === '' ? '' : ` (the header says “${start.raw}”)`}`;
}

/** A local time written "2024-05-03T09:12:00" as people read it. */
export function localWords(local: string): string {
  const parts = /^(\d{4}-\d\d-\d\d)T(\d\d:\d\d)/.exec(local);
  return parts ? `${parts[1]}, ${parts[2]}` : local;
}

/** Rates of the channels, each once, highest first: "250 Hz", "1000, 25 Hz". */
export function rateWords(recording: Recording): string {
  const rates = [...new Set(recording.channels.map((channel) => channel.rateHz))];
  rates.sort((a, b) => b - a);
  return `${rates.map((rate) => String(Math.round(rate * 1000) / 1000)).join(', ')} Hz`;
}

/** Length, channels and rates in one line: "1:30:00 · 3 channels · 250 Hz". */
export function factsWords(recording: Recording): string {
  const count = recording.channels.length;
  const channels = `${count} ${count === 1 ? 'channel' : 'channels'}`;
  return `${formatClock(recording.durationS)} · ${channels} · ${rateWords(recording)}`;
}

/** Name, sex and birth year as the header has them; '' where it has none of them. */
export function personWords(recording: Recording): string {
  const { name, sex, birthYear } = recording.identity;
  return [name, sex, birthYear === null ? null : `born ${birthYear}`].filter(Boolean).join(', ');
}

/** Where the work is, for the bar. `edit` is the session's edit number now. */
export function keptWords(kept: KeptWhere, edit: number): string {
  switch (kept.kind) {
    case 'nowhere':
      return `not kept: ${kept.why}`;
    case 'saving':
      return `saving edit ${kept.edit} in this browser`;
    case 'browser':
      return `in this browser only, edit ${kept.edit}`;
    case 'file': {
      const since = edit - kept.edit;
      const newer = since === 1 ? '1 edit since' : `${since} edits since`;
      return `in file, edit ${kept.edit}${since > 0 ? `; ${newer} in this browser only` : ''}`;
    }
  }
}

/** True while some of the work is in no file. */
export function hasUnfiledWork(kept: KeptWhere, edit: number): boolean {
  return edit > 0 && !(kept.kind === 'file' && kept.edit >= edit);
}
