/** Frequency in hertz. */
export type Hertz = number;
/** Frequency in cycles per minute, the unit of gastric rhythm: 1 cpm = 1/60 Hz. */
export type Cpm = number;

export const cpmToHz = (cpm: Cpm): Hertz => cpm / 60;
export const hzToCpm = (hertz: Hertz): Cpm => hertz * 60;
