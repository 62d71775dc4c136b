import { useEffect, useMemo, useRef, useState } from 'react';
import type { ResultInput } from '../report/result-files';
import { asWork } from '../review/idle';
import { safeCode } from '../session/file-name';
import { useApp, useSession } from './app-context';
import { Dialog } from './dialog';
import { download } from './download';
import { pngOf } from './png-of-svg';
import type { ResultFile } from './results-making';

/** What each file holds, for the list. */
const HOLDS: Readonly<Record<string, string>> = {
  'beats.csv': 'every beat with its class and interval',
  'epochs.csv': 'every epoch of every slow-wave lead',
  'minutes.csv': 'stomach and heart, minute by minute',
  'spans.csv': 'spoiled spans',
  'findings.json': 'every figure with its evidence and settings',
  'report.html': 'the report as one file for any browser',
  'spectrogram.svg': 'spectrogram with dominant frequency',
  'slow-waves.svg': 'slow waves of the phases',
  'trend.svg': 'power, heart rate and breathing over the study',
  'separated.edf': 'slow waves and heartbeat as EDF+',
  'annotations.edf': 'beats, phases and spans as EDF+ annotations, to lie beside the recording',
};
const TYPES: readonly (readonly [ending: string, type: string])[] = [
  ['.csv', 'text/csv'],
  ['.json', 'application/json'],
  ['.html', 'text/html'],
  ['.svg', 'image/svg+xml'],
];
const typeOf = (name: string) =>
  TYPES.find(([ending]) => name.endsWith(ending))?.[1] ?? 'application/octet-stream';

type Making = typeof import('./results-making');

/** The files that leave the program: one by one or all together, with or without whose they are. */
export function ResultsDialog() {
  const { shell } = useApp();
  const code = useSession((state) => state.session?.state.study.code) ?? '';
  const [bare, setBare] = useState(false);
  const { input, making } = useResults();
  const files = useMemo(
    () => (input && making ? making.filesOf(input, bare) : null),
    [input, making, bare],
  );
  const close = () => shell.getState().closeDialog();
  const before = bare ? '' : `${safeCode(code)}-`;
  const all = bare ? 'results-without-identity.zip' : `${safeCode(code)}-results.zip`;
  return (
    <Dialog
      title="Download the results"
      subtitle="As the review stands now; the same bytes as the command line writes."
      onClose={close}
      actions={
        <>
          <button type="button" className="button" onClick={close}>
            Close
          </button>
          <button
            type="button"
            className="button strong"
            disabled={files === null}
            onClick={() => {
              if (files && making) download(all, making.storedZip(files), 'application/zip');
            }}
          >
            All as one zip
          </button>
        </>
      }
    >
      <label className="check-row">
        <input type="checkbox" checked={bare} onChange={(event) => setBare(event.target.checked)} />
        Without identity
      </label>
      <p className="small quiet">
        {bare
          ? 'X for code, name and sex; dates moved; no free text, reviewers, hash or file name. Ages over 89 are given as “over 89”.'
          : 'With the study’s code, dates and what people wrote.'}{' '}
        A heartbeat trace can itself identify a person: keep these files as you keep the recording.
      </p>
      {files && making ? (
        <FileTable files={files} making={making} before={before} />
      ) : (
        <p role="status">The results are being put together.</p>
      )}
    </Dialog>
  );
}

/** The parts of the results and the code that makes files of them, both got when the dialog opens; it closes where they cannot be had. */
function useResults(): { readonly input: ResultInput | null; readonly making: Making | null } {
  const { controller, shell } = useApp();
  const [state, setState] = useState<{ input: ResultInput; making: Making } | null>(null);
  const asked = useRef(false);
  useEffect(() => {
    if (asked.current) return;
    asked.current = true;
    const both = Promise.all([controller.gatherResults(), import('./results-making')]);
    void asWork(both).then(([input, making]) => {
      if (input) setState({ input, making });
      else if (shell.getState().dialog.kind === 'results') shell.getState().closeDialog();
    });
  }, [controller, shell]);
  return state ?? { input: null, making: null };
}

interface FileTableProps {
  readonly files: readonly ResultFile[];
  readonly making: Making;
  readonly before: string;
}

function FileTable({ files, making, before }: FileTableProps) {
  const { shell } = useApp();
  const savePng = async ({ name, content }: ResultFile) => {
    const png = await pngOf(String(content));
    if (png) download(`${before}${name.replace(/svg$/, 'png')}`, png, 'image/png');
    else shell.getState().sayProblem('This browser could not draw the picture as PNG; take SVG.');
  };
  return (
    <table className="results-table">
      <caption className="unseen">Files of results</caption>
      <tbody>
        {files.map((file) => (
          <tr key={file.name}>
            <th scope="row">{file.name}</th>
            <td>{HOLDS[file.name]}</td>
            <td>
              <div className="results-acts">
                {file.name.endsWith('.svg') ? (
                  <button
                    type="button"
                    className="button slight"
                    aria-label={`Download ${file.name} as PNG`}
                    onClick={() => void asWork(savePng(file))}
                  >
                    PNG
                  </button>
                ) : null}
                <button
                  type="button"
                  className="button slight"
                  aria-label={`Download ${file.name}`}
                  onClick={() =>
                    download(`${before}${file.name}`, making.bytesOf(file), typeOf(file.name))
                  }
                >
                  {file.name.endsWith('.svg') ? 'SVG' : 'Download'}
                </button>
              </div>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
