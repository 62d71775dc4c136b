import { useEffect } from 'react';
import type { Findings } from '../recording/findings';
import type { AnalysisState } from '../review/analysis-store';
import { asWork } from '../review/idle';
import type { LogLine, Session } from '../session/document';
import type { AppParts } from './app-context';
import { signatureLost } from './signature-words';

/** What the foot line says of a new line of the log: the edit by its name; '' for undo and redo, which say so themselves. */
export function editStatus(line: LogLine): string {
  return line.act.kind === 'edit' ? `Done: ${line.act.edit.name}` : '';
}

/** True where one session is the other with more lines in its log. */
const grewFrom = (now: Session, before: Session): boolean =>
  now.start === before.start && now.log.length > before.log.length;

/** Calls once the act is over: signing writes its words first, as an edit of their own. */
function afterTheAct(
  session: AppParts['session'],
  was: Session,
  tell: (was: Session, is: Session) => void,
): void {
  queueMicrotask(() => {
    const is = session.getState().session;
    if (is && grewFrom(is, was)) tell(was, is);
  });
}

/** What an edit did to the figures, in words; what finds it is fetched with the first edit. */
async function figuresStatus(before: Findings, after: Findings): Promise<string> {
  const { mostMoved, movedWords } = await import('../recording/figure-moved');
  const moved = mostMoved(before, after);
  return moved ? movedWords(moved) : 'no figure changed';
}

/** The figures before and after, where those of a later edit of the same study have come. */
function newFigures(
  now: AnalysisState,
  before: AnalysisState,
): readonly [Findings, Findings] | null {
  if (!now.findings || !before.findings || now.findings === before.findings) return null;
  return now.recording === before.recording && now.edit > before.edit
    ? [before.findings, now.findings]
    : null;
}

/** Tells of each edit in the foot line, then of what it did to the figures, and of a signature that no longer stands. */
export function useEditStatus({
  session,
  shell,
  analysis,
}: Pick<AppParts, 'session' | 'shell' | 'analysis'>): void {
  useEffect(
    () =>
      session.subscribe((now, before) => {
        if (!now.session || !before.session || !grewFrom(now.session, before.session)) return;
        const last = now.session.log.at(-1);
        const status = last ? editStatus(last) : '';
        if (status !== '') shell.getState().tell(status);
        afterTheAct(session, before.session, (was, is) => {
          const lost = signatureLost(was, is);
          if (lost !== null) shell.getState().say(lost);
        });
      }),
    [session, shell],
  );
  useEffect(
    () =>
      analysis.subscribe((now, before) => {
        const figures = newFigures(now, before);
        if (!figures) return;
        const { status } = shell.getState();
        void asWork(figuresStatus(...figures)).then((more) => {
          if (shell.getState().status === status) shell.getState().tellMore(more);
        });
      }),
    [analysis, shell],
  );
}
