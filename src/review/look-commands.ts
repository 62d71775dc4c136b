import { leadsShownNow } from './leads-shown';
import { goTo, panBy, type WindowName, zoomAt } from './navigate';
import type { PaneActs } from './pane-acts';
import type { PaneStores } from './row-view';
import { lookAtMinutes, lookAtSeconds, MINUTES_WIDTH_S, SECONDS_WIDTH_S } from './view-store';

/** Acts that move and zoom the panes. */
export interface LookCommands {
  minutesLeft(): void;
  minutesRight(): void;
  minutesIn(): void;
  minutesOut(): void;
  secondsLeft(): void;
  secondsRight(): void;
  secondsIn(): void;
  secondsOut(): void;
  /** Seconds by a whole window: reading page by page. */
  secondsPageLeft(): void;
  secondsPageRight(): void;
  /** Both widths as at the beginning. */
  usualWidths(): void;
  goTo(atS: number): void;
  home(): void;
  end(): void;
  toggleTool(): void;
  /** Minutes draws every slow-wave lead, or only the reported one. */
  toggleLeads(): void;
}

const PAN_SHARE = 0.25;
const PAGE_SHARE = 0.9;
const ZOOM = 1.5;

/** Makes the acts that move and zoom. */
export function lookCommands({ view }: PaneStores, act: PaneActs): LookCommands {
  const pan = (name: WindowName, share: number) => () => {
    const { fromS, toS } = view.getState()[name];
    panBy(view, name, share * (toS - fromS));
  };
  const zoom = (name: WindowName, factor: number) => () => {
    const state = view.getState();
    const { fromS, toS } = state[name];
    const { cursorS, seconds } = state;
    const inside = cursorS !== null && cursorS >= fromS && cursorS <= toS;
    const middle = name === 'minutes' ? (seconds.fromS + seconds.toS) / 2 : (fromS + toS) / 2;
    zoomAt(view, name, inside ? cursorS : middle, factor);
  };
  const goToEnd = (atS: number) => {
    lookAtMinutes(view, atS);
    lookAtSeconds(view, atS);
  };
  return {
    minutesLeft: pan('minutes', -PAN_SHARE),
    minutesRight: pan('minutes', PAN_SHARE),
    minutesIn: zoom('minutes', 1 / ZOOM),
    minutesOut: zoom('minutes', ZOOM),
    secondsLeft: pan('seconds', -PAN_SHARE),
    secondsRight: pan('seconds', PAN_SHARE),
    secondsIn: zoom('seconds', 1 / ZOOM),
    secondsOut: zoom('seconds', ZOOM),
    secondsPageLeft: pan('seconds', -PAGE_SHARE),
    secondsPageRight: pan('seconds', PAGE_SHARE),
    usualWidths: () => {
      const { fromS, toS } = view.getState().seconds;
      const middle = (fromS + toS) / 2;
      lookAtMinutes(view, middle, MINUTES_WIDTH_S);
      lookAtSeconds(view, middle, SECONDS_WIDTH_S);
    },
    goTo: (atS) => goTo(view, atS),
    home: () => goToEnd(0),
    end: () => goToEnd(view.getState().durationS),
    toggleTool: () => {
      const tool = view.getState().tool === 'look' ? 'exclude' : 'look';
      view.setState({ tool });
      act.say(tool === 'look' ? 'Dragging moves' : 'Dragging excludes a stretch');
    },
    toggleLeads: () => {
      const leadsShown = leadsShownNow(view) === 'all' ? 'reported' : 'all';
      view.setState({ leadsShown });
      act.say(leadsShown === 'all' ? 'All slow-wave leads' : 'The reported lead only');
    },
  };
}
