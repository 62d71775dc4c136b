import type { Seconds } from '../units/time';
import type { RecordRun } from './record-runs';

/** When the records of a file were taken. */
export type RecordTimes =
  | {
      readonly kind: 'trusted';
      readonly runs: readonly RecordRun[];
      /** Farthest that a record's own time lies from where its run puts it: its sampling rate is not quite what it says. */
      readonly driftS: Seconds;
    }
  /** The file's times contradict themselves: records are laid end to end. */
  | { readonly kind: 'untrusted'; readonly why: string; readonly record: number };

/** Gaps may be this many times as long as the records, and an hour or so many samples of the fastest signal more. */
const MOST_GAP = 20;
const SPARE_GAP_S = 3600;
const SPARE_GAP_SAMPLES = 3_600_000;

/**
 * Puts records on the recording's clock by the times they state (Kemp & Olivan 2003: in EDF+D the only truth about time). A
 * record that begins later than the one before it ends begins a new run; one that says nothing follows on.
 */
export class RecordClock {
  /** Seconds from the file's start time to the first sample. */
  firstOnsetS = 0;
  private readonly runs: RecordRun[] = [{ firstRecord: 0, records: 0, startS: 0 }];
  private started = false;
  private lastS = 0;
  private driftS = 0;
  private fault: { readonly why: string; readonly record: number } | null = null;

  /** `toleranceS`, a sample of the fastest signal: how far a record's time may be from the end of the record before it and still follow on. */
  constructor(
    private readonly recordDurationS: Seconds,
    private readonly toleranceS: Seconds,
  ) {}

  /** Takes the next record; `onsetS` is its time by the file's clock, null where it says none. */
  next(onsetS: Seconds | null): void {
    const run = this.runs[this.runs.length - 1];
    const record = run.firstRecord + run.records;
    const byRunS = run.startS + run.records * this.recordDurationS;
    if (onsetS !== null && !this.started) {
      this.started = true;
      this.firstOnsetS = onsetS - byRunS;
    }
    const atS = onsetS === null ? this.lastS + this.recordDurationS : onsetS - this.firstOnsetS;
    const lateS = record === 0 ? 0 : atS - this.lastS - this.recordDurationS;
    this.lastS = record === 0 ? 0 : atS;
    if (Math.abs(lateS) <= this.toleranceS) {
      this.driftS = Math.max(this.driftS, Math.abs(this.lastS - byRunS));
      this.runs[this.runs.length - 1] = { ...run, records: run.records + 1 };
      return;
    }
    const spareS = Math.min(SPARE_GAP_S, SPARE_GAP_SAMPLES * this.toleranceS);
    const most = MOST_GAP * (record + 1) * this.recordDurationS + spareS;
    if (lateS < 0) this.fail(record, `begins at ${shown(atS)} s, before the record before it ends`);
    else if (atS > most)
      this.fail(
        record,
        `begins at ${shown(atS)} s, ${shown(lateS)} s after the one before it ends`,
      );
    this.runs.push({ firstRecord: record, records: 1, startS: byRunS + lateS });
  }

  times(): RecordTimes {
    if (this.fault) return { kind: 'untrusted', ...this.fault };
    return { kind: 'trusted', runs: this.runs, driftS: this.driftS };
  }

  private fail(record: number, why: string): void {
    this.fault ??= { why, record };
  }
}

const shown = (seconds: number): string => String(Number(seconds.toFixed(3)));
