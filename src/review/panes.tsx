import 'uplot/dist/uPlot.min.css';
import './panes.css';
import './rows.css';
import { MinutesPane } from './minutes-pane';
import type { PaneProps } from './pane-props';
import { SecondsPane } from './seconds-pane';
import { WholeStudyPane } from './whole-study-pane';

export type { PaneProps };
export { MinutesPane, SecondsPane, WholeStudyPane };

/** Minutes above Seconds, as high as their place. */
export function TracePanes(props: PaneProps) {
  return (
    <div className="trace-panes">
      <MinutesPane {...props} />
      <SecondsPane {...props} />
    </div>
  );
}

/** The three panes on one clock, one below the other, where nothing stands beside them. */
export function Panes(props: PaneProps) {
  return (
    <div className="panes">
      <WholeStudyPane {...props} />
      <TracePanes {...props} />
    </div>
  );
}
