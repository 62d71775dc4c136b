import type { Findings } from '../recording/findings';
import type { Session, Signature } from '../session/document';

/** Whether a report may be handed on: a draft, or signed and unchanged since. */
export type ReportStatus =
  | { readonly kind: 'draft'; readonly why: string }
  | { readonly kind: 'final'; readonly signature: Signature }
  | {
      readonly kind: 'amended';
      readonly signature: Signature;
      readonly former: readonly Signature[];
    };

/** The report's status: signing adds one line to the log, so anything after it makes the report a draft again. */
export function reportStatus({ log, state }: Session): ReportStatus {
  const signature = state.signed.at(-1);
  if (!signature) return { kind: 'draft', why: 'not signed' };
  const former = state.signed.slice(0, -1);
  if (log.length > signature.edit + 1)
    return {
      kind: 'draft',
      why: `changed since ${signature.name} signed it; amend it with a reason`,
    };
  return signature.meaning === 'amended'
    ? { kind: 'amended', signature, former }
    : { kind: 'final', signature };
}

/** A figure that this program would now give differently from what was signed. */
export interface FigureDifference {
  readonly phase: string;
  readonly key: string;
}

/** Figures of the signed findings that differ from those computed now, for a report opened by a newer program. */
export function differencesSinceSigning(
  signed: Findings,
  now: Findings,
): readonly FigureDifference[] {
  const byName = new Map(now.phases.map((phase) => [phase.name, phase]));
  return signed.phases.flatMap(({ name, figures }) =>
    Object.entries(figures)
      .filter(
        ([key, value]) => JSON.stringify(byName.get(name)?.figures[key]) !== JSON.stringify(value),
      )
      .map(([key]) => ({ phase: name, key })),
  );
}
