import type { FigureValue } from '../recording/figure';
import { FIGURES } from '../recording/figure-catalogue';
import { figureWords } from '../recording/figure-words';
import type { Findings } from '../recording/findings';
import type { Session, Signature } from '../session/document';

/** Whether a report may be handed on: a draft, or read and signed and unchanged since. `former` are the signatures before. */
export type ReportStatus =
  | { readonly kind: 'draft'; readonly why: string; readonly former: readonly Signature[] }
  | {
      readonly kind: 'final' | 'amended';
      readonly signature: Signature;
      readonly former: readonly Signature[];
    };

/**
 * The report's status. Signing adds one line to the log, so anything after it makes the report a draft again; prepared is
 * not read, so a report that was only prepared is a draft too.
 */
export function reportStatus({ log, state }: Session): ReportStatus {
  const signature = state.signed.at(-1);
  if (!signature) return { kind: 'draft', why: 'not signed', former: [] };
  const { meaning, name, edit } = signature;
  const draft = (why: string): ReportStatus => ({ kind: 'draft', why, former: state.signed });
  if (meaning === 'prepared')
    return draft(
      log.length > edit + 1 ? `changed since ${name} prepared it` : `prepared by ${name}, not read`,
    );
  if (log.length > edit + 1)
    return draft(`changed since ${name} signed it; amend it with a reason`);
  const former = state.signed.slice(0, -1);
  return { kind: meaning === 'amended' ? 'amended' : 'final', signature, former };
}

/** A figure that this program would now give differently from what was signed. */
export interface FigureDifference {
  readonly phase: string;
  readonly key: string;
  readonly label: string;
  readonly signed: string;
  readonly now: string;
}

/** Figures of the signed findings that differ from those computed now, for a report opened by a newer program. */
export function differencesSinceSigning(
  signed: Findings,
  now: Findings,
): readonly FigureDifference[] {
  const byName = new Map(now.phases.map((phase) => [phase.name, phase]));
  return signed.phases.flatMap(({ name, figures }) =>
    Object.entries(figures).flatMap(([key, value]) => {
      const computed = byName.get(name)?.figures[key];
      if (JSON.stringify(computed) === JSON.stringify(value)) return [];
      const label = FIGURES.find((figure) => figure.key === key)?.label ?? key;
      const words = bothWords(key, value, computed);
      return [{ phase: name, key, label, ...words }];
    }),
  );
}

/** Both values in the figure's decimals; where those are alike, with all that is written beside them, or in full. */
function bothWords(
  key: string,
  signed: FigureValue,
  now: FigureValue | undefined,
): { readonly signed: string; readonly now: string } {
  const decimals = FIGURES.find((figure) => figure.key === key)?.decimals ?? 2;
  const forms = [
    (value: FigureValue | undefined) => figureWords(value, { decimals }).large,
    (value: FigureValue | undefined) => {
      const { large, small } = figureWords(value, { decimals });
      return [large, ...small].join(', ');
    },
    (value: FigureValue | undefined) => (value?.kind === 'number' ? String(value.value) : '—'),
  ];
  const telling = forms.find((form) => form(signed) !== form(now)) ?? forms[0];
  return { signed: telling(signed), now: telling(now) };
}
