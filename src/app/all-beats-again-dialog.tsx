import { useApp } from './app-context';
import { Dialog } from './dialog';
import { FormActions } from './form-actions';

/** Asks before what was mended by hand is replaced by what the program finds. */
export function AllBeatsAgainDialog({ act }: { readonly act: () => void }) {
  const { shell } = useApp();
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="Find all beats again?"
      size="small"
      onClose={close}
      onSubmit={() => {
        close();
        act();
      }}
      actions={<FormActions stay="Leave them" go="Find all again" onStay={close} />}
    >
      <p>
        Beats were mended by hand. All of them would be replaced by what the program finds now; one
        undo brings them back. To look again at a stretch only, use “Find again…”.
      </p>
    </Dialog>
  );
}
