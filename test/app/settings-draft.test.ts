import { describe, expect, it } from 'vitest';
import { protocolDraft, readProtocol } from '../../src/app/protocol-draft';
import {
  readSettings,
  type SettingKey,
  settingsDraft,
  truncationWords,
} from '../../src/app/settings-draft';
import { EMPTY_PROTOCOL } from '../../src/recording/protocol';
import { BAND_PRESETS, DEFAULT_SETTINGS } from '../../src/recording/settings';

const typed = (change: Partial<Record<SettingKey, string>>) => {
  const draft = settingsDraft(DEFAULT_SETTINGS);
  return { ...draft, texts: { ...draft.texts, ...change } };
};

describe('typed settings', () => {
  it('come back to the last digit where nothing was typed, shares shown as percent too', () => {
    expect(readSettings(settingsDraft(DEFAULT_SETTINGS))).toEqual({
      settings: DEFAULT_SETTINGS,
      errors: {},
    });
    for (const rhythmBands of BAND_PRESETS) {
      const settings = { ...DEFAULT_SETTINGS, rhythmBands };
      expect(readSettings(settingsDraft(settings)).settings).toEqual(settings);
    }
  });

  it('take a decimal comma', () => {
    expect(readSettings(typed({ slowLow: '0,5' })).settings?.slowBandCpm).toEqual([0.5, 10]);
  });

  it('are refused where a band is turned round or a step outlasts its epoch', () => {
    expect(readSettings(typed({ slowLow: '12' })).errors.slowHigh).toMatch(/above 12/);
    expect(readSettings(typed({ normoHigh: '2' })).errors.normoHigh).toMatch(/above 2/);
    expect(readSettings(typed({ epochStep: '300' })).errors.epochStep).toMatch(/longer/);
    expect(readSettings(typed({ polynomial: '2.5' })).errors.polynomial).toMatch(/whole/);
    expect(readSettings(typed({ order: '' })).errors.order).toMatch(/0 to 1/);
    expect(readSettings(typed({ order: '1.2' })).settings).toBeNull();
  });
});

describe('what the fixed memory of the derivative leaves out', () => {
  it('is told by the bound of Podlubny 1999: 60^-0.5 / gamma(0.5) = 0.0728', () => {
    expect(truncationWords(settingsDraft(DEFAULT_SETTINGS))).toContain('0.073 µV');
  });

  it('meets 10 % of the largest value at 31.8 s for order 0.5 (field-notes 3.2)', () => {
    expect(truncationWords(typed({ memory: '31.8' }))).toContain('0.10 µV');
  });

  it('says nothing while order or memory cannot be read', () => {
    expect(truncationWords(typed({ memory: 'long' }))).toBe('');
  });
});

describe('the typed protocol', () => {
  it('keeps what is not stated apart from nought', () => {
    const draft = { ...protocolDraft(EMPTY_PROTOCOL), kcal: '0', ml: '', meal: ' porridge ' };
    const { protocol, errors } = readProtocol(draft);
    expect(errors).toEqual({});
    expect(protocol).toMatchObject({ kcal: 0, ml: null, meal: 'porridge' });
  });

  it('refuses more than all of the meal', () => {
    const draft = { ...protocolDraft(EMPTY_PROTOCOL), partEatenPercent: '120' };
    expect(readProtocol(draft).errors.partEatenPercent).toMatch(/0 to 100 %/);
  });
});
