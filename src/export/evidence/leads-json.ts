import type { LagFound, LagInEpoch, LeadPair, LeadsEvidence } from '../../recording/evidence/leads';
import type { FigureValue } from '../../recording/figure';
import { roundedTo } from '../write-number';

const rounded = (value: number | null, decimals: number) =>
  value === null ? null : roundedTo(value, decimals);

function couplingJson(value: FigureValue, range: readonly [number, number] | null) {
  switch (value.kind) {
    case 'number':
      return {
        unit: '%',
        value: roundedTo(value.value, 0),
        range_95_by_chance: range === null ? null : range.map((one) => roundedTo(one, 0)),
        basis: value.basis,
        marks: value.marks,
      };
    case 'count':
      return { count: value.count, of: value.of, what: value.what, marks: value.marks };
    case 'withheld':
      return { unit: '%', withheld: value.reason };
  }
}

const coherenceJson = ({ coherence, level }: LagFound) => ({
  coherence: rounded(coherence, 3),
  coherence_of_noise_95: rounded(level, 3),
});

function lagJson(lag: LagFound) {
  if (lag.kind === 'withheld') return { withheld: lag.reason, ...coherenceJson(lag) };
  return {
    second_later_s: roundedTo(lag.lagS, 2),
    range_95_by_chance_s: [roundedTo(lag.lowS, 2), roundedTo(lag.highS, 2)],
    half_cycle_s: roundedTo(lag.halfCycleS, 2),
    df_cpm: roundedTo(lag.dfCpm, 2),
    segments: lag.segments,
    ...coherenceJson(lag),
  };
}

const epochJson = (one: LagInEpoch) => ({
  from_s: roundedTo(one.fromS, 6),
  to_s: roundedTo(one.toS, 6),
  coupled: one.coupled,
  df_cpm: rounded(one.dfCpm, 2),
  second_later_s: rounded(one.lagS, 2),
  range_95_by_chance_s:
    one.lowS === null || one.highS === null
      ? null
      : [roundedTo(one.lowS, 2), roundedTo(one.highS, 2)],
});

function pairJson(pair: LeadPair) {
  const { first, second, electrodes } = pair;
  const leads = { first, second, electrodes: electrodes.kind };
  if (pair.kind === 'left-out')
    return {
      ...leads,
      not_shown: electrodes.kind === 'shared' ? 'the leads share an electrode' : pair.why,
    };
  return {
    ...leads,
    mark: pair.mark,
    phases: pair.phases.map((phase) => ({
      name: phase.name,
      from_s: roundedTo(phase.fromS, 6),
      to_s: roundedTo(phase.toS, 6),
      coupling: couplingJson(phase.coupling, phase.couplingRange),
      lag: lagJson(phase.lag),
    })),
    epochs: pair.strip.map(epochJson),
  };
}

/** The part `leads` of findings.json; leads by their keys, since labels may be names. */
export const leadsJson = ({ withinCpm, pairs }: LeadsEvidence): unknown => ({
  coupled_within_cpm: roundedTo(withinCpm, 2),
  pairs: pairs.map(pairJson),
});
