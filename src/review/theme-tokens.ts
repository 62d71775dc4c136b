/** The colours of one theme, each "#rrggbb". */
export interface ThemeTokens {
  readonly paper: string;
  readonly panel: string;
  readonly ink: string;
  /** Second text, recorded envelopes, frames of controls. */
  readonly quiet: string;
  /** Thin lines that carry no meaning of their own. */
  readonly rule: string;
  readonly stomach: string;
  readonly stomachSoft: string;
  readonly heart: string;
  readonly heartSoft: string;
  readonly breathing: string;
  /** Yellow tab of a doubt, and the ink on it. */
  readonly doubt: string;
  readonly doubtInk: string;
  readonly focus: string;
  /** Line of DF over the spectrogram, and the halo that keeps it apart from any level. */
  readonly dfLine: string;
  readonly dfHalo: string;
  /** Spectrogram from the low to the high end of the scale. */
  readonly ramp: readonly string[];
}

export type ThemeName = 'light' | 'dark';

export const THEMES: Readonly<Record<ThemeName, ThemeTokens>> = {
  light: {
    paper: '#f7f5f0',
    panel: '#ffffff',
    ink: '#1b2530',
    quiet: '#52606d',
    rule: '#dad5cb',
    stomach: '#0f6b64',
    stomachSoft: '#d6eae6',
    heart: '#9c2350',
    heartSoft: '#f6dfe7',
    breathing: '#3d5fa8',
    doubt: '#ffe08a',
    doubtInk: '#1b2530',
    focus: '#1f4fd8',
    dfLine: '#101e28',
    dfHalo: '#f7f5f0',
    ramp: [
      '#f7f5f0',
      '#deece7',
      '#b4d9d1',
      '#80beb5',
      '#4c9e95',
      '#1f7a72',
      '#0d5854',
      '#0e383c',
      '#101e28',
    ],
  },
  dark: {
    paper: '#12181e',
    panel: '#1a222a',
    ink: '#e7ecef',
    quiet: '#9fb0bc',
    rule: '#2e3943',
    stomach: '#5cc9bb',
    stomachSoft: '#173b3a',
    heart: '#f08aae',
    heartSoft: '#42202f',
    breathing: '#8fb0f0',
    doubt: '#e9c65b',
    doubtInk: '#1b2530',
    focus: '#8fb0ff',
    dfLine: '#f3faf4',
    dfHalo: '#12181e',
    ramp: [
      '#12181e',
      '#142a30',
      '#164244',
      '#1c605d',
      '#2c827b',
      '#4ca59a',
      '#7cc7ba',
      '#b8e4d8',
      '#f3faf4',
    ],
  },
};

type FlatToken = Exclude<keyof ThemeTokens, 'ramp'>;

/** CSS custom property of each token. */
export const CSS_NAMES: Readonly<Record<FlatToken, string>> = {
  paper: '--paper',
  panel: '--panel',
  ink: '--ink',
  quiet: '--quiet',
  rule: '--rule',
  stomach: '--stomach',
  stomachSoft: '--stomach-soft',
  heart: '--heart',
  heartSoft: '--heart-soft',
  breathing: '--breathing',
  doubt: '--doubt',
  doubtInk: '--doubt-ink',
  focus: '--focus',
  dfLine: '--df-line',
  dfHalo: '--df-halo',
};

/** Sizes of type, by the custom properties that styles name them by: two of text, one of figures, one of headings. */
export const TYPE_SIZES = {
  '--text': '14px',
  '--small': '12px',
  '--figure': '15px',
  '--head': '18px',
} as const;

/** The distances that styles choose from, in CSS pixels; 1 is a hairline. Smaller ones lie within a control, larger between parts. */
export const SPACINGS_PX = [1, 2, 4, 6, 8, 10, 12, 16, 20, 24, 32, 64] as const;

/** Radii of corners in CSS pixels: marks, controls, panels, dialogs. */
export const RADII_PX = [2, 4, 6, 8] as const;

/** Sets the custom properties of a theme and the sizes of type on the document's root, with `data-theme` and the matching colour scheme. */
export function applyTheme(page: Document, name: ThemeName): void {
  const { style, dataset } = page.documentElement;
  for (const [token, property] of Object.entries(CSS_NAMES))
    style.setProperty(property, THEMES[name][token as FlatToken]);
  for (const [property, size] of Object.entries(TYPE_SIZES)) style.setProperty(property, size);
  style.setProperty('color-scheme', name);
  dataset.theme = name;
}
