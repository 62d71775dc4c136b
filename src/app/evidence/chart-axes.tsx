import type { Seconds } from '../../units/time';
import { CHART_LEFT, type TimeScale, timeTicks, type ValueScale, written } from './chart-scale';

interface Stretch {
  readonly name: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
}

interface TimeAxisProps {
  readonly scale: TimeScale;
  readonly y: number;
}

/** The line of time under a chart. */
export function TimeAxis({ scale, y }: TimeAxisProps) {
  return (
    <g className="chart-axis">
      <line x1={CHART_LEFT} x2={scale.endX} y1={y} y2={y} />
      {timeTicks(scale).map(({ atS, words }) => (
        <g key={atS}>
          <line x1={scale.x(atS)} x2={scale.x(atS)} y1={y} y2={y + 4} />
          <text x={scale.x(atS)} y={y + 17} textAnchor="middle">
            {words}
          </text>
        </g>
      ))}
    </g>
  );
}

interface PhaseMarksProps {
  readonly scale: TimeScale;
  readonly phases: readonly Stretch[];
  readonly bottomY: number;
}

/** Borders of the phases through all charts, their names above. */
export function PhaseMarks({ scale, phases, bottomY }: PhaseMarksProps) {
  return (
    <g className="chart-phases">
      {phases.map(({ name, fromS, toS }) => (
        <g key={name}>
          <line x1={scale.x(fromS)} x2={scale.x(fromS)} y1={2} y2={bottomY} />
          <line x1={scale.x(toS)} x2={scale.x(toS)} y1={2} y2={bottomY} />
          {scale.x(toS) - scale.x(fromS) > 8 * name.length + 8 ? (
            <text x={scale.x(fromS) + 5} y={13}>
              {name}
            </text>
          ) : null}
        </g>
      ))}
    </g>
  );
}

interface ValueAxisProps {
  readonly values: ValueScale;
  readonly y: (value: number) => number;
  readonly endX: number;
  readonly name: string;
  readonly unit: string;
  /** Middle of the chart, beside which its name stands. */
  readonly middleY: number;
}

/** Round values with their lines, and what is drawn with its unit. */
export function ValueAxis({ values, y, endX, name, unit, middleY }: ValueAxisProps) {
  return (
    <g className="chart-axis">
      {values.ticks.map((value) => (
        <g key={value}>
          <line className="chart-rule" x1={CHART_LEFT} x2={endX} y1={y(value)} y2={y(value)} />
          <text x={CHART_LEFT - 6} y={y(value) + 4} textAnchor="end">
            {written(value, values.decimals)}
          </text>
        </g>
      ))}
      <text className="chart-name" x={0} y={middleY - 2}>
        {name}
      </text>
      <text x={0} y={middleY + 13}>
        {unit}
      </text>
    </g>
  );
}
