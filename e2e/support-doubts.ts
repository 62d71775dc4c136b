import type { Locator, Page } from 'playwright/test';
import { type Beat, type BeatClass, beatAt, beatsOf } from '../src/recording/beat';
import { type CompactBeats, compactBeats, expandBeats } from '../src/session/compact-beats';
import { settled, words } from './support';
import { secondsOf } from './support-drawing';

export const doubtsPane = (page: Page): Locator => page.getByRole('region', { name: 'Doubts' });
export const doubtCard = (page: Page): Locator =>
  page.getByRole('region', { name: 'The doubt in front' });

/** Where the doubt in front stands, in seconds; null where none is open. */
export async function placeInFront(page: Page): Promise<number | null> {
  await settled(page);
  const heading = doubtCard(page).getByRole('heading');
  if ((await heading.count()) === 0) return null;
  const [place] = words(await heading.textContent()).split(/[ –]/);
  return secondsOf(place);
}

/** An error as a detector makes it, and where a doubt about it would stand. */
export interface Planted {
  readonly atS: number;
  readonly what: 'missed' | 'false' | 'class';
}

interface SessionFile {
  beats: CompactBeats;
  readonly start: { beats: CompactBeats };
  readonly log: readonly unknown[];
}

/** A session without edits whose beats hold errors as if the detector had made them; each at the beat of an index. */
export function plantErrors(
  bytes: Buffer,
  rateHz: number,
  plan: readonly (readonly [index: number, what: Planted['what'], beatClass?: BeatClass])[],
): { readonly bytes: Buffer; readonly planted: readonly Planted[] } {
  const file = JSON.parse(bytes.toString('utf8')) as SessionFile;
  if (file.log.length > 0) throw new Error('errors are planted in a session without edits');
  const list = expandBeats(file.start.beats);
  const beats: (Beat | null)[] = Array.from(list.ticks, (_, i) => beatAt(list, i));
  const extra: Beat[] = [];
  const planted = plan.map(([index, what, beatClass = 'N']) => {
    const [one, next] = [beatAt(list, index), beatAt(list, index + 1)];
    const middle = Math.round((one.tick + next.tick) / 2);
    if (what === 'missed') beats[index] = null;
    if (what === 'class') beats[index] = { ...one, beatClass };
    if (what === 'false') extra.push({ ...one, tick: middle, beatClass });
    const tick = { missed: next.tick, class: one.tick, false: middle }[what];
    return { atS: tick / (64 * rateHz), what };
  });
  const spoiled = compactBeats(beatsOf([...beats.filter((one) => one !== null), ...extra]));
  file.beats = spoiled;
  file.start.beats = spoiled;
  return { bytes: Buffer.from(JSON.stringify(file)), planted };
}
