import { type Lead, type LeadUse, leadFault, parseLead } from '../src/recording/lead';
import type { Phase } from '../src/recording/phase';
import type { Recording } from '../src/recording/recording';
import type { Roles } from '../src/recording/roles';
import { formatClock } from '../src/units/time';
import { type AnalyseRequest, WrongArguments } from './command-line';

/** Roles with what the command line names in the place of what is proposed; the first slow lead named is reported. Throws WrongArguments. */
export function rolesWith(
  proposed: Roles,
  request: Pick<AnalyseRequest, 'slow' | 'heart' | 'breath'>,
  recording: Recording,
): Roles {
  const lead = (text: string): Lead => {
    const found = parseLead(text, recording.channels);
    if (found) return found;
    const labels = recording.channels.map(({ label }, i) => `#${i + 1} ${label}`).join(', ');
    throw new WrongArguments(`"${text}" names no lead of ${recording.fileName}; it has ${labels}`);
  };
  const named = request.slow.length > 0 ? { slow: request.slow.map(lead), reported: 0 } : {};
  return {
    ...proposed,
    ...named,
    heart: request.heart === null ? proposed.heart : lead(request.heart),
    breath: request.breath === null ? proposed.breath : lead(request.breath),
  };
}

/** Throws WrongArguments where a lead cannot serve its role in this recording. */
export function checkRoles({ slow, heart, breath }: Roles, recording: Recording): void {
  const { channels, fileName } = recording;
  const check = (lead: Lead | null, use: LeadUse): void => {
    const fault = lead && leadFault(lead, channels, use);
    if (fault) throw new WrongArguments(`${use} lead of ${fileName}: ${fault}`);
  };
  for (const lead of slow) check(lead, 'slow-wave');
  check(heart, 'heart');
  check(breath, 'breathing');
}

/**
 * The phases as far as the recording reaches: one that ends within the recording's last, unfinished second ends with it. Throws
 * WrongArguments for one that reaches further.
 */
export function phasesWithin(
  phases: readonly Phase[],
  { durationS, fileName }: Recording,
): readonly Phase[] {
  for (const { name, fromS, toS } of phases)
    if (toS > Math.ceil(durationS) || fromS >= durationS)
      throw new WrongArguments(
        `phase ${name} reaches to ${toS} s, but ${fileName} ends at ${durationS} s (${formatClock(durationS)})`,
      );
  return phases.map((phase) => ({ ...phase, toS: Math.min(phase.toS, durationS) }));
}

/** The code a study goes under: the one asked for, the header's, else one made of its SHA-256; never the file's name, which may be a person's. */
export const codeOf = (asked: string | null, { identity }: Recording, sha256: string): string =>
  asked ?? identity.code ?? `study-${sha256.slice(0, 8)}`;
