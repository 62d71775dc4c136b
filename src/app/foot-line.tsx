import { useAnalysis, useShell } from './app-context';

/** The line at the foot of the page: what the last act did, then what that did to the figures (read out alone), and the work under way with the way to stop it. */
export function FootLine() {
  const status = useShell((state) => state.status);
  const more = useShell((state) => state.statusMore);
  return (
    <footer className="foot-line">
      <p className="foot-status" role="status" aria-atomic="false">
        {status}
        {more === '' ? null : <span>; {more}</span>}
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
