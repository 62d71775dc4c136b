import type { Hertz } from '../units/rate';

/**
 * What a person says about a delimited text file. A given rate is used instead of the file's time column; a given unit holds
 * for the columns that state none.
 */
export interface TextReading {
  readonly rateHz: Hertz | null;
  readonly unit: string | null;
}
