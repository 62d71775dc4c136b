import type { Range } from '../../numeric/chance-range';
import type { RangesEvidence } from '../../recording/evidence/ranges';
import { FIGURES } from '../../recording/figure-catalogue';
import { roundedTo } from '../write-number';

/** The ends of a range with the decimals of its figure. */
function ends(key: string, { low, high }: Range) {
  const decimals = FIGURES.find((figure) => figure.key === key)?.decimals;
  if (decimals === undefined) throw new Error(`figure ${key} is not in the catalogue`);
  return { low: roundedTo(low, decimals), high: roundedTo(high, decimals) };
}

/** The part `ranges` of findings.json. */
export const rangesJson = ({ phases, changes, openHeartDoubts }: RangesEvidence): unknown => ({
  nominal_coverage: 0.95,
  open_heart_doubts: openHeartDoubts,
  phases: phases.map(({ name, figures }) => ({
    name,
    figures: Object.fromEntries(
      figures.map(({ key, chance, doubts, limits }) => [
        key,
        {
          by_chance: chance && ends(key, chance),
          by_doubts: doubts && {
            ...ends(key, doubts),
            exact: doubts.exact,
            doubts: doubts.doubts,
          },
          by_limits: limits && {
            ...ends(key, limits),
            low_by: limits.lowBy,
            high_by: limits.highBy,
          },
        },
      ]),
    ),
  })),
  changes: changes.map(({ key, from, to, ratio, ...range }) => ({
    key,
    from,
    to,
    by_chance: ends(key, range),
    ratio_by_chance: ratio && {
      low: roundedTo(ratio.low, 2),
      high: roundedTo(ratio.high, 2),
    },
  })),
});
