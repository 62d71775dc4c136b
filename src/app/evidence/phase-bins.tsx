import { cos } from '../../numeric/elementary';
import type { PhaseModulation } from '../../recording/evidence/together';
import { ValueAxis } from './chart-axes';
import { CHART_LEFT, CHART_WIDTH, valueScale } from './chart-scale';

const TOP = 12;
const BOTTOM = 132;
const HEIGHT = 172;
const END_X = CHART_LEFT + 540;
const TICKS_DEG = [0, 90, 180, 270, 360];

type Found = Extract<PhaseModulation, { kind: 'found' }>;

const xOf = (degrees: number) => CHART_LEFT + (degrees / 360) * (END_X - CHART_LEFT);
const RADIANS = Math.PI / 180;

/** RR by the phase of the slow wave: means of the bins, the cosine fitted to them, and how high chance alone may go. */
export function PhaseBins({ found, phase }: { readonly found: Found; readonly phase: string }) {
  const { binsMs, depthPct, chancePct, longestDeg, rrMeanMs } = found;
  const [depthMs, chanceMs] = [depthPct, chancePct].map((one) => (one * rrMeanMs) / 100);
  const values = valueScale([...binsMs, chanceMs, -chanceMs, depthMs, -depthMs], 4);
  const perUnit = (BOTTOM - TOP) / (values.high - values.low);
  const y = (value: number) => BOTTOM - (value - values.low) * perUnit;
  const cosine = Array.from({ length: 73 }, (_, k) => {
    const value = depthMs * cos((5 * k - longestDeg) * RADIANS);
    return `${k === 0 ? 'M' : 'L'}${xOf(5 * k).toFixed(1)} ${y(value).toFixed(1)}`;
  }).join('');
  const width = 360 / binsMs.length;
  return (
    <div className="chart">
      <svg
        viewBox={`0 0 ${CHART_WIDTH} ${HEIGHT}`}
        role="img"
        aria-label={`RR by the phase of the slow wave, ${phase}: ${binsMs.length} bins from its crest on, in ms about their mean: ${binsMs.map((one) => one.toFixed(1)).join(', ')}`}
      >
        <ValueAxis
          values={values}
          y={y}
          endX={END_X}
          name="RR about"
          unit="mean, ms"
          middleY={(TOP + BOTTOM) / 2}
        />
        {[chanceMs, -chanceMs].map((value) => (
          <line
            key={value}
            className="chart-chance"
            x1={CHART_LEFT}
            x2={END_X}
            y1={y(value)}
            y2={y(value)}
          />
        ))}
        <g className="heart">
          <path className="chart-line" d={cosine} />
          {binsMs.map((value, k) => (
            <circle
              key={xOf((k + 0.5) * width)}
              className="chart-dot"
              cx={xOf((k + 0.5) * width)}
              cy={y(value)}
              r={4}
            />
          ))}
        </g>
        <g className="chart-axis">
          <line x1={CHART_LEFT} x2={END_X} y1={BOTTOM} y2={BOTTOM} />
          {TICKS_DEG.map((degrees) => (
            <text key={degrees} x={xOf(degrees)} y={BOTTOM + 17} textAnchor="middle">
              {degrees}°
            </text>
          ))}
          <text x={(CHART_LEFT + END_X) / 2} y={BOTTOM + 34} textAnchor="middle">
            phase after the crest of the slow wave
          </text>
        </g>
        <Legend />
      </svg>
    </div>
  );
}

const LEGEND_X = END_X + 28;

function Legend() {
  return (
    <g>
      <g className="heart">
        <circle className="chart-dot" cx={LEGEND_X + 14} cy={28} r={4} />
        <line className="chart-line" x1={LEGEND_X} x2={LEGEND_X + 28} y1={54} y2={54} />
      </g>
      <line className="chart-chance" x1={LEGEND_X} x2={LEGEND_X + 28} y1={80} y2={80} />
      <text x={LEGEND_X + 38} y={32}>
        mean of a bin
      </text>
      <text x={LEGEND_X + 38} y={58}>
        cosine fitted to the bins
      </text>
      <text x={LEGEND_X + 38} y={84}>
        its height by chance, 95 %
      </text>
    </g>
  );
}
