import { describe, expect, it } from 'vitest';
import type { Epoch } from '../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { epochDoubts } from '../../src/stomach/epoch-doubts';

const STEP_S = 60;

const epoch = (fromS: number, parts: Partial<Epoch>): Epoch => ({
  lead: '#1',
  phase: 'fasting',
  fromS,
  toS: fromS + 240,
  kept: true,
  spoiledFraction: 0,
  dfCpm: 3,
  dpDb: 30,
  peakShare: 0.5,
  rhythm: 'normo',
  flags: [],
  ...parts,
});
const doubtsOf = (...epochs: readonly Epoch[]) =>
  epochDoubts(epochs, DEFAULT_SETTINGS.rhythmBands, STEP_S);

describe('an epoch whose rhythm hangs on one flag', () => {
  it('by breathing is not decidable, and would be what its peak says', () => {
    const [doubt] = doubtsOf(epoch(0, { dfCpm: 5.2, rhythm: 'undecided', flags: ['breathing'] }));
    expect(doubt).toMatchObject({ kind: 'epoch', lead: '#1', fromS: 90, toS: 150 });
    expect(doubt.why).toContain('not decidable only because of one thing');
    expect(doubt.why).toContain('5.2 cpm');
    expect(doubt.why).toContain('it would be tachygastria');
  });

  it('by a harmonic would be of the band of twice its rate', () => {
    const [doubt] = doubtsOf(epoch(0, { dfCpm: 2.9, flags: ['harmonic'] }));
    expect(doubt.why).toContain('it would be tachygastria');
    expect(doubtsOf(epoch(0, { dfCpm: 1.7, rhythm: 'brady', flags: ['half'] }))[0].why).toContain(
      'it would be normogastria',
    );
  });

  it('is none where the rhythm is the same either way, or two flags say it, or it is not kept', () => {
    expect(
      doubtsOf(
        epoch(0, {}),
        epoch(600, { dfCpm: 4.2, rhythm: 'tachy', flags: ['harmonic'] }),
        epoch(1200, { rhythm: 'undecided', flags: ['breathing', 'drift'] }),
        epoch(1800, { kept: false, rhythm: null, dfCpm: null, flags: ['harmonic'] }),
        epoch(2400, { flags: ['filled'] }),
      ),
    ).toEqual([]);
  });

  it('is one place with those beside it that hang on the same', () => {
    const hangs = { dfCpm: 5.2, rhythm: 'undecided' as const, flags: ['breathing' as const] };
    const two = doubtsOf(epoch(0, hangs), epoch(60, hangs), epoch(300, hangs));
    expect(two).toHaveLength(2);
    expect(two[0]).toMatchObject({ fromS: 90, toS: 210, mend: { kind: 'exclude' } });
    const many = [0, 60, 120, 180].map((fromS) => epoch(fromS, hangs));
    expect(doubtsOf(...many)).toMatchObject([{ mend: null }]);
  });
});
