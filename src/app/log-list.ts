import { useEffect, useMemo, useState } from 'react';
import { asWork } from '../review/idle';
import type { Session } from '../session/document';
import {
  type LogEntry,
  type LogKind,
  type LogWords,
  logEntries,
  logWords,
} from '../session/log-words';

/** What a person looks for in the log; '' and null: all. */
export interface LogFilter {
  readonly kind: LogKind | null;
  readonly reviewer: string | null;
  readonly text: string;
}

/** A line of the log as the list shows it. */
export interface LogRow extends LogEntry {
  /** Made when they are asked for first. */
  readonly words: () => LogWords;
}

/** The lines of a session's log, newest first. */
export function logRows(
  session: Session,
  rateHzOf: Parameters<typeof logEntries>[1]['rateHzOf'],
): readonly LogRow[] {
  const labels = session.state.study.channelLabels;
  return logEntries(session, { rateHzOf })
    .map((entry): LogRow => {
      let made: LogWords | null = null;
      return {
        ...entry,
        words: () => {
          made ??= logWords(entry, labels);
          return made;
        },
      };
    })
    .reverse();
}

/** True where a line is of the kind and the reviewer, and holds every word that is looked for. */
export function fits(row: LogRow, { kind, reviewer, text }: LogFilter): boolean {
  if (kind !== null && !row.kinds.includes(kind)) return false;
  if (reviewer !== null && row.line.reviewer !== reviewer) return false;
  const sought = text.toLowerCase().split(/\s+/).filter(Boolean);
  if (sought.length === 0) return true;
  const { act, changes } = row.words();
  const all = [row.line.n, row.line.reviewer, act, ...changes].join(' ').toLowerCase();
  return sought.every((word) => all.includes(word));
}

/** Lines looked through in one turn, so that typing never waits for a long log. */
const LINES_A_TURN = 200;
/** The list is drawn after the first turn, then after so many. */
const TURNS_A_DRAWING = 8;

export interface FittingRows {
  readonly rows: readonly LogRow[];
  /** False while lines are still being looked through. */
  readonly complete: boolean;
}

/** The rows that fit; a long log is looked through a part a turn. */
export function useFitting(rows: readonly LogRow[], filter: LogFilter): FittingRows {
  const { kind, reviewer, text } = filter;
  const [found, setFound] = useState<FittingRows & { readonly of: unknown }>(NOTHING_FOUND);
  const asked = useMemo(() => ({ rows, kind, reviewer, text }), [rows, kind, reviewer, text]);
  useEffect(() => {
    let current = true;
    const look = async () => {
      const fitting: LogRow[] = [];
      for (let from = 0; current && from < asked.rows.length; from += LINES_A_TURN) {
        if (from > 0) await nextTurn();
        for (const row of asked.rows.slice(from, from + LINES_A_TURN))
          if (fits(row, asked)) fitting.push(row);
        const complete = from + LINES_A_TURN >= asked.rows.length;
        const turn = from / LINES_A_TURN;
        if (current && (complete || turn % TURNS_A_DRAWING === 0))
          setFound({ rows: [...fitting], complete, of: asked });
      }
    };
    void asWork(look());
    return () => {
      current = false;
    };
  }, [asked]);
  if (rows.length === 0) return NO_ROWS;
  return found.of === asked ? found : { rows: found.rows, complete: false };
}

const NO_ROWS: FittingRows = { rows: [], complete: true };
const NOTHING_FOUND = { rows: [], complete: false, of: null };

const nextTurn = () => new Promise<void>((resolve) => setTimeout(resolve));
