import type { SharedPhase, SharedWindow } from '../../recording/evidence/together';
import { PhaseMarks, TimeAxis, ValueAxis } from './chart-axes';
import { CHART_WIDTH, type TimeScale, timeScale, valueScale } from './chart-scale';

const TOP = 24;
const ROW = 58;
const GAP = 22;

interface Row {
  readonly name: string;
  readonly unit: string;
  readonly organ: 'stomach' | 'heart' | 'breathing';
  readonly of: (one: SharedWindow) => number | null;
}

const ROWS: readonly Row[] = [
  { name: 'DF', unit: 'cpm', organ: 'stomach', of: ({ dfCpm }) => dfCpm },
  { name: 'DP', unit: 'dB', organ: 'stomach', of: ({ dpDb }) => dpDb },
  { name: 'Heart rate', unit: '1/min', organ: 'heart', of: ({ heartRateBpm }) => heartRateBpm },
  { name: 'HF', unit: 'ms²', organ: 'heart', of: ({ hfMs2 }) => hfMs2 },
  { name: 'Breathing', unit: '1/min', organ: 'breathing', of: (one) => one.breathingPerMin },
];

interface SharedChartsProps {
  readonly windows: readonly SharedWindow[];
  readonly phases: readonly SharedPhase[];
}

/** DF, DP, heart rate, HF and breathing over the same minutes, one above the other. */
export function SharedCharts({ windows, phases }: SharedChartsProps) {
  const scale = timeScale(
    Math.min(...phases.map(({ fromS }) => fromS)),
    Math.max(...phases.map(({ toS }) => toS)),
  );
  const bottomY = TOP + ROWS.length * (ROW + GAP) - GAP;
  return (
    <div className="chart">
      <svg
        viewBox={`0 0 ${CHART_WIDTH} ${bottomY + 24}`}
        role="img"
        aria-label="DF, DP, heart rate, HF and breathing over the same minutes; the numbers stand in the table below"
      >
        <PhaseMarks scale={scale} phases={phases} bottomY={bottomY} />
        {ROWS.map((row, i) => (
          <ChartRow
            key={row.name}
            row={row}
            windows={windows}
            scale={scale}
            topY={TOP + i * (ROW + GAP)}
          />
        ))}
        <TimeAxis scale={scale} y={bottomY + 2} />
      </svg>
    </div>
  );
}

interface ChartRowProps {
  readonly row: Row;
  readonly windows: readonly SharedWindow[];
  readonly scale: TimeScale;
  readonly topY: number;
}

function ChartRow({ row, windows, scale, topY }: ChartRowProps) {
  const known = windows.flatMap((one) => {
    const value = row.of(one);
    return value === null ? [] : [{ atS: (one.fromS + one.toS) / 2, value }];
  });
  const values = valueScale(
    known.map(({ value }) => value),
    2,
  );
  const bottomY = topY + ROW;
  const perUnit = ROW / (values.high - values.low);
  const y = (value: number) => bottomY - (value - values.low) * perUnit;
  return (
    <g className={row.organ}>
      <ValueAxis
        values={values}
        y={y}
        endX={scale.endX}
        name={row.name}
        unit={row.unit}
        middleY={topY + ROW / 2}
      />
      {known.map(({ atS, value }) => (
        <circle key={atS} className="chart-dot" cx={scale.x(atS)} cy={y(value)} r={2} />
      ))}
      {known.length === 0 ? (
        <text x={scale.x((scale.fromS + scale.toS) / 2)} y={topY + ROW / 2 + 4} textAnchor="middle">
          not known in any window
        </text>
      ) : null}
    </g>
  );
}
