import { AboutDialog } from './about-dialog';
import { useShell } from './app-context';
import type { PageActs } from './command';
import { FigureDialog } from './figure-dialog';
import { GoToDialog } from './go-to-dialog';
import { IdentityDialog } from './identity-dialog';
import { KeysDialog } from './keys-dialog';
import { PhasesDialog } from './phases-dialog';
import { ProtocolDialog } from './protocol-dialog';
import { RolesDialog } from './roles-dialog';
import { SettingsDialog } from './settings-dialog';
import type { DialogState } from './shell-store';
import { SignDialog } from './sign-dialog';
import { FailureDialog, ReviewerDialog, SameFileDialog, TextReadingDialog } from './small-dialogs';

/** The open dialog, and the one below a reviewer's dialog. */
export function Dialogs({ page }: { readonly page: PageActs }) {
  const dialog = useShell((state) => state.dialog);
  const under = useShell((state) => state.under);
  const shown = [under, dialog].filter((one) => one.kind !== 'none');
  return shown.map((one) => <OneDialog key={one.kind} state={one} page={page} />);
}

interface OneDialogProps {
  readonly state: DialogState;
  readonly page: PageActs;
}

function OneDialog({ state, page }: OneDialogProps) {
  switch (state.kind) {
    case 'none':
      return null;
    case 'identity':
      return <IdentityDialog key={state.quickKey} state={state} />;
    case 'reviewer':
      return <ReviewerDialog act={state.act} />;
    case 'roles':
      return <RolesDialog />;
    case 'phases':
      return <PhasesDialog />;
    case 'protocol':
      return <ProtocolDialog />;
    case 'settings':
      return <SettingsDialog />;
    case 'go-to':
      return <GoToDialog />;
    case 'keys':
      return <KeysDialog />;
    case 'about':
      return <AboutDialog />;
    case 'sign':
      return <SignDialog />;
    case 'text-reading':
      return <TextReadingDialog file={state.file} failure={state.failure} />;
    case 'failure':
      return <FailureDialog failure={state.failure} />;
    case 'figure':
      return <FigureDialog figure={state.key} phase={state.phase} />;
    case 'choose-same-file':
      return <SameFileDialog code={state.code} page={page} />;
  }
}
