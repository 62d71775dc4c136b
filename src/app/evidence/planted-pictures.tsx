import type { PlantedHeart, PlantedSlow, PlantedWave } from '../../recording/evidence/planted';
import { formatClock } from '../../units/time';

const WIDTH = 900;
const LEFT = 64;
const RIGHT = 12;
const TOP = 10;
const BOTTOM = 30;
const HEIGHT = 190;
/** Half of the widest label of a time axis. */
const HALF_LABEL = 28;

interface Scale {
  readonly low: number;
  readonly high: number;
  /** From a value to the picture's coordinate. */
  readonly at: (value: number) => number;
}

const across = (low: number, high: number): Scale => ({
  low,
  high,
  at: (value) => LEFT + ((value - low) / (high - low)) * (WIDTH - LEFT - RIGHT),
});

const upwards = (low: number, high: number, bottom = HEIGHT - BOTTOM): Scale => ({
  low,
  high,
  at: (value) => bottom - ((value - low) / (high - low)) * (bottom - TOP),
});

/** A step of 1, 2 or 5 times a power of ten of which a range holds about four. */
function niceStep(range: number): number {
  let step = 1;
  while (step * 5 < range) step *= 10;
  while (step * 5 > range) step /= 10;
  for (const factor of [2, 5, 10]) if (step * 5 < range) step *= factor / (factor === 5 ? 2 : 1);
  return range / step > 8 ? step * 2 : step;
}

const ticksOf = ({ low, high }: Scale, step: number): readonly number[] => {
  const first = Math.ceil(low / step);
  const count = Math.floor(high / step + 1e-9) - first + 1;
  return Array.from({ length: Math.max(0, count) }, (_, k) => (first + k) * step);
};

/** Points joined by straight lines, broken where a value is missing. */
function pathOf(values: ArrayLike<number>, x: (i: number) => number, y: Scale): string {
  let path = '';
  let isDown = false;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i];
    if (Number.isNaN(value)) {
      isDown = false;
      continue;
    }
    const held = Math.max(y.low, Math.min(y.high, value));
    path += `${isDown ? 'L' : 'M'}${x(i).toFixed(1)} ${y.at(held).toFixed(1)}`;
    isDown = true;
  }
  return path;
}

interface AxesProps {
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly (readonly [value: number, text: string])[];
  readonly yStep: number;
  readonly unit: string;
}

function Axes({ x, y, xTicks, yStep, unit }: AxesProps) {
  const bottom = y.at(y.low);
  return (
    <g className="planted-axes">
      {ticksOf(y, yStep).map((value) => (
        <g key={value}>
          <line x1={LEFT} x2={WIDTH - RIGHT} y1={y.at(value)} y2={y.at(value)} />
          <text x={LEFT - 6} y={y.at(value) + 4} textAnchor="end">
            {String(Number(value.toPrecision(3))).replace('-', '−')}
          </text>
        </g>
      ))}
      {xTicks.map(([value, text]) => (
        <text
          key={value}
          x={x.at(value)}
          y={bottom + 18}
          textAnchor={x.at(value) > WIDTH - RIGHT - HALF_LABEL ? 'end' : 'middle'}
        >
          {text}
        </text>
      ))}
      <text x={4} y={TOP + 6}>
        {unit}
      </text>
    </g>
  );
}

/** Farthest from 0 that values go, to one side or (0) to either. */
const sizeOf = (values: Float32Array, sign = 0): number =>
  values.reduce(
    (most, one) =>
      Number.isNaN(one) ? most : Math.max(most, sign === 0 ? Math.abs(one) : sign * one),
    0,
  );

/** The planted wave and what was drawn, over the same few minutes. */
export function WaveInTime({ wave }: { readonly wave: PlantedWave }) {
  const { fromS, stepS, plantedUv, drawnUv } = wave.picture;
  const toS = fromS + plantedUv.length * stepS;
  const reach = 1.1 * Math.max(sizeOf(plantedUv), sizeOf(drawnUv), 1e-6);
  const [x, y] = [across(fromS, toS), upwards(-reach, reach)];
  const place = (i: number) => x.at(fromS + i * stepS);
  const minutes = ticksOf(x, 60).map((s) => [s, formatClock(s)] as const);
  return (
    <svg
      className="planted-picture"
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      role="img"
      aria-label={`The planted wave, dashed, and the drawn one over ${formatClock(fromS)} to ${formatClock(toS)}`}
    >
      <Axes x={x} y={y} xTicks={minutes} yStep={niceStep(reach)} unit="µV" />
      <path className="planted-drawn" d={pathOf(drawnUv, place, y)} />
      <path className="planted-wave" d={pathOf(plantedUv, place, y)} />
    </svg>
  );
}

/** Spectrum of the leftover with and without the planted wave. */
export function WaveSpectrum({
  wave,
  slow,
}: {
  readonly wave: PlantedWave;
  readonly slow: PlantedSlow;
}) {
  const { spectrumDb } = wave.picture;
  const { leftoverDb, binCpm } = slow;
  const from = Math.max(1, Math.ceil(0.5 / binCpm));
  const shown = [...spectrumDb.subarray(from), ...leftoverDb.subarray(from)];
  const high = 10 * Math.ceil((Math.max(...shown) + 1) / 10);
  const low = Math.max(high - 70, 10 * Math.floor((Math.min(...shown) - 1) / 10));
  const [x, y] = [across(0.5, 10), upwards(low, high)];
  const place = (i: number) => x.at((from + i) * binCpm);
  const rates = [1, 2, 3, 4, 5, 6, 7, 8, 9].map((cpm) => [cpm, String(cpm)] as const);
  const planted = wave.rate.kind === 'steady' ? [wave.rate.cpm] : [];
  return (
    <svg
      className="planted-picture"
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      role="img"
      aria-label="Mean spectrum of the leftover, dotted, and with the planted wave"
    >
      <Axes x={x} y={y} xTicks={rates} yStep={high - low > 40 ? 20 : 10} unit="dB" />
      {planted.map((cpm) => (
        <line
          key={cpm}
          className="planted-at"
          x1={x.at(cpm)}
          x2={x.at(cpm)}
          y1={TOP}
          y2={y.at(low)}
        />
      ))}
      <path className="planted-drawn" d={pathOf(spectrumDb.subarray(from), place, y)} />
      <path className="planted-rest" d={pathOf(leftoverDb.subarray(from), place, y)} />
      <text className="planted-unit" x={WIDTH - RIGHT} y={HEIGHT - 12} textAnchor="end">
        cpm
      </text>
    </svg>
  );
}

const MARKS = 54;

interface MarksProps {
  readonly name: string;
  readonly times: readonly number[];
  readonly x: Scale;
  readonly y: number;
  readonly shape: string;
}

/** A row of marks of one kind, its name in the gutter. */
function Marks({ name, times, x, y, shape }: MarksProps) {
  return (
    <g className="planted-marks">
      <text x={4} y={y + 4}>
        {name}
      </text>
      {times.map((s) => (
        <path key={s} d={`M${x.at(s).toFixed(1)} ${y}${shape}`} />
      ))}
    </g>
  );
}

/** Ten seconds of the leftover's heartbeat signal with planted beats, and what was found. */
export function BeatsInTime({ heart }: { readonly heart: PlantedHeart }) {
  const { fromS, stepS, heartbeatUv, plantedS, foundS, leftOutS } = heart.picture;
  const toS = fromS + heartbeatUv.length * stepS;
  const [high, low] = [1, -1].map((sign) => 1.1 * sign * sizeOf(heartbeatUv, sign));
  const x = across(fromS, toS);
  const y = upwards(Math.min(low, high - 1), high);
  const seconds = ticksOf(x, 2).map((s) => [s, formatClock(s)] as const);
  const place = (i: number) => x.at(fromS + i * stepS);
  return (
    <svg
      className="planted-picture"
      viewBox={`0 0 ${WIDTH} ${HEIGHT + MARKS}`}
      role="img"
      aria-label={`Heartbeat signal over ten seconds: ${plantedS.length} planted beats, ${foundS.length} found`}
    >
      <Axes x={x} y={y} xTicks={seconds} yStep={niceStep((high - y.low) / 2)} unit="µV" />
      {leftOutS.map((s) => (
        <rect
          key={s}
          className="planted-own"
          x={x.at(Math.max(fromS, s - 0.15))}
          width={Math.max(0, x.at(Math.min(toS, s + 0.15)) - x.at(Math.max(fromS, s - 0.15)))}
          y={TOP}
          height={y.at(y.low) - TOP}
        />
      ))}
      <path className="planted-heart" d={pathOf(heartbeatUv, place, y)} />
      <Marks name="planted" times={plantedS} x={x} y={HEIGHT + 8} shape="m-5 -5h10l-5 10z" />
      <Marks
        name="found"
        times={foundS}
        x={x}
        y={HEIGHT + 32}
        shape="m-5 0a5 5 0 1 0 10 0a5 5 0 1 0 -10 0"
      />
    </svg>
  );
}
