import { pow } from '../numeric/elementary';

/** Power density in uV2/Hz of a level in dB re 1 uV2/Hz. */
export function densityOfDb(levelDb: number): number {
  return pow(10, levelDb / 10);
}
