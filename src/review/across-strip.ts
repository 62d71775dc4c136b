/** Where a time stands across Whole study, as a length of CSS. */
export const acrossStrip = (atS: number, durationS: number): string =>
  `var(--gutter) + (100% - var(--gutter) - var(--pane-end)) * ${atS / Math.max(1e-9, durationS)}`;
