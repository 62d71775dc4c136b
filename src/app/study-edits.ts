import type { Given, Proposal } from '../../workers/analysis-api';
import type { Reply } from '../recording/failure';
import { leadChannels, leadKey, sameLead } from '../recording/lead';
import type { Roles } from '../recording/roles';
import type { Settings } from '../recording/settings';
import type { Interval } from '../recording/span';
import type { AnalysisStore } from '../review/analysis-store';
import { applyChange } from '../session/apply-change';
import type { Change, Edit, Session, SessionState } from '../session/document';
import { addSpans, replaceAllBeats, replaceBeatsWithin, setField, sign } from '../session/edits';
import { freedForHeart } from '../session/freed-spans';
import { editNumber, type SessionStore } from '../session/store';
import { PROGRAM } from '../units/program';
import { secondsToTicks } from '../units/ticks';
import { withReviewer } from './app-context';
import type { SignRequest, StudyController } from './controller';
import type { ShellStore } from './shell-store';

interface EditParts {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly shell: ShellStore;
  readonly propose: (given: Given) => Promise<Reply<Proposal>>;
}

type EditActs = Pick<
  StudyController,
  'changeRoles' | 'changePhases' | 'changeSettings' | 'changeProtocol' | 'detectAgain' | 'sign'
>;

export interface StudyEdits {
  readonly acts: EditActs;
  /**
   * Takes over an edit that lets a stretch count for the heart again: its beats are looked for, and both are one undo step.
   * False where the edit does no such thing and is to be applied as it is.
   */
  readonly findsFreed: (edit: Edit) => boolean;
}

const joined = (name: string, edits: readonly Edit[]): Edit => ({
  name,
  changes: edits.flatMap((one): readonly Change[] => one.changes),
});

/** True where the beats of one can stand for the other: the same heart lead, parted in the same way. */
function sameBeatsUnder(a: SessionState, roles: Roles, settings: Settings): boolean {
  const { heart } = a.roles;
  const sameHeart =
    heart === null ? roles.heart === null : roles.heart !== null && sameLead(heart, roles.heart);
  return sameHeart && a.settings.heartRoute === settings.heartRoute;
}

/** Acts that change what the session says; where beats or proposals must be made anew, both are one undo step. */
export function createStudyEdits({ session, analysis, shell, propose }: EditParts): StudyEdits {
  const now = () => new Date().toISOString();

  function withOpen(act: (open: Session) => void): void {
    withReviewer({ session, shell }, () => {
      const open = session.getState().session;
      if (open) act(open);
    });
  }

  function apply(edit: Edit): void {
    session.getState().apply(edit);
  }

  async function changeLeads(open: Session, roles: Roles, settings: Settings, rest: Edit) {
    const { state } = open;
    const reply = await propose({ roles, phases: state.phases, spans: null, settings });
    if (!reply.ok) {
      if (reply.failure.kind === 'cancelled')
        shell.getState().say('Stopped. The leads and the route are as they were.');
      else shell.getState().openDialog({ kind: 'failure', failure: reply.failure });
      return;
    }
    const latest = session.getState().session;
    if (!latest || latest.state.study.quickKey !== state.study.quickKey) return;
    const known = new Set(
      [...state.roles.slow, ...(state.roles.heart ? [state.roles.heart] : [])].map(leadKey),
    );
    const fresh = reply.value.spans.filter(({ lead }) => lead !== null && !known.has(lead));
    const beats = sameBeatsUnder(latest.state, roles, settings)
      ? []
      : [replaceAllBeats(latest.state, reply.value.beats, 'detect beats')];
    apply(joined(rest.name, [rest, addSpans(latest, fresh, 'propose spans'), ...beats]));
  }

  const acts: EditActs = {
    changeRoles(roles, reason) {
      withOpen((open) => {
        const { state } = open;
        const rest = joined('change leads', [
          setField(state, 'roles', roles, 'change leads'),
          ...(reason === '' ? [] : [setField(state, 'leadChoice', reason, 'say why')]),
        ]);
        if (rest.changes.length > 0) void changeLeads(open, roles, state.settings, rest);
      });
    },
    changeSettings(settings) {
      withOpen((open) => {
        const rest = setField(open.state, 'settings', settings, 'change settings');
        if (rest.changes.length === 0) return;
        if (sameBeatsUnder(open.state, open.state.roles, settings)) apply(rest);
        else void changeLeads(open, open.state.roles, settings, rest);
      });
    },
    changePhases: (phases) =>
      withOpen((open) => apply(setField(open.state, 'phases', phases, 'change phases'))),
    changeProtocol: (protocol) =>
      withOpen((open) => apply(setField(open.state, 'protocol', protocol, 'change protocol'))),
    detectAgain() {
      withOpen((open) => {
        const { roles, phases, spans, settings } = open.state;
        void propose({ roles, phases, spans, settings }).then((reply) => {
          const latest = session.getState().session;
          if (reply.ok && latest)
            apply(replaceAllBeats(latest.state, reply.value.beats, 'detect beats again'));
          else if (!reply.ok && reply.failure.kind !== 'cancelled')
            shell.getState().openDialog({ kind: 'failure', failure: reply.failure });
        });
      });
    },
    sign(request) {
      withOpen((open) => signWith(open, request));
    },
  };

  async function withFreedBeats(
    edit: Edit,
    after: SessionState,
    freed: readonly Interval[],
    rateHz: number,
  ) {
    const { roles, phases, spans, settings } = after;
    const reply = await propose({ roles, phases, spans, settings });
    const latest = session.getState().session;
    if (!latest || latest.state.study.quickKey !== after.study.quickKey) return;
    if (!reply.ok) {
      apply(edit);
      return;
    }
    const { beats } = reply.value;
    const found = freed.map(({ fromS, toS }) =>
      replaceBeatsWithin(
        latest.state,
        secondsToTicks(fromS, rateHz),
        secondsToTicks(toS, rateHz),
        beats,
        edit.name,
      ),
    );
    apply(joined(edit.name, [edit, ...found]));
  }

  return {
    acts,
    findsFreed(edit) {
      const open = session.getState().session;
      const { recording, fileAtHand } = analysis.getState();
      const heart = open?.state.roles.heart;
      if (!open || !recording || !heart || !fileAtHand) return false;
      if (!edit.changes.some(({ kind }) => kind === 'spans')) return false;
      const after = edit.changes.reduce(applyChange, open.state);
      const { rateHz } = recording.channels[leadChannels(heart)[0]];
      const freed = freedForHeart(open.state, after, rateHz);
      if (freed.length > 0) void withFreedBeats(edit, after, freed, rateHz);
      return freed.length > 0;
    },
  };

  function signWith(
    open: Session,
    { meaning, name, reason, notes, conclusion }: SignRequest,
  ): void {
    const words = joined('write the conclusion', [
      setField(open.state, 'notes', notes, 'write remarks'),
      setField(open.state, 'conclusion', conclusion, 'write the conclusion'),
    ]);
    if (words.changes.length > 0) apply(words);
    const current = session.getState().session;
    const { findings, edit } = analysis.getState();
    if (!current || !findings || edit !== editNumber(current)) {
      shell.getState().sayProblem('The figures are not up to date yet. Sign once they are.');
      return;
    }
    const { study, settings } = current.state;
    apply(
      sign(current.state, {
        meaning,
        name,
        atUtc: now(),
        edit,
        program: PROGRAM,
        sha256: study.sha256,
        reason,
        settings,
        findings,
        notes,
        conclusion,
      }),
    );
    shell.getState().say(`Signed by ${name}.`);
  }
}
