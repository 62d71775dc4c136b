import { adequacyReason, keptPercent } from '../recording/adequacy';
import type { Adequacy, Findings, PhaseFindings } from '../recording/findings';
import { isMeal } from '../recording/phase';
import { formatClock } from '../units/time';
import { createNotes, type Note, type Notes } from './report-notes';

/** How much of a phase one organ's figures stand on. */
export interface KeptPart {
  /** Minutes kept. */
  readonly minutes: string;
  readonly percent: string;
  readonly words: string;
  readonly letters: readonly string[];
}

/** One phase or part: how long it is and how much of it the figures stand on. */
export interface AdequacyRow {
  readonly phase: string;
  readonly stretch: string;
  readonly minutes: string;
  readonly stomach: KeptPart;
  /** Null where the study has no heart lead. */
  readonly heart: KeptPart | null;
  /** False for a meal: its figures stand in Findings and the files, the report prints none of them. */
  readonly printed: boolean;
}

export interface AdequacyTable {
  readonly rows: readonly AdequacyRow[];
  readonly notes: readonly Note[];
}

const WORDS: Readonly<Record<Adequacy, string>> = {
  enough: 'enough',
  limited: 'limited',
  'not-reportable': 'not reportable',
};

/** The first table of the report: may the figures be read at all? */
export function adequacyTable({ phases }: Findings, heartLead: boolean): AdequacyTable {
  const notes = createNotes();
  return { rows: phases.map((phase) => rowOf(phase, heartLead, notes)), notes: notes.list() };
}

function rowOf(phase: PhaseFindings, heartLead: boolean, notes: Notes): AdequacyRow {
  const lengthS = phase.toS - phase.fromS;
  const printed = !isMeal({ ...phase, name: phase.phase });
  const kept = (keptS: number, adequacy: Adequacy): KeptPart => {
    const reason = printed ? adequacyReason(adequacy, keptS, lengthS) : '';
    return {
      minutes: (keptS / 60).toFixed(1),
      percent: `${keptPercent(keptS, lengthS)} %`,
      words: WORDS[adequacy],
      letters: reason === '' ? [] : [notes.letterOf(`${WORDS[adequacy]}: ${reason}`)],
    };
  };
  return {
    phase: phase.name,
    stretch: `${formatClock(phase.fromS)}–${formatClock(phase.toS)}`,
    minutes: (lengthS / 60).toFixed(1),
    stomach: kept(phase.keptStomachS, phase.adequacyStomach),
    heart: heartLead ? kept(phase.keptHeartS, phase.adequacyHeart) : null,
    printed,
  };
}
