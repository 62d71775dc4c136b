import { editNumber } from '../session/store';
import type { PaneStores } from './row-view';

const GRACE_MS = 200;

/**
 * Whether the results belong to an older edit than the last one. A result that catches up within 200 ms never counts as
 * stale, so that mending beat after beat does not make the panes flicker.
 */
export class Staleness {
  stale = false;
  private timer = 0;
  private readonly stops: readonly (() => void)[];

  constructor(
    private readonly stores: PaneStores,
    private readonly changed: () => void,
  ) {
    const check = () => this.check();
    this.stops = [stores.session.subscribe(check), stores.analysis.subscribe(check)];
    check();
  }

  private behind(): boolean {
    const { session } = this.stores.session.getState();
    const { edit, findings } = this.stores.analysis.getState();
    return session !== null && findings !== null && edit < editNumber(session);
  }

  private check(): void {
    const behind = this.behind();
    if (behind && !this.stale && this.timer === 0)
      this.timer = window.setTimeout(() => this.turn(this.behind()), GRACE_MS);
    if (!behind) this.turn(false);
  }

  private turn(stale: boolean): void {
    clearTimeout(this.timer);
    this.timer = 0;
    if (stale === this.stale) return;
    this.stale = stale;
    this.changed();
  }

  stop(): void {
    clearTimeout(this.timer);
    for (const stop of this.stops) stop();
  }
}
