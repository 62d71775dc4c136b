import './site-reference.css';
import { useRef, useState } from 'react';
import { FIGURES } from '../recording/figure-catalogue';
import { type KeptReference, rangeWords, type SiteRange } from '../recording/site-reference';
import { asWork } from '../review/idle';
import { browserStores } from '../session/browser-stores';
import { faultList, readSiteReference } from '../session/read-site-reference';
import { useApp, useShell, useView } from './app-context';
import { Dialog } from './dialog';
import { FileInput } from './file-input';
import { dropReference, keepReference } from './site-reference-kept';

/** What was wrong with a file that was chosen: its name and what to mend, line by line. */
interface Refused {
  readonly fileName: string;
  readonly lines: readonly string[];
}

/** The ranges that the site keeps for its figures: choosing their file, seeing them, taking them out of this browser. */
export function SiteReferenceDialog() {
  const { shell } = useApp();
  const kept = useShell((state) => state.siteReference);
  const [refused, setRefused] = useState<Refused | null>(null);
  const input = useRef<HTMLInputElement>(null);
  const close = () => shell.getState().closeDialog();
  const choose = useChoose(setRefused);
  return (
    <Dialog
      title="Reference values of the site"
      subtitle="Ranges that your own site keeps, shown beside the figures they fit with their source. None come with the program."
      size="large"
      onClose={close}
      actions={
        <>
          <button
            type="button"
            className={kept ? 'button' : 'button strong left'}
            onClick={() => input.current?.click()}
          >
            {kept ? 'Choose another file…' : 'Choose the file…'}
          </button>
          {kept ? (
            <button
              type="button"
              className="button left"
              onClick={() => {
                setRefused(null);
                dropReference(shell, browserStores().localStorage);
              }}
            >
              Remove from this browser
            </button>
          ) : null}
          <button type="button" className={kept ? 'button strong' : 'button'} onClick={close}>
            Close
          </button>
        </>
      }
    >
      <FileInput
        input={input}
        label="File with reference values"
        accept=".csv,.txt,.tsv"
        onFile={(file) => void asWork(choose(file))}
      />
      {refused ? <RefusedWords refused={refused} kept={kept !== null} /> : null}
      {kept ? <Ranges kept={kept} /> : <Explained />}
    </Dialog>
  );
}

function useChoose(setRefused: (refused: Refused | null) => void) {
  const { shell } = useApp();
  return async (file: File): Promise<void> => {
    const fileName = file.name;
    let text: string;
    try {
      text = await file.text();
    } catch {
      setRefused({ fileName, lines: ['The file could not be read. Choose it again.'] });
      return;
    }
    const read = readSiteReference(text);
    if (!read.ok) {
      setRefused({ fileName, lines: faultList(read.faults) });
      return;
    }
    setRefused(null);
    const storage = browserStores().localStorage;
    if (!keepReference(shell, storage, { fileName, reference: read.reference }, text))
      shell
        .getState()
        .sayProblem(
          'The reference values are in use, but this browser could not keep them: choose the file again next time.',
        );
  };
}

function RefusedWords({ refused, kept }: { readonly refused: Refused; readonly kept: boolean }) {
  return (
    <div role="alert">
      <p className="failure-what">
        {refused.fileName} was not taken{kept ? '; what was kept before stays' : ''}.
      </p>
      <ul>
        {refused.lines.map((line) => (
          <li key={line}>{line}</li>
        ))}
      </ul>
    </div>
  );
}

function Explained() {
  return (
    <>
      <p>
        The file is a table with one range a row, as a spreadsheet saves it (CSV UTF-8). Its columns
        are figure, phase, min_minutes, max_minutes, posture, meal, low, high, unit, population and
        source; the README describes them.{' '}
        <a
          className="site-example"
          href="./site-reference-example.csv"
          download="site-reference-example.csv"
        >
          An invented example, not for use
        </a>{' '}
        shows the form.
      </p>
      <p>
        A range stands beside a figure only where phase, length, posture and meal are those it was
        made for. It is never called normal or abnormal. The file stays in this browser.
      </p>
    </>
  );
}

function Ranges({ kept: { fileName, reference } }: { readonly kept: KeptReference }) {
  const hidden = useView((state) => state.identityHidden);
  return (
    <>
      <p>
        From {hidden ? 'a file' : fileName}, kept in this browser only. A range stands beside a
        figure, on the figure’s own page and in the report, only where phase, length, posture and
        meal are those it was made for.
      </p>
      <table className="site-ranges">
        <caption>
          {reference.ranges.length === 1 ? '1 range' : `${reference.ranges.length} ranges`}
        </caption>
        <thead>
          <tr>
            <th scope="col">figure</th>
            <th scope="col">phase</th>
            <th scope="col">minutes</th>
            <th scope="col">posture</th>
            <th scope="col">meal</th>
            <th scope="col">range</th>
            <th scope="col">population</th>
            <th scope="col">source</th>
          </tr>
        </thead>
        <tbody>
          {reference.ranges.map((range) => (
            <RangeRow key={JSON.stringify(range)} range={range} />
          ))}
        </tbody>
      </table>
    </>
  );
}

function RangeRow({ range }: { readonly range: SiteRange }) {
  const { figure, phase, minMinutes, maxMinutes, posture, meal, population, source } = range;
  const definition = FIGURES.find(({ key }) => key === figure);
  return (
    <tr>
      <th scope="row">{definition?.label ?? figure}</th>
      <td>{phase}</td>
      <td>{minMinutes === maxMinutes ? minMinutes : `${minMinutes}–${maxMinutes}`}</td>
      <td>{posture === '' ? 'any' : posture}</td>
      <td>{meal === '' ? 'any' : meal}</td>
      <td>
        {rangeWords(range)} {definition?.unit}
      </td>
      <td>{population}</td>
      <td>{source}</td>
    </tr>
  );
}
