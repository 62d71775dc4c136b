import type { Columns } from '../../workers/analysis-api';
import { type ColumnSpan, columnsServe, columnsWanted } from './column-windows';
import { asWork } from './idle';
import type { TimeWindow } from './view-store';

const RETRIES = 3;
const RETRY_MS = 200;

const pause = (ms: number): Promise<void> => new Promise((done) => setTimeout(done, ms));

/**
 * Keeps columns three windows wide for one row. One request is under way at a time; what was wanted meanwhile is asked when
 * it ends, so that a fast pan leaves no queue behind. A request that brings nothing is asked again three times.
 */
export class ColumnsFeed {
  held: Columns | null = null;
  private wanted: ColumnSpan | null = null;
  private asking = false;
  private generation = 0;

  constructor(
    private readonly ask: (span: ColumnSpan) => Promise<Columns | null>,
    private readonly changed: () => void,
  ) {}

  /** Says what is in view; asks for more where the held columns do not serve it. */
  see(view: TimeWindow, durationS: number, widthPx: number): void {
    if (!(view.toS > view.fromS) || widthPx < 2) return;
    if (this.held && columnsServe(this.held.request, view, durationS, widthPx)) {
      this.wanted = null;
      return;
    }
    if (this.wanted && columnsServe(this.wanted, view, durationS, widthPx)) return;
    this.wanted = columnsWanted(view, durationS, widthPx);
    if (!this.asking) void asWork(this.run());
  }

  /** Forgets what is held: the signal itself changed, or the row is gone. */
  drop(): void {
    this.generation += 1;
    this.held = null;
    this.wanted = null;
  }

  private async run(): Promise<void> {
    this.asking = true;
    let failures = 0;
    while (this.wanted && failures < RETRIES) {
      const span = this.wanted;
      const { generation } = this;
      const columns = await this.ask(span);
      if (generation !== this.generation) continue;
      if (columns) {
        this.held = columns;
        if (this.wanted === span) this.wanted = null;
        failures = 0;
        this.changed();
      } else if (this.wanted === span) {
        failures += 1;
        await pause(RETRY_MS);
      }
    }
    this.asking = false;
  }
}
