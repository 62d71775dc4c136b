import { useAnalysis } from './app-context';

/** What is being done, how far it is, and the way to stop it. */
export function ProgressLine() {
  const progress = useAnalysis((state) => state.progress);
  if (!progress) return null;
  const percent = Math.round(100 * Math.min(1, Math.max(0, progress.done)));
  return (
    <section className="progress-line" aria-label="Work under way">
      <progress max={100} value={percent} aria-label={progress.step} />
      <span>
        {progress.step}, {percent} %
      </span>
      <button type="button" className="button slight" onClick={progress.stop}>
        Stop
      </button>
    </section>
  );
}
