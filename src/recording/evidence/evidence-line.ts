/** One line of the trust section: what it is about, what was found, and what a reader must not overlook. */
export interface EvidenceLine {
  readonly name: string;
  readonly words: string;
  /** A caution that stands beside it; null where there is none. */
  readonly mark: string | null;
}
