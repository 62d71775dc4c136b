import type { LagInEpoch, LeadPair } from '../../recording/evidence/leads';
import { PhaseMarks, TimeAxis, ValueAxis } from './chart-axes';
import { CHART_WIDTH, type TimeScale, timeScale, valueScale } from './chart-scale';

const TOP = 22;
const BOTTOM = 142;
const HEIGHT = 166;

type Compared = Extract<LeadPair, { kind: 'compared' }>;

interface LagStripProps {
  readonly pair: Compared;
}

/** Lags over time, one an epoch with its 95 % range; hollow where the leads share a DF outside the normal band. */
export function LagStrip({ pair }: LagStripProps) {
  const { phases, strip, firstName, secondName } = pair;
  const scale = timeScale(
    Math.min(...phases.map(({ fromS }) => fromS)),
    Math.max(...phases.map(({ toS }) => toS)),
  );
  const known = strip.filter((one) => one.lagS !== null);
  const values = valueScale([0, ...known.flatMap(({ lowS, highS }) => [lowS ?? 0, highS ?? 0])], 4);
  const perUnit = (BOTTOM - TOP) / (values.high - values.low);
  const y = (value: number) => BOTTOM - (value - values.low) * perUnit;
  return (
    <div className="chart">
      <svg
        viewBox={`0 0 ${CHART_WIDTH} ${HEIGHT}`}
        role="img"
        aria-label={`Lag of ${secondName} behind ${firstName} over time, ${known.length} of ${strip.length} epochs; the numbers stand in the table below`}
      >
        <ValueAxis
          values={values}
          y={y}
          endX={scale.endX}
          name="lag"
          unit="s"
          middleY={(TOP + BOTTOM) / 2}
        />
        <PhaseMarks scale={scale} phases={phases} bottomY={BOTTOM} />
        <g className="stomach">
          {known.map((one) => (
            <LagDot key={`${one.fromS}`} one={one} scale={scale} y={y} />
          ))}
        </g>
        <TimeAxis scale={scale} y={BOTTOM} />
      </svg>
    </div>
  );
}

interface LagDotProps {
  readonly one: LagInEpoch;
  readonly scale: TimeScale;
  readonly y: (value: number) => number;
}

function LagDot({ one, scale, y }: LagDotProps) {
  const { fromS, toS, lagS, lowS, highS, coupled } = one;
  if (lagS === null || lowS === null || highS === null) return null;
  const x = scale.x((fromS + toS) / 2);
  return (
    <>
      <line className="chart-whisker" x1={x} x2={x} y1={y(lowS)} y2={y(highS)} />
      <circle className={coupled ? 'chart-dot' : 'chart-dot hollow'} cx={x} cy={y(lagS)} r={3} />
    </>
  );
}
