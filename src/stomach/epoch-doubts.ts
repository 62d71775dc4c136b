import type { Doubt, Mend } from '../recording/doubt';
import type { Epoch, EpochFlag, Rhythm } from '../recording/rhythm';
import type { RhythmBands } from '../recording/settings';
import { hasRhythm, rhythmOf } from './rhythm-class';

/** An epoch whose rhythm would be another one without a flag. */
interface Hanging {
  readonly epoch: Epoch;
  readonly flag: EpochFlag;
  readonly without: Rhythm;
}

/** A flag that holds for more epochs in a row than this is no stretch to be left out: it is looked at and kept. */
const MOST_LEFT_OUT = 3;
/** Times are sums of steps: equal where they differ by less than this. */
const ROUNDING_S = 1e-6;

const RHYTHM_WORDS: Readonly<Record<Rhythm, string>> = {
  brady: 'bradygastria',
  normo: 'normogastria',
  tachy: 'tachygastria',
  none: 'no rhythm',
  mixed: 'mixed',
  undecided: 'not decidable',
};

const FLAG_WORDS: Readonly<Record<EpochFlag, (cpm: string) => string>> = {
  harmonic: (cpm) => `that a larger peak at twice ${cpm} is taken for its harmonic`,
  half: (cpm) => `that the crests of the drawn wave, twice as fast as ${cpm}, are not believed`,
  breathing: (cpm) => `that the peak at ${cpm} lies where breathing does`,
  drift: (cpm) => `that the peak at ${cpm} stands on the flank of a drift`,
  filled: () => 'what is spoiled in it',
};

/** What an epoch's rhythm would be without its one flag that decides it; null where no single flag does. */
function hanging(epoch: Epoch, bands: RhythmBands): Hanging | null {
  const { dfCpm, rhythm, flags } = epoch;
  if (!epoch.kept || dfCpm === null || rhythm === null) return null;
  const [flag, another] = flags.filter((one) => one !== 'filled');
  if (flag === undefined || another !== undefined) return null;
  const takesAway = flag === 'breathing' || flag === 'drift';
  if (!takesAway && !hasRhythm(epoch)) return null;
  const without = rhythmOf(takesAway ? dfCpm : 2 * dfCpm, bands);
  return without === rhythm ? null : { epoch, flag, without };
}

/** Epochs in a row that hang on the same flag are one place. */
function rows(epochs: readonly Epoch[], bands: RhythmBands, stepS: number): readonly Hanging[][] {
  const found: Hanging[][] = [];
  for (const epoch of epochs) {
    const one = hanging(epoch, bands);
    if (!one) continue;
    const last = found.at(-1)?.at(-1);
    const goesOn =
      last?.flag === one.flag &&
      last.without === one.without &&
      last.epoch.phase === epoch.phase &&
      last.epoch.rhythm === epoch.rhythm &&
      epoch.fromS - last.epoch.fromS < stepS + ROUNDING_S;
    if (goesOn) found.at(-1)?.push(one);
    else found.push([one]);
  }
  return found;
}

const leaveOut = (lead: string, fromS: number, toS: number): Mend => ({
  kind: 'exclude',
  words: 'exclude stretch',
  span: { fromS, toS, lead, target: 'stomach', cause: 'other', origin: 'drawn', note: '' },
});

/**
 * Doubts of the epochs of one lead, ascending, whose rhythm would be another one without a single flag: `harmonic` and `half`
 * at twice the rate, `breathing` and `drift` as if the peak were the stomach's. Up to three in a row propose to leave out the
 * middle of them, which takes these away and keeps those beside them.
 */
export function epochDoubts(
  epochs: readonly Epoch[],
  bands: RhythmBands,
  stepS: number,
): readonly Doubt[] {
  return rows(epochs, bands, stepS).map((row): Doubt => {
    const [{ epoch, flag, without }] = row;
    const last = row[row.length - 1].epoch;
    const [fromS, toS] = [
      (epoch.fromS + epoch.toS - stepS) / 2,
      (last.fromS + last.toS + stepS) / 2,
    ];
    const cpm = `${(epoch.dfCpm ?? Number.NaN).toFixed(1)} cpm`;
    const rhythm = RHYTHM_WORDS[epoch.rhythm ?? 'none'];
    const these = row.length === 1 ? 'This epoch is' : `These ${row.length} epochs are`;
    return {
      id: `epoch-${epoch.lead}-${flag}-${Math.round(epoch.fromS)}`,
      kind: 'epoch',
      fromS,
      toS,
      tick: null,
      lead: epoch.lead,
      why: `${these} ${rhythm} only because of one thing: ${FLAG_WORDS[flag](cpm)}. Without that ${row.length === 1 ? 'it' : 'they'} would be ${RHYTHM_WORDS[without]}.`,
      mend: row.length > MOST_LEFT_OUT ? null : leaveOut(epoch.lead, fromS, toS),
      effect: null,
    };
  });
}
