import { lazy, Suspense } from 'react';
import { asWork } from '../review/idle';
import { useShell } from './app-context';
import type { CommandParts } from './command';
import { IdentityDialog } from './identity-dialog';
import type { DialogState } from './shell-store';
import { FailureDialog, ReviewerDialog } from './small-dialogs';

type Later = typeof import('./later-dialogs');

/** A dialog that is fetched when it is opened first, since most visits open few of them. */
const later = <K extends keyof Later>(name: K) =>
  lazy<Later[K]>(() => asWork(import('./later-dialogs')).then((all) => ({ default: all[name] })));

const AboutDialog = later('AboutDialog');
const AllBeatsAgainDialog = later('AllBeatsAgainDialog');
const BeatsBetweenDialog = later('BeatsBetweenDialog');
const AddBookmarkDialog = later('AddBookmarkDialog');
const BookmarksDialog = later('BookmarksDialog');
const CompareDialog = later('CompareDialog');
const EvidenceDialog = later('EvidenceDialog');
const FigureDialog = later('FigureDialog');
const FindWithinDialog = later('FindWithinDialog');
const GoToDialog = later('GoToDialog');
const KeysDialog = later('KeysDialog');
const LookAlikesDialog = later('LookAlikesDialog');
const LogDialog = later('LogDialog');
const NotesDialog = later('NotesDialog');
const PhasesDialog = later('PhasesDialog');
const ProtocolDialog = later('ProtocolDialog');
const ResultsDialog = later('ResultsDialog');
const RolesDialog = later('RolesDialog');
const SameFileDialog = later('SameFileDialog');
const SettingsDialog = later('SettingsDialog');
const SignDialog = later('SignDialog');
const SiteReferenceDialog = later('SiteReferenceDialog');
const SpansDialog = later('SpansDialog');
const TextReadingDialog = later('TextReadingDialog');

/** The open dialog, and the one below a reviewer's dialog. */
export function Dialogs({ parts }: { readonly parts: CommandParts }) {
  const dialog = useShell((state) => state.dialog);
  const under = useShell((state) => state.under);
  const shown = [under, dialog].filter((one) => one.kind !== 'none');
  return (
    <Suspense fallback={null}>
      {shown.map((one) => (
        <OneDialog key={one.kind} state={one} parts={parts} />
      ))}
    </Suspense>
  );
}

interface OneDialogProps {
  readonly state: DialogState;
  readonly parts: CommandParts;
}

function OneDialog({ state, parts }: OneDialogProps) {
  switch (state.kind) {
    case 'none':
      return null;
    case 'identity':
      return <IdentityDialog key={state.quickKey} state={state} />;
    case 'reviewer':
      return <ReviewerDialog act={state.act} />;
    case 'all-beats-again':
      return <AllBeatsAgainDialog act={state.act} />;
    case 'roles':
      return <RolesDialog />;
    case 'phases':
      return <PhasesDialog />;
    case 'spans':
      return <SpansDialog />;
    case 'notes':
      return <NotesDialog here={state.here} />;
    case 'protocol':
      return <ProtocolDialog />;
    case 'settings':
      return <SettingsDialog />;
    case 'go-to':
      return <GoToDialog />;
    case 'find-within':
      return <FindWithinDialog />;
    case 'beats-between':
      return <BeatsBetweenDialog parts={parts} />;
    case 'add-bookmark':
      return <AddBookmarkDialog />;
    case 'bookmarks':
      return <BookmarksDialog />;
    case 'site-reference':
      return <SiteReferenceDialog />;
    case 'keys':
      return <KeysDialog parts={parts} />;
    case 'about':
      return <AboutDialog />;
    case 'compare':
      return <CompareDialog parts={parts} />;
    case 'log':
      return <LogDialog page={parts.page} />;
    case 'sign':
      return <SignDialog />;
    case 'text-reading':
      return <TextReadingDialog file={state.file} failure={state.failure} />;
    case 'failure':
      return <FailureDialog failure={state.failure} />;
    case 'figure':
      return <FigureDialog figure={state.key} phase={state.phase} />;
    case 'results':
      return <ResultsDialog />;
    case 'evidence':
      return <EvidenceDialog first={state.page} />;
    case 'look-alikes':
      return <LookAlikesDialog doubtId={state.doubtId} />;
    case 'choose-same-file':
      return <SameFileDialog code={state.code} page={parts.page} />;
  }
}
