import { describe, expect, it } from 'vitest';
import { protocolDraft, readProtocol } from '../../src/app/protocol-draft';
import {
  readSettings as readDraft,
  type SettingKey,
  type SettingsDraft,
  settingActs,
  settingsDraft,
} from '../../src/app/settings-draft';
import { heartRouteWords, slowRouteWords, truncationWords } from '../../src/app/settings-words';
import { EMPTY_PROTOCOL } from '../../src/recording/protocol';
import { BAND_PRESETS, DEFAULT_SETTINGS } from '../../src/recording/settings';

const typed = (change: Partial<Record<SettingKey, string>>) => {
  const draft = settingsDraft(DEFAULT_SETTINGS);
  return { ...draft, texts: { ...draft.texts, ...change } };
};

const readSettings = (draft: SettingsDraft) => readDraft(draft, DEFAULT_SETTINGS);

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
    const derived = (change: Partial<Record<SettingKey, string>>) =>
      readSettings({ ...typed(change), slowRoute: 'fractional', slowGain: 'even' });
    expect(derived({ polynomial: '2.5' }).errors.polynomial).toMatch(/whole/);
    expect(derived({ order: '' }).errors.order).toMatch(/0 to 1/);
    expect(derived({ order: '1.2' }).settings).toBeNull();
  });
});

describe('fields of a route', () => {
  const fractional = { slowRoute: 'fractional', heartRoute: 'band' } as const;

  it('act only where the route is chosen', () => {
    const band = { slowRoute: 'band', heartRoute: 'band' } as const;
    expect(settingActs('slowLow', band)).toBe(true);
    expect(settingActs('order', band)).toBe(false);
    expect(settingActs('slowLow', fractional)).toBe(false);
    expect(settingActs('heartHigh', fractional)).toBe(true);
    expect(settingActs('order', fractional)).toBe(true);
    expect(settingActs('slowWindow', fractional)).toBe(true);
    expect(settingActs('heartWindow', fractional)).toBe(false);
    expect(settingActs('falseAlarm', fractional)).toBe(true);
    const average = { slowRoute: 'beat-average', heartRoute: 'band' } as const;
    expect(settingActs('averageBeats', average)).toBe(true);
    expect(settingActs('slowLow', average)).toBe(true);
    expect(settingActs('averageBeats', band)).toBe(false);
    expect(settingActs('order', average)).toBe(false);
  });

  it('cannot be wrong where they do not act: what was in force stays in them', () => {
    const before = { ...DEFAULT_SETTINGS, slowBandCpm: [1, 9] as const };
    const broken = { ...settingsDraft(before), ...fractional };
    const typedWrong = { ...broken, texts: { ...broken.texts, slowLow: 'x', slowHigh: '7' } };
    expect(readDraft(typedWrong, before)).toEqual({
      settings: { ...before, ...fractional },
      errors: {},
    });
    const stillWrong = { ...typedWrong, slowRoute: 'band' as const };
    expect(readDraft(stillWrong, before).errors.slowLow).toMatch(/Type a number/);
  });

  it('keep what was typed where it makes sense, for the day the route comes back', () => {
    const draft = { ...typed({ slowLow: '1.2' }), ...fractional };
    expect(readSettings(draft).settings?.slowBandCpm).toEqual([1.2, 10]);
  });

  it('stand beside words that follow the choice', () => {
    expect(slowRouteWords({ slowRoute: 'band', slowGain: 'even' })).toMatch(/within this band/);
    expect(slowRouteWords({ slowRoute: 'fractional', slowGain: 'even' })).toMatch(
      /derivative.*no band limits/,
    );
    expect(slowRouteWords({ slowRoute: 'beat-average', slowGain: 'even' })).toMatch(
      /heartbeat is taken out.*within this band.*mend the beats/,
    );
    expect(heartRouteWords({ heartRoute: 'fractional' })).not.toMatch(/within this band/);
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
