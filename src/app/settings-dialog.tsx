import { useState } from 'react';
import { BAND_PRESETS, bandsName, DEFAULT_SETTINGS, type Settings } from '../recording/settings';
import { useAnalysis, useApp, useSession, withReviewer } from './app-context';
import { Dialog } from './dialog';
import { Choice, Field, Tick } from './fields';
import {
  readSettings,
  SETTING_FIELDS,
  type SettingErrors,
  type SettingKey,
  type SettingsDraft,
  settingActs,
  settingsDraft,
} from './settings-draft';
import {
  BREATHING_OUT_CHOICES,
  heartRouteWords,
  nowWords,
  SLOW_GAIN_CHOICES,
  slowRouteWords,
  truncationWords,
} from './settings-words';

const HEART_ROUTES = [
  ['band', 'band: a filter without delay'],
  ['fractional', 'fractional: derivative and smoothing'],
] as const;
const SLOW_ROUTES = [
  HEART_ROUTES[0],
  ['beat-average', 'beat-average: the average heartbeat out, then the band'],
  HEART_ROUTES[1],
] as const;
const OWN = 'own';

/** Everything that changes a figure and that a person may choose. */
export function SettingsDialog() {
  const settings = useSession((state) => state.session?.state.settings);
  return settings ? <SettingsForm before={settings} /> : null;
}

function SettingsForm({ before }: { readonly before: Settings }) {
  const parts = useApp();
  const [draft, setDraft] = useState(() => settingsDraft(before));
  const { settings, errors } = readSettings(draft, before);
  const close = () => parts.shell.getState().closeDialog();
  const save = () => {
    if (!settings) return;
    if (JSON.stringify(settings) === JSON.stringify(before)) return close();
    withReviewer(parts, () => {
      parts.controller.changeSettings(settings);
      close();
    });
  };
  return (
    <Dialog
      title="Settings of the figures"
      subtitle="Kept with the session and printed with the report. A change computes the figures again."
      size="large"
      onClose={close}
      onSubmit={save}
      actions={
        <>
          <button
            type="button"
            className="button left"
            onClick={() => setDraft(settingsDraft(DEFAULT_SETTINGS))}
          >
            Back to defaults
          </button>
          <button type="button" className="button" onClick={close}>
            Leave as it was
          </button>
          <button type="submit" className="button strong" disabled={settings === null}>
            Use these settings
          </button>
        </>
      }
    >
      <InForce />
      <div className="settings-columns">
        <Separation draft={draft} errors={errors} onChange={setDraft} />
        <div>
          <RhythmSettings draft={draft} errors={errors} onChange={setDraft} />
          <HeartSettings draft={draft} errors={errors} onChange={setDraft} />
        </div>
      </div>
    </Dialog>
  );
}

/** What the figures on screen were made with, and what the recording's own filters do to them. */
function InForce() {
  const warnings = useAnalysis((state) => state.findings?.warnings);
  const separation = useAnalysis((state) => state.separation);
  const now = [...new Set(separation.flatMap((one) => one.notes))];
  const texts = [...new Set((warnings ?? []).map((one) => one.text))];
  return (
    <>
      {now.length > 0 ? (
        <div className="small quiet">
          {now.map((note, i) => (
            <p key={note}>{i === 0 ? nowWords(note) : note}</p>
          ))}
        </div>
      ) : null}
      {texts.length > 0 ? (
        <ul className="findings-warnings" aria-label="Warnings about this recording's filters">
          {texts.map((text) => (
            <li key={text}>{text}</li>
          ))}
        </ul>
      ) : null}
    </>
  );
}

interface SectionProps {
  readonly draft: SettingsDraft;
  readonly errors: SettingErrors;
  readonly onChange: (draft: SettingsDraft) => void;
}

/** Number fields of some settings, side by side: those that act under the chosen routes. */
function Numbers({
  draft,
  errors,
  onChange,
  keys,
}: SectionProps & { keys: readonly SettingKey[] }) {
  const acting = keys.filter((key) => settingActs(key, draft));
  if (acting.length === 0) return null;
  return (
    <div className="field-grid">
      {acting.map((key) => {
        const field = SETTING_FIELDS.find((one) => one.key === key);
        return field ? (
          <Field
            key={key}
            label={field.label}
            size="short"
            inputMode="decimal"
            unit={field.bounds.unit}
            value={draft.texts[key]}
            error={errors[key]}
            onChange={(text) => onChange({ ...draft, texts: { ...draft.texts, [key]: text } })}
          />
        ) : null;
      })}
    </div>
  );
}

function Separation(props: SectionProps) {
  const { draft, onChange } = props;
  const fractional = draft.slowRoute === 'fractional' || draft.heartRoute === 'fractional';
  return (
    <div>
      <fieldset>
        <legend className="organ-stomach">Slow wave</legend>
        <Choice
          label="Route"
          value={draft.slowRoute}
          options={SLOW_ROUTES}
          onChange={(slowRoute) => onChange({ ...draft, slowRoute })}
        />
        <Numbers {...props} keys={['slowLow', 'slowHigh']} />
        <Numbers {...props} keys={['averageBefore', 'averageAfter', 'averageBeats']} />
        {draft.slowRoute !== 'fractional' ? (
          <>
            <Choice
              label="Frequencies in the band"
              value={draft.slowGain}
              options={SLOW_GAIN_CHOICES}
              onChange={(slowGain) => onChange({ ...draft, slowGain })}
            />
            <Choice
              label="Breathing in the drawn wave"
              value={draft.breathingOut}
              options={BREATHING_OUT_CHOICES}
              onChange={(breathingOut) => onChange({ ...draft, breathingOut })}
            />
          </>
        ) : null}
        <p className="small quiet">{slowRouteWords(draft)}</p>
      </fieldset>
      <fieldset>
        <legend className="organ-heart">Heartbeat</legend>
        <Choice
          label="Route"
          value={draft.heartRoute}
          options={HEART_ROUTES}
          onChange={(heartRoute) => onChange({ ...draft, heartRoute })}
        />
        <Numbers {...props} keys={['heartLow', 'heartHigh']} />
        <p className="small quiet">{heartRouteWords(draft)}</p>
      </fieldset>
      {fractional ? <Fractional {...props} /> : null}
    </div>
  );
}

/** Settings of the fractional route, which one or both of the routes above use. */
function Fractional(props: SectionProps) {
  const { draft, onChange } = props;
  return (
    <fieldset>
      <legend>Fractional route</legend>
      <Numbers {...props} keys={['order', 'memory', 'slowWindow', 'heartWindow', 'polynomial']} />
      {draft.slowRoute === 'fractional' ? (
        <Tick
          label="Undo the time by which the derivative puts the drawn slow wave ahead"
          checked={draft.undoLead}
          onChange={(undoLead) => onChange({ ...draft, undoLead })}
        />
      ) : null}
      <p className="small quiet">{truncationWords(draft)}</p>
    </fieldset>
  );
}

const PRESET_KEYS = ['bandLow', 'normoLow', 'normoHigh', 'bandHigh'] as const;

function RhythmSettings(props: SectionProps) {
  const { draft, onChange } = props;
  const presets = BAND_PRESETS.map((bands) => ({
    name: bandsName(bands),
    texts: settingsDraft({ ...DEFAULT_SETTINGS, rhythmBands: bands }).texts,
  }));
  const now = presets.find(({ texts }) =>
    PRESET_KEYS.every((key) => texts[key] === draft.texts[key]),
  );
  return (
    <fieldset>
      <legend className="organ-stomach">Rhythm</legend>
      <Choice
        label="Band limits: brady, normo, tachy"
        value={now?.name ?? OWN}
        options={[...presets.map(({ name }) => [name, name] as const), [OWN, 'own limits, below']]}
        onChange={(name) => {
          const chosen = presets.find((preset) => preset.name === name);
          if (!chosen) return;
          const limits = Object.fromEntries(PRESET_KEYS.map((key) => [key, chosen.texts[key]]));
          onChange({ ...draft, texts: { ...draft.texts, ...limits } });
        }}
      />
      <Numbers {...props} keys={PRESET_KEYS} />
      <Numbers {...props} keys={['epochLength', 'epochStep', 'maxSpoiled', 'falseAlarm']} />
      <p className="small quiet">
        An epoch with a larger spoiled share is left out. False alarm: the chance that an epoch of
        noise alone passes for a rhythm.
      </p>
    </fieldset>
  );
}

function HeartSettings(props: SectionProps) {
  return (
    <fieldset>
      <legend className="organ-heart">Variability</legend>
      <Numbers {...props} keys={['segment', 'minNn', 'lfLow', 'lfHigh', 'hfLow', 'hfHigh']} />
    </fieldset>
  );
}
