import { useStore } from 'zustand';
import { byWords } from '../recording/evidence/limits-words';
import { rangeWords } from '../recording/evidence/range-words';
import {
  type FigureRanges,
  type RangesEvidence,
  rangesOfFigure,
} from '../recording/evidence/ranges';
import { exactWords, ratioWords } from '../recording/evidence/ranges-words';
import type { FigureDefinition } from '../recording/figure-catalogue';
import { useApp, useSession } from './app-context';

interface FigureRangesListProps {
  readonly definition: FigureDefinition;
  readonly part: string;
}

/** The ranges of one figure of one phase, each saying which it is; grey while they are of an earlier edit. */
export function FigureRangesList({ definition, part }: FigureRangesListProps) {
  const { evidence } = useApp();
  const found = useStore(evidence, (state) => state.found.ranges);
  const edit = useSession(({ session }) => session?.log.length ?? 0);
  if (!found) return null;
  const ranges = rangesOfFigure(found.value, part, definition.key);
  const facts = [
    ...(ranges ? factsOf(ranges, definition) : []),
    ...changeFacts(found.value, definition, part),
  ];
  if (facts.length === 0) return null;
  return (
    <dl className={found.edit === edit ? 'facts-list' : 'facts-list stale'} aria-label="Ranges">
      {facts.map(({ name, words }) => (
        <div key={name}>
          <dt>{name}</dt>
          <dd>{words}</dd>
        </div>
      ))}
    </dl>
  );
}

interface Fact {
  readonly name: string;
  readonly words: string;
}

function factsOf({ chance, doubts, limits }: FigureRanges, figure: FigureDefinition): Fact[] {
  const { decimals, unit } = figure;
  const said = (words: string) => (unit === '' ? words : `${words} ${unit}`);
  const facts: Fact[] = [];
  if (chance)
    facts.push({
      name: 'By chance',
      words: `${said(rangeWords(chance, decimals))}: nominal 95 % range of this person’s tendency, from minutes like these`,
    });
  if (doubts)
    facts.push({
      name: 'By doubts',
      words: `${said(rangeWords(doubts, decimals))}: ${openWords(doubts.doubts)} decided one way or the other (${exactWords(doubts)})`,
    });
  if (limits)
    facts.push({
      name: 'By limits',
      words: `${said(rangeWords(limits, decimals))}: ${byWords(limits, decimals) || 'the same under all of them'}`,
    });
  return facts;
}

const openWords = (doubts: number): string =>
  doubts === 1 ? 'the open doubt' : `the ${doubts} open doubts`;

/** What is told of the changes that end in this phase. */
function changeFacts(
  { changes }: RangesEvidence,
  { key, decimals, unit }: FigureDefinition,
  part: string,
): Fact[] {
  return changes
    .filter((one) => one.key === key && one.to === part)
    .map((one) => ({
      name: `Change from ${one.from}`,
      words: `${rangeWords(one, decimals)} ${unit}${one.ratio ? `, ${ratioWords(one)}` : ''} by chance, nominal 95 %`,
    }));
}
