/** One signal of a small EDF file: its scale and its digital samples, all records in a row. */
interface SignalBytes {
  readonly label: string;
  readonly physicalMin: number;
  readonly physicalMax: number;
  readonly digitalMin: number;
  readonly digitalMax: number;
  readonly digital: Int16Array;
}

interface FileBytes {
  readonly recordS: number;
  readonly records: number;
  readonly signals: readonly SignalBytes[];
}

/**
 * A plain EDF file (Kemp 1992) written field by field from the published layout, apart from the program's reader and writer;
 * every signal is in uV.
 */
export function plainEdf({ recordS, records, signals }: FileBytes): Blob {
  const header: [text: string, length: number][] = [
    ['0', 8],
    ['X X X X', 80],
    ['invented check values', 80],
    ['01.01.24', 8],
    ['00.00.00', 8],
    [String(256 * (signals.length + 1)), 8],
    ['', 44],
    [String(records), 8],
    [String(recordS), 8],
    [String(signals.length), 4],
  ];
  const block = (length: number, text: (signal: SignalBytes) => string | number) => {
    for (const signal of signals) header.push([String(text(signal)), length]);
  };
  block(16, ({ label }) => label);
  block(80, () => '');
  block(8, () => 'uV');
  block(8, ({ physicalMin }) => physicalMin);
  block(8, ({ physicalMax }) => physicalMax);
  block(8, ({ digitalMin }) => digitalMin);
  block(8, ({ digitalMax }) => digitalMax);
  block(80, () => '');
  block(8, ({ digital }) => digital.length / records);
  block(32, () => '');
  const text = header.map(([field, length]) => field.padEnd(length).slice(0, length)).join('');
  return new Blob([text, dataOf(signals, records)]);
}

/** Records one after the other, in each the samples of every signal, low byte first. */
function dataOf(signals: readonly SignalBytes[], records: number): DataView<ArrayBuffer> {
  const words = signals.reduce((sum, { digital }) => sum + digital.length, 0);
  const view = new DataView(new ArrayBuffer(2 * words));
  let at = 0;
  for (let record = 0; record < records; record += 1)
    for (const { digital } of signals) {
      const count = digital.length / records;
      for (let i = record * count; i < (record + 1) * count; i += 1) {
        view.setInt16(at, digital[i], true);
        at += 2;
      }
    }
  return view;
}
