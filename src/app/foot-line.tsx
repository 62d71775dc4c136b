import { useAnalysis, useShell } from './app-context';

/** The line at the foot of the page: what the last act did, and the work under way with the way to stop it. */
export function FootLine() {
  const status = useShell((state) => state.status);
  return (
    <footer className="foot-line">
      <p className="foot-status" role="status">
        {status}
      </p>
      <Work />
    </footer>
  );
}

function Work() {
  const progress = useAnalysis((state) => state.progress);
  if (!progress) return null;
  const percent = Math.round(100 * Math.min(1, Math.max(0, progress.done)));
  return (
    <section className="work" aria-label="Work under way">
      <span>
        {progress.step}, {percent} %
      </span>
      <progress max={100} value={percent} aria-label={progress.step} />
      <button type="button" className="button slight" onClick={progress.stop}>
        Stop
      </button>
    </section>
  );
}
