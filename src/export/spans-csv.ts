import type { Span } from '../recording/span';
import { csvText, timeCell } from './csv';

const HEADER = ['from_s', 'to_s', 'lead', 'for', 'cause', 'origin', 'note'];

/** spans.csv: one row a spoiled span in order of start; the lead is empty where all leads are meant. */
export function spansCsv(spans: readonly Span[]): string {
  const inOrder = [...spans].sort((a, b) => a.fromS - b.fromS || a.toS - b.toS || a.id - b.id);
  return csvText(
    HEADER,
    inOrder.map((span) => [
      timeCell(span.fromS),
      timeCell(span.toS),
      span.lead,
      span.target,
      span.cause,
      span.origin,
      span.note,
    ]),
  );
}
