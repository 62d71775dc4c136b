import type { Channel } from './channel';
import { type Lead, leadChannels, leadName } from './lead';

/** What the labels of a file let say of the electrodes of two leads. */
export type ElectrodesOfPair =
  | { readonly kind: 'apart'; readonly why: string }
  | { readonly kind: 'not-known'; readonly why: string }
  | { readonly kind: 'shared'; readonly why: string };

type Labels = readonly Pick<Channel, 'label'>[];

/** How a lead is summed up from electrodes: by how much each counts, those that cancel left out. */
type Weights = ReadonlyMap<string, number>;

/** Stands for what a channel whose label names one place only was measured against. */
const REFERENCE = ' reference';

/** The two electrodes that a label names ("E1-E2", "EGG A1 - A2"); null where it names none or one ("EGG-1"). */
function namedPair(label: string): readonly [string, string] | null {
  const [first, second, ...more] = label
    .toUpperCase()
    .replace(/^(EGG|ECG|EMG|BIO)\s+/, '')
    .split(/\s*[-–−]\s*/);
  if (second === undefined || more.length > 0) return null;
  const names = [first, second].map((one) => one.trim());
  const isName = (one: string) => /\p{L}/u.test(one);
  const bothNumbers = names.every((one) => /^\d+$/.test(one));
  return names.every(isName) || bothNumbers ? [names[0], names[1]] : null;
}

function weightsOf(lead: Lead, channels: Labels): Weights {
  const weights = new Map<string, number>();
  const add = (electrode: string, weight: number) => {
    const sum = (weights.get(electrode) ?? 0) + weight;
    if (sum === 0) weights.delete(electrode);
    else weights.set(electrode, sum);
  };
  leadChannels(lead).forEach((channel, part) => {
    const label = channels[channel]?.label ?? '';
    const sign = part === 0 ? 1 : -1;
    const [plus, minus] = namedPair(label) ?? [label.trim().toUpperCase(), REFERENCE];
    add(plus, sign);
    add(minus, -sign);
  });
  return weights;
}

const anyPair = (lead: Lead, channels: Labels): boolean =>
  leadChannels(lead).some((channel) => namedPair(channels[channel]?.label ?? '') !== null);

/**
 * Whether two leads share an electrode, from their channels and labels. A label that names two electrodes says all; one that
 * names a single place was measured against a reference that the file does not tell, taken to be the same for all such
 * channels, so that it cancels in a difference of two.
 */
export function electrodesOfPair(a: Lead, b: Lead, channels: Labels): ElectrodesOfPair {
  const common = leadChannels(a).find((one) => leadChannels(b).includes(one));
  if (common !== undefined) {
    const name = leadName({ kind: 'channel', channel: common }, channels);
    return { kind: 'shared', why: `both are made of ${name}` };
  }
  const [ofA, ofB] = [weightsOf(a, channels), weightsOf(b, channels)];
  const both = [...ofA.keys()].find((one) => one !== REFERENCE && ofB.has(one));
  if (both !== undefined) return { kind: 'shared', why: `both use electrode ${both}` };
  const open = (one: Weights) => one.has(REFERENCE);
  if (open(ofA) && open(ofB))
    return { kind: 'not-known', why: 'a reference electrode common to both cannot be excluded' };
  if ((open(ofA) && anyPair(b, channels)) || (open(ofB) && anyPair(a, channels)))
    return { kind: 'not-known', why: 'the reference of one may be an electrode of the other' };
  const byLabels = anyPair(a, channels) && anyPair(b, channels);
  return {
    kind: 'apart',
    why: byLabels
      ? 'their labels name no electrode in common'
      : 'no channel in common; a common reference cancels in a difference',
  };
}
