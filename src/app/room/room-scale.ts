/** The panes' smallest text in CSS pixels: drawn on canvas at 11 px. */
const PANE_TEXT_PX = 11;
/** Text on a screen of 1920x1080, by which everything else is measured. */
const ROOM_TEXT_PX = 32;
const ROOM = { widthPx: 1920, heightPx: 1080 } as const;
/** On a small page text stays as large as in the review. */
const LEAST = 12 / PANE_TEXT_PX;

/** How much larger the panes are shown on a page of so many CSS pixels: their smallest text is 32 px at 1920x1080. */
export function paneScale(widthPx: number, heightPx: number): number {
  const share = Math.min(widthPx / ROOM.widthPx, heightPx / ROOM.heightPx);
  return Math.max(LEAST, (share * ROOM_TEXT_PX) / PANE_TEXT_PX);
}
