import type { Epoch, SlowWaveRhythm } from '../recording/rhythm';
import { type Cell, csvText, flagCell, numberCell, timeCell } from './csv';

/** Decimals of a dominant frequency in cpm, a level in dB, and a share from 0 to 1. */
export const DF_DECIMALS = 2;
export const DB_DECIMALS = 1;
export const SHARE_DECIMALS = 4;

const HEADER = [
  'start_s',
  'end_s',
  'lead',
  'phase',
  'kept',
  'spoiled_fraction',
  'df_cpm',
  'dp_db',
  'peak_share',
  'rhythm',
  'flags',
];

/** epochs.csv: one row an epoch and slow-wave lead, lead after lead. */
export function epochsCsv(stomach: readonly SlowWaveRhythm[]): string {
  return csvText(
    HEADER,
    stomach.flatMap(({ epochs }) => epochs.map(epochRow)),
  );
}

function epochRow(epoch: Epoch): Cell[] {
  return [
    timeCell(epoch.fromS),
    timeCell(epoch.toS),
    epoch.lead,
    epoch.phase,
    flagCell(epoch.kept),
    numberCell(epoch.spoiledFraction, SHARE_DECIMALS),
    numberCell(epoch.dfCpm, DF_DECIMALS),
    numberCell(epoch.dpDb, DB_DECIMALS),
    numberCell(epoch.peakShare, SHARE_DECIMALS),
    epoch.rhythm,
    epoch.flags.join(' '),
  ];
}
