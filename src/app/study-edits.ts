import type { Given, Proposal } from '../../workers/analysis-api';
import type { Reply } from '../recording/failure';
import { leadChannels, leadKey, sameLead } from '../recording/lead';
import type { Roles } from '../recording/roles';
import type { Settings } from '../recording/settings';
import type { Interval } from '../recording/span';
import type { AnalysisStore } from '../review/analysis-store';
import { asWork } from '../review/idle';
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
import { NOT_CONFIRMED } from './study-files';

/** What the beats were found under; they stand for another study state where this is the same. */
const foundUnder = ({ heartRoute, heartBandHz, fractional }: Settings): string =>
  JSON.stringify([heartRoute, heartBandHz, heartRoute === 'fractional' && fractional]);

interface EditParts {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly shell: ShellStore;
  readonly propose: (given: Given) => Promise<Reply<Proposal>>;
  /** Computes again from the session as it stands, after a proposal that was not taken. */
  readonly refresh: () => void;
  /** Settles once it is sure which file is open. */
  readonly confirmed: () => Promise<boolean>;
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

/** Keys of every lead that proposed spans were taken over for, also those taken out since. */
function leadsOfLog({ start, state, log }: Session): ReadonlySet<string> {
  const roles = log.flatMap(({ act }) =>
    act.kind === 'edit'
      ? act.edit.changes.flatMap((change) =>
          change.kind === 'field' && change.field === 'roles' ? [change.before, change.after] : [],
        )
      : [],
  );
  const leads = [start.roles, state.roles, ...roles].flatMap(({ slow, heart }) =>
    heart ? [...slow, heart] : slow,
  );
  return new Set(leads.map(leadKey));
}

const joined = (name: string, edits: readonly Edit[]): Edit => ({
  name,
  changes: edits.flatMap((one): readonly Change[] => one.changes),
});

const sameHeartLead = ({ heart }: Roles, other: Roles): boolean =>
  heart === null ? other.heart === null : other.heart !== null && sameLead(heart, other.heart);

/** True where a person has changed single beats since all of them were found. */
function beatsWereMended({ log }: Session): boolean {
  const changes = log.flatMap(({ act }) => (act.kind === 'edit' ? act.edit.changes : []));
  const found = changes.findLastIndex(({ kind }) => kind === 'all-beats');
  const mended = changes.slice(found + 1).some(({ kind }) => kind === 'beats');
  return mended;
}

/**
 * What happens to the beats under other roles and settings: of another heart lead they are found anew; under another route or
 * band of the heartbeat too, unless a person has mended them.
 */
function fateOfBeats(
  open: Session,
  roles: Roles,
  settings: Settings,
): 'keep' | 'keep-mended' | 'find' {
  const { state } = open;
  if (!sameHeartLead(state.roles, roles)) return 'find';
  if (foundUnder(state.settings) === foundUnder(settings)) return 'keep';
  return beatsWereMended(open) ? 'keep-mended' : 'find';
}

/** Acts that change what the session says; where beats or proposals must be made anew, both are one undo step. */
export function createStudyEdits(parts: EditParts): StudyEdits {
  const { session, analysis, shell, propose, refresh, confirmed } = parts;
  const now = () => new Date().toISOString();
  /** True while beats are looked for in a stretch that is to count again. */
  let freeing = false;

  function withOpen(act: (open: Session) => void): void {
    withReviewer({ session, shell }, () => {
      const open = session.getState().session;
      if (open) act(open);
    });
  }

  function apply(edit: Edit): void {
    session.getState().apply(edit);
  }

  /** A proposal for the session as it stands; null where it failed or the session has moved on meanwhile. */
  async function proposed(
    open: Session,
    given: Given,
    stopped: string,
  ): Promise<{ readonly proposal: Proposal; readonly latest: Session } | null> {
    const reply = await propose(given);
    const latest = session.getState().session;
    const { quickKey } = open.state.study;
    if (latest?.state.study.quickKey !== quickKey) return null;
    if (reply.ok && latest.log === open.log) return { proposal: reply.value, latest };
    refresh();
    if (reply.ok) shell.getState().say('The session was changed meanwhile. Do it once more.');
    else if (reply.failure.kind === 'cancelled') shell.getState().say(stopped);
    else shell.getState().openDialog({ kind: 'failure', failure: reply.failure });
    return null;
  }

  async function changeLeads(open: Session, roles: Roles, settings: Settings, rest: Edit) {
    const { state } = open;
    const given: Given = { roles, phases: state.phases, spans: null, settings };
    const found = await proposed(open, given, 'Stopped. Leads and settings are as they were.');
    if (!found) return;
    const { proposal, latest } = found;
    const known = leadsOfLog(latest);
    const fresh = proposal.spans.filter(({ lead }) => lead !== null && !known.has(lead));
    const fate = fateOfBeats(latest, roles, settings);
    const beats =
      fate === 'find' ? [replaceAllBeats(latest.state, proposal.beats, 'detect beats')] : [];
    apply(joined(rest.name, [rest, addSpans(latest, fresh, 'propose spans'), ...beats]));
  }

  function findAllAgain(open: Session): void {
    const { roles, phases, spans, settings } = open.state;
    const given: Given = { roles, phases, spans, settings };
    void proposed(open, given, 'Stopped. The beats are as they were.').then((found) => {
      if (found)
        apply(replaceAllBeats(found.latest.state, found.proposal.beats, 'detect beats again'));
    });
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
        const fate = fateOfBeats(open, open.state.roles, settings);
        if (fate === 'find') void changeLeads(open, open.state.roles, settings, rest);
        else apply(rest);
        if (fate === 'keep-mended')
          shell
            .getState()
            .say('The mended beats stay. “Find the beats again” looks for all of them anew.');
      });
    },
    changePhases: (phases) =>
      withOpen((open) => apply(setField(open.state, 'phases', phases, 'change phases'))),
    changeProtocol: (protocol) =>
      withOpen((open) => apply(setField(open.state, 'protocol', protocol, 'change protocol'))),
    detectAgain() {
      withOpen((open) => {
        if (!beatsWereMended(open)) findAllAgain(open);
        else
          shell.getState().openDialog({
            kind: 'all-beats-again',
            act: () => withOpen((now) => findAllAgain(now)),
          });
      });
    },
    sign(request) {
      withOpen((open) => {
        void asWork(confirmed()).then((sure) => {
          if (!sure) shell.getState().sayProblem(NOT_CONFIRMED);
          else signWith(request, open.state.study.quickKey);
        });
      });
    },
  };

  async function withFreedBeats(
    open: Session,
    edit: Edit,
    after: SessionState,
    freed: readonly Interval[],
    rateHz: number,
  ) {
    const { roles, phases, spans, settings } = after;
    const given: Given = { roles, phases, spans, settings };
    const found = await proposed(open, given, 'Stopped. The span is as it was.');
    freeing = false;
    if (!found) return;
    const beats = freed.map(({ fromS, toS }) =>
      replaceBeatsWithin(
        found.latest.state,
        secondsToTicks(fromS, rateHz),
        secondsToTicks(toS, rateHz),
        found.proposal.beats,
        edit.name,
      ),
    );
    apply(joined(edit.name, [edit, ...beats]));
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
      if (freed.length === 0) return false;
      if (freeing) shell.getState().say('Beats of the span before are still being looked for.');
      else {
        freeing = true;
        void withFreedBeats(open, edit, after, freed, rateHz);
      }
      return true;
    },
  };

  function signWith(
    { meaning, name, reason, notes, conclusion }: SignRequest,
    quickKey: string,
  ): void {
    const open = session.getState().session;
    if (open?.state.study.quickKey !== quickKey) return;
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
