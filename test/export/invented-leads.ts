import type { LeadsEvidence } from '../../src/recording/evidence/leads';

/** Three invented leads: one pair compared, with and without a lag, and two that share an electrode. */
export const INVENTED_LEADS: LeadsEvidence = {
  withinCpm: 0.2,
  leadCount: 3,
  pairs: [
    {
      first: '#1~#2',
      second: '#3',
      firstName: 'EGG1 − EGG2',
      secondName: 'EGG3',
      electrodes: { kind: 'apart', why: 'no channel in common' },
      kind: 'compared',
      mark: 'the file states different filters',
      phases: [
        {
          name: 'fasting',
          fromS: 0,
          toS: 1800,
          coupling: { kind: 'number', value: 74.07, basis: '27 epochs', marks: [] },
          couplingRange: [41.4, 92.2],
          lag: {
            kind: 'lag',
            dfCpm: 2.949,
            lagS: -1.6049,
            lowS: -1.8,
            highS: -1.4,
            halfCycleS: 10.17,
            coherence: 0.9126,
            level: 0.1081,
            segments: 52,
          },
        },
        {
          name: 'fed',
          fromS: 2400,
          toS: 3000,
          coupling: { kind: 'withheld', reason: '9.5 clean minutes (under 10)' },
          couplingRange: null,
          lag: {
            kind: 'withheld',
            reason: 'coherence is not above that of unrelated noise',
            coherence: 0.05,
            level: 0.31,
          },
        },
      ],
      strip: [
        { fromS: 0, toS: 240, coupled: true, dfCpm: 2.95, lagS: -1.6, lowS: -2, highS: -1.2 },
        { fromS: 60, toS: 300, coupled: false, dfCpm: null, lagS: null, lowS: null, highS: null },
      ],
    },
    {
      first: '#1~#2',
      second: '#2~#3',
      firstName: 'EGG1 − EGG2',
      secondName: 'EGG2 − EGG3',
      electrodes: { kind: 'shared', why: 'both are made of EGG2' },
      kind: 'left-out',
      why: 'both are made of EGG2: what it records is in both',
    },
  ],
};
