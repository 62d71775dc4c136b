import type { HashClient } from '../../workers/hash-client';
import { type Failure, Refusal } from '../recording/failure';
import { confirmStudy } from '../session/confirm-study';
import type { Session } from '../session/document';
import type { KeptReport } from '../session/keep-writes';
import { type Keeper, whereKept } from '../session/keeper';
import { editNumber, type SessionStore } from '../session/store';
import type { ShellStore } from './shell-store';

/** Keeps every edit of the open session in this browser as it is made, and says where the work is. */
export interface StudyKeeping {
  /** Begins to keep a session that is not kept yet, or goes on with one that is. */
  begin(session: Session): Promise<void>;
  /**
   * Reads the whole file for its SHA-256 and confirms the session by it. Where it belongs to another file, keeping ends and
   * `otherFile` is told.
   */
  confirm(file: Blob, otherFile: (failure: Failure) => void): void;
  /** Settles once the open study's SHA-256 is confirmed; false where it could not be. */
  confirmed(): Promise<boolean>;
  /** Says that the session stands in a file now. */
  inFile(fileName: string): void;
  end(): void;
}

interface KeepingParts {
  readonly keeper: Keeper;
  readonly hash: HashClient;
  readonly session: SessionStore;
  readonly shell: ShellStore;
}

const keyOf = (session: Session | null): string | undefined => session?.state.study.quickKey;

export function createStudyKeeping({ keeper, hash, session, shell }: KeepingParts): StudyKeeping {
  let begun: string | undefined;
  let saidWhy = '';
  let hashing: AbortController | null = null;
  let confirming: Promise<boolean> = Promise.resolve(false);
  let settle: (confirmed: boolean) => void = () => undefined;
  const current = () => session.getState();

  function told(report: KeptReport): void {
    const { session: open, kept } = current();
    if (!open || keyOf(open) !== begun) return;
    const newerInFile = kept.kind === 'file' && kept.edit >= report.edit;
    if (!newerInFile) current().setKept(whereKept(report));
    const why = report.journal?.message ?? '';
    if (why !== '' && why !== saidWhy) shell.getState().sayProblem(why);
    saidWhy = why;
  }

  function keep(open: Session): void {
    current().setKept({ kind: 'saving', edit: editNumber(open) });
    void keeper.append(open).then(told);
  }

  document.addEventListener('visibilitychange', () => {
    if (document.visibilityState === 'hidden') void keeper.snapshot();
  });

  session.subscribe((now, before) => {
    const grown = now.session && now.session.log !== before.session?.log;
    if (grown && begun !== undefined && keyOf(now.session) === begun) keep(now.session);
  });

  return {
    async begin(open) {
      const where = current();
      begun = keyOf(open);
      settle(false);
      confirming = new Promise((resolve) => {
        settle = resolve;
      });
      where.setKept({ kind: 'saving', edit: editNumber(open) });
      told(await keeper.begin(open));
    },
    confirm(file, otherFile) {
      hashing?.abort();
      hashing = new AbortController();
      const confirmed = hash.hash(file, { signal: hashing.signal }).then((reply) => {
        const open = current().session;
        if (!reply.ok || !open || keyOf(open) !== begun) return false;
        try {
          const known = confirmStudy(open, reply.value, open.state.study.quickKey);
          if (known !== open) {
            session.setState({ session: known });
            void keeper.begin(known).then(told);
          }
          return true;
        } catch (error) {
          if (!(error instanceof Refusal)) throw error;
          otherFile(error.failure);
          return false;
        }
      });
      void confirmed.then(settle);
    },
    confirmed: () => confirming,
    inFile(fileName) {
      const open = current().session;
      if (!open) return;
      current().setKept({ kind: 'file', edit: editNumber(open), fileName });
    },
    end() {
      hashing?.abort();
      begun = undefined;
      settle(false);
      keeper.close();
    },
  };
}
