import { useState } from 'react';
import type { Failure } from '../recording/failure';
import { useApp } from './app-context';
import type { PageActs } from './command';
import { Dialog } from './dialog';
import { Choice, Field } from './fields';
import { FormActions } from './form-actions';
import { readNumber } from './number-field';
import { FailureWords } from './small-dialogs';

const UNITS = [
  ['', 'as the file says'],
  ['uV', 'µV'],
  ['mV', 'mV'],
  ['V', 'V'],
  ['nV', 'nV'],
] as const;

interface TextReadingProps {
  readonly file: File;
  readonly failure: Failure;
}

/** Asks for what a delimited text file does not say of itself, and opens it again. */
export function TextReadingDialog({ file, failure }: TextReadingProps) {
  const { controller, shell } = useApp();
  const [rate, setRate] = useState('');
  const [unit, setUnit] = useState<(typeof UNITS)[number][0]>('');
  const [tried, setTried] = useState(false);
  const read =
    rate.trim() === '' ? null : readNumber(rate, { least: 0.5, most: 100_000, unit: 'Hz' });
  const nothing = rate.trim() === '' && unit === '';
  const wrong = nothing
    ? 'Type the rate, or choose the unit below.'
    : read?.ok === false
      ? read.error
      : null;
  const close = () => shell.getState().closeDialog();
  return (
    <Dialog
      title="How is this text file to be read?"
      subtitle={file.name}
      size="small"
      onClose={close}
      onSubmit={() => {
        setTried(true);
        if (wrong !== null) return;
        close();
        void controller.openFile(file, {
          rateHz: read?.ok ? read.value : null,
          unit: unit === '' ? null : unit,
        });
      }}
      actions={<FormActions stay="Do not open" go="Open again" onStay={close} />}
    >
      <FailureWords failure={failure} />
      <Field
        label="Samples a second (leave empty where a time column says it)"
        value={rate}
        onChange={setRate}
        unit="Hz"
        size="short"
        inputMode="decimal"
        autoFocus
        error={tried ? wrong : null}
      />
      <Choice label="Unit of the values" value={unit} options={UNITS} onChange={setUnit} />
    </Dialog>
  );
}

interface SameFileProps {
  readonly code: string;
  readonly page: PageActs;
}

/** A kept or opened session needs its recording once more. */
export function SameFileDialog({ code, page }: SameFileProps) {
  const { shell, controller } = useApp();
  const notNow = () => controller.cancelOpening();
  return (
    <Dialog
      title="Choose the same file to go on"
      subtitle={`Session ${code}`}
      size="small"
      onClose={notNow}
      actions={
        <>
          <button type="button" className="button" onClick={notNow}>
            Not now
          </button>
          <button
            type="button"
            className="button strong"
            onClick={() => {
              shell.getState().closeDialog();
              page.chooseFile();
            }}
          >
            Choose the file…
          </button>
        </>
      }
    >
      <p>
        The review of this session is here as it was left: leads, phases, beats, spans, settings and
        the log. A browser cannot keep the recording itself, so choose its file once more; the
        traces are drawn and the figures computed again from it.
      </p>
      <p className="quiet">If another file is chosen, the program says so and opens nothing.</p>
    </Dialog>
  );
}
