import { describe, expect, it } from 'vitest';
import { leadsJson } from '../../src/export/evidence/leads-json';
import { togetherJson } from '../../src/export/evidence/together-json';
import { leadsLines } from '../../src/recording/evidence/leads-words';
import { togetherLines } from '../../src/recording/evidence/together-words';
import { INVENTED_LEADS } from './invented-leads';
import { INVENTED_TOGETHER } from './invented-together';

describe('what is said of several leads', () => {
  it('names the earlier lead, with its range and what limits it, and counts pairs that are not shown', () => {
    expect(leadsLines(INVENTED_LEADS)).toEqual([
      {
        name: 'EGG1 − EGG2 and EGG3',
        words:
          'fasting: coupled 74 % (41–92); EGG3 earlier by 1.6 s (1.4 to 1.8). fed: coupled not given: 9.5 clean minutes (under 10); no lag: coherence is not above that of unrelated noise. Ranges are 95 % by chance.',
        mark: 'the file states different filters',
      },
      {
        name: 'Several leads',
        words: '1 pair not shown, with the reason on the page',
        mark: null,
      },
    ]);
  });

  it('names no order where the range holds 0', () => {
    const [pair] = INVENTED_LEADS.pairs;
    if (pair.kind !== 'compared' || pair.phases[0].lag.kind !== 'lag') throw new Error('no lag');
    const lag = { ...pair.phases[0].lag, lagS: -0.04, lowS: -0.3, highS: 0.22 };
    const phases = [{ ...pair.phases[0], lag }];
    const [line] = leadsLines({ ...INVENTED_LEADS, pairs: [{ ...pair, phases }] });
    expect(line.words).toContain('neither earlier, lag 0.0 s (−0.3 to 0.2)');
    expect(line.words).not.toContain('propag');
  });

  it('is a line of words for a study of one lead', () => {
    expect(leadsLines({ withinCpm: 0.2, leadCount: 1, pairs: [] })).toEqual([
      { name: 'Several leads', words: 'one slow-wave lead: nothing to compare', mark: null },
    ]);
  });

  it('stands in findings.json by keys of leads, without their labels', () => {
    const json = leadsJson(INVENTED_LEADS);
    expect(JSON.stringify(json)).not.toContain('EGG');
    expect(json).toMatchObject({
      coupled_within_cpm: 0.2,
      pairs: [
        {
          first: '#1~#2',
          second: '#3',
          electrodes: 'apart',
          phases: [
            {
              coupling: { value: 74, range_95_by_chance: [41, 92], basis: '27 epochs' },
              lag: { second_later_s: -1.6, coherence: 0.913, coherence_of_noise_95: 0.108 },
            },
            { coupling: { withheld: '9.5 clean minutes (under 10)' }, lag: { coherence: 0.05 } },
          ],
          epochs: [{ coupled: true, second_later_s: -1.6 }, { df_cpm: null }],
        },
        { electrodes: 'shared', not_shown: 'the leads share an electrode' },
      ],
    });
  });
});

describe('what is said of both rhythms', () => {
  it('calls the test exploratory and prints every other explanation beside it', () => {
    expect(togetherLines(INVENTED_TOGETHER)).toEqual([
      {
        name: 'Both rhythms, fasting',
        words:
          'more than chance, but another explanation is seen: RR ±0.81 % by the slow wave’s phase, by chance up to ±0.41 % (95 %); p 0.002, 999 shifts, 84 cycles',
        mark: 'exploratory, no reference values; other explanations seen: 0.1 Hz waves; not seen: breathing, leakage',
      },
    ]);
  });

  it('says why nothing was tested', () => {
    const { phases } = INVENTED_TOGETHER;
    expect(togetherLines({ ...INVENTED_TOGETHER, phases: [phases[1]] })[0].words).toBe(
      'not tested (meal: the meal is shown and not analysed)',
    );
    expect(togetherLines({ ...INVENTED_TOGETHER, heartRead: false })[0].words).toBe(
      'no heart lead is read',
    );
  });

  it('stands in findings.json rounded, with its note', () => {
    expect(togetherJson(INVENTED_TOGETHER)).toMatchObject({
      note: 'exploratory, no reference values',
      phases: [
        {
          name: 'fasting',
          hf_ms2: { median: 571, windows: 19 },
          breathing_per_min: { median: null, windows: 0 },
          rr_by_slow_wave_phase: {
            depth_pct: 0.812,
            chance_95_pct: 0.406,
            p: 0.002,
            surrogates: 999,
            least_shift_s: 60,
            rivals: { waves_0_1_hz: { verdict: 'seen' }, leak: { leak_uv: 0.26 } },
          },
        },
        { rr_by_slow_wave_phase: { withheld: 'the meal is shown and not analysed' } },
      ],
      windows: [{ df_cpm: 2.95, heart_rate_bpm: 64, hf_ms2: 571 }, { df_cpm: null }],
    });
  });
});
