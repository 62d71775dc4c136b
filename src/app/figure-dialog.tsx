import { useStore } from 'zustand';
import { withEvidenceMarks } from '../recording/evidence/evidence-marks';
import { besideNoneWords } from '../recording/evidence/planted-words';
import { FIGURES, type FigureDefinition } from '../recording/figure-catalogue';
import { FIGURE_MEANINGS } from '../recording/figure-meanings';
import type { PhaseFindings } from '../recording/findings';
import type { Settings } from '../recording/settings';
import { rangeGrounds, rangesOf, rangeWords } from '../recording/site-reference';
import { evidenceAt } from '../review/evidence-store';
import { goToStretch } from '../review/findings-go';
import { figureWords, stretchWords } from '../review/findings-words';
import { useAnalysis, useApp, useSession, useShell } from './app-context';
import { Dialog } from './dialog';
import { EpochTable, SegmentTable } from './figure-data';
import { FigureHistory } from './figure-history';
import { FigureRangesList } from './figure-ranges';

interface FigureDialogProps {
  /** Key of the figure catalogue, and the name of the phase or part of it. */
  readonly figure: string;
  readonly phase: string;
}

/** One figure: its value, what it means, where that comes from, the settings in force, and the data behind it. */
export function FigureDialog({ figure, phase }: FigureDialogProps) {
  const { shell, view, evidence } = useApp();
  const settings = useSession((state) => state.session?.state.settings);
  const figures = useAnalysis((state) => state.findings);
  const edit = useAnalysis((state) => state.edit);
  const found = useStore(evidence, (state) => state.found);
  const findings = figures && withEvidenceMarks(figures, evidenceAt(found, edit));
  const definition = FIGURES.find((one) => one.key === figure);
  const part = findings?.phases.find((one) => one.name === phase);
  if (!definition || !part || !settings) return null;
  const close = () => shell.getState().closeDialog();
  const go = (fromS: number, toS: number) => {
    close();
    goToStretch(view, fromS, toS);
  };
  return (
    <Dialog
      title={definition.label}
      subtitle={`${part.name}, ${stretchWords(part.fromS, part.toS)}`}
      onClose={close}
      actions={
        <>
          <button type="button" className="button" onClick={() => go(part.fromS, part.toS)}>
            Go to {part.name}
          </button>
          <button type="button" className="button strong" onClick={close}>
            Close
          </button>
        </>
      }
    >
      <FigureFacts definition={definition} part={part} settings={settings} />
      <FigureRangesList definition={definition} part={part.name} />
      {figure === 'time_none_pct' ? <WouldHaveBeenFound /> : null}
      <FigureHistory definition={definition} part={part.name} />
      {definition.organ === 'stomach' ? <EpochTable part={part} onGo={go} /> : null}
      {definition.organ === 'heart' ? <SegmentTable part={part} onGo={go} /> : null}
    </Dialog>
  );
}

/** Beside "no rhythm": how large a wave would have been found, once that is known; grey while it is of an earlier edit. */
function WouldHaveBeenFound() {
  const { evidence } = useApp();
  const planted = useStore(evidence, (state) => state.found.planted);
  const edit = useSession(({ session }) => session?.log.length ?? 0);
  const words = planted ? besideNoneWords(planted.value) : null;
  if (words === null) return null;
  return <p className={planted?.edit === edit ? undefined : 'stale'}>{words}</p>;
}

interface FigureFactsProps {
  readonly definition: FigureDefinition;
  readonly part: PhaseFindings;
  readonly settings: Settings;
}

function FigureFacts({ definition, part, settings }: FigureFactsProps) {
  const { large, small } = figureWords(part.figures[definition.key], definition);
  const meaning = FIGURE_MEANINGS[definition.key];
  const reference = useShell((state) => state.siteReference);
  const protocol = useSession((state) => state.session?.state.protocol);
  const ranges =
    reference && protocol ? rangesOf(reference.reference, protocol)(definition.key, part) : [];
  return (
    <>
      <p className="figure-value">
        <strong>
          {large} {large === '—' ? '' : definition.unit}
        </strong>{' '}
        <span className="quiet">{small.join('; ')}</span>
      </p>
      <dl className="facts-list">
        <div>
          <dt>Meaning</dt>
          <dd>{meaning.definition}</dd>
        </div>
        <div>
          <dt>Source</dt>
          <dd>{meaning.source}</dd>
        </div>
        <div>
          <dt>Settings</dt>
          <dd>{meaning.settings(settings)}</dd>
        </div>
        {ranges.map((range) => (
          <div key={rangeGrounds(range)}>
            <dt>Reference of this site</dt>
            <dd>
              {rangeWords(range)} {definition.unit} ({rangeGrounds(range)})
            </dd>
          </div>
        ))}
      </dl>
    </>
  );
}
