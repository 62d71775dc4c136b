const KEY = 'bicadence.last-study';

const storage = (): Storage | null => {
  try {
    return window.sessionStorage;
  } catch {
    return null;
  }
};

/** The study that was open in this tab, by its key alone, so that a reload can ask for the same file. */
export const lastStudy = {
  remember(quickKey: string): void {
    try {
      storage()?.setItem(KEY, quickKey);
    } catch {
      return;
    }
  },
  recall: (): string | null => storage()?.getItem(KEY) ?? null,
  forget(quickKey: string): void {
    if (this.recall() === quickKey) this.clear();
  },
  clear(): void {
    storage()?.removeItem(KEY);
  },
};
