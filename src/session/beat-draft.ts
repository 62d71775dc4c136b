import { type Beat, type BeatList, beatAt, changeBeats, firstBeatAt } from '../recording/beat';

/**
 * Beats under many small changes, for replaying a long log: each change costs its own size, and the list is made once at the
 * end instead of once a change.
 */
export class BeatDraft {
  /** What differs from the list so far: a beat put in, or null for one taken out, by tick. */
  private readonly differing = new Map<number, Beat | null>();
  private base: BeatList;

  constructor(base: BeatList) {
    this.base = base;
  }

  /** Takes beats out and puts others in. Throws RangeError as changeBeats does. */
  change(removed: readonly Beat[], added: readonly Beat[]): void {
    for (const { tick, beatClass } of removed) {
      if (this.at(tick)?.beatClass !== beatClass)
        throw new RangeError(`no beat of class ${beatClass} at tick ${tick}`);
      this.differing.set(tick, null);
    }
    for (const beat of added) {
      if (this.at(beat.tick)) throw new RangeError(`a beat stands at tick ${beat.tick} already`);
      this.differing.set(beat.tick, beat);
    }
  }

  replace(base: BeatList): void {
    this.differing.clear();
    this.base = base;
  }

  /** The list as it is now. */
  list(): BeatList {
    if (this.differing.size === 0) return this.base;
    const removed = [...this.differing.keys()].flatMap((tick) => this.inBase(tick) ?? []);
    const added = [...this.differing.values()].flatMap((beat) => beat ?? []);
    this.replace(changeBeats(this.base, removed, added));
    return this.base;
  }

  private at(tick: number): Beat | null {
    const differing = this.differing.get(tick);
    return differing === undefined ? this.inBase(tick) : differing;
  }

  private inBase(tick: number): Beat | null {
    const index = firstBeatAt(this.base, tick);
    return this.base.ticks[index] === tick ? beatAt(this.base, index) : null;
  }
}
