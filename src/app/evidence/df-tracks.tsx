import type { EpochOpinions, OpinionsEvidence } from '../../recording/evidence/opinions';
import type { Cpm } from '../../units/rate';
import type { Seconds } from '../../units/time';
import { PhaseMarks, TimeAxis, ValueAxis } from './chart-axes';
import { CHART_WIDTH, timeScale, valueScale } from './chart-scale';

const TOP = 24;
const BOTTOM = 244;
const HEIGHT = BOTTOM + 24;
/** Room above and below, so that methods that differ by hundredths look alike. */
const LEAST_ROOM_CPM = 0.6;

/** One epoch's frequency by one method, as a mark of the method's own shape. */
type MarkOf = (x: number, y: number) => string;

const METHODS: readonly {
  readonly name: string;
  readonly of: (epoch: EpochOpinions) => Cpm | null;
  readonly className: string;
  readonly path: MarkOf;
}[] = [
  {
    name: 'DF of the figures',
    of: ({ hannCpm }) => hannCpm,
    className: 'df-hann',
    path: (x, y) => `M${x - 5} ${y}h10`,
  },
  {
    name: 'Burg',
    of: ({ burgCpm }) => burgCpm,
    className: 'df-burg',
    path: (x, y) => `M${x - 3.5} ${y}a3.5 3.5 0 1 0 7 0a3.5 3.5 0 1 0 -7 0`,
  },
  {
    name: 'multitaper',
    of: ({ multitaperCpm }) => multitaperCpm,
    className: 'df-multitaper',
    path: (x, y) => `M${x - 3.5} ${y - 3.5}l7 7m0 -7l-7 7`,
  },
  {
    name: 'crests a minute',
    of: ({ crestCpm }) => crestCpm,
    className: 'df-crests',
    path: (x, y) => `M${x} ${y - 4}l4 7h-8z`,
  },
];

/** The first and last time of some parts; 0 and 1 s of none. */
function spanOf({ parts }: OpinionsEvidence): readonly [Seconds, Seconds] {
  const from = Math.min(...parts.map(({ fromS }) => fromS));
  const to = Math.max(...parts.map(({ toS }) => toS));
  return parts.length > 0 ? [from, to] : [0, 1];
}

/** The dominant frequency of every kept epoch by each method, over time. */
export function DfTracks({ value }: { readonly value: OpinionsEvidence }) {
  const scale = timeScale(...spanOf(value));
  const all = value.epochs
    .flatMap((epoch) => METHODS.map(({ of }) => of(epoch)))
    .filter((one) => one !== null);
  const values = valueScale(
    all.flatMap((cpm) => [cpm - LEAST_ROOM_CPM, cpm + LEAST_ROOM_CPM]),
    6,
  );
  const y = (cpm: Cpm): number =>
    BOTTOM - ((cpm - values.low) / (values.high - values.low)) * (BOTTOM - TOP);
  const phases = value.parts.filter(({ name, phase }) => name === phase);
  return (
    <figure className="chart">
      <svg
        viewBox={`0 0 ${CHART_WIDTH} ${HEIGHT}`}
        role="img"
        aria-label="Dominant frequency over time by three methods, and crests a minute; the numbers are in the tables below"
      >
        <ValueAxis
          values={values}
          y={y}
          endX={scale.endX}
          name="DF"
          unit="cpm"
          middleY={(TOP + BOTTOM) / 2}
        />
        <PhaseMarks scale={scale} phases={phases} bottomY={BOTTOM} />
        {METHODS.map(({ className, of, path }) => (
          <path
            key={className}
            className={className}
            d={value.epochs
              .map((epoch) => {
                const cpm = of(epoch);
                return cpm === null ? '' : path(scale.x(epoch.centreS), y(cpm));
              })
              .join('')}
          />
        ))}
        <TimeAxis scale={scale} y={BOTTOM} />
      </svg>
      <Legend />
    </figure>
  );
}

/** What each shape stands for. */
function Legend() {
  return (
    <figcaption className="df-legend">
      {METHODS.map(({ name, className, path }) => (
        <span key={name}>
          <svg width="16" height="16" viewBox="0 0 16 16" aria-hidden="true">
            <path className={className} d={path(8, 8)} />
          </svg>
          {name}
        </span>
      ))}
    </figcaption>
  );
}
