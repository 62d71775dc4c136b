import { sin } from '../../src/numeric/elementary';
import { atOnce } from '../../src/numeric/in-steps';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { MAP_ORDERS, MAP_WINDOWS_MS, type MapOrgan } from '../../src/recording/settings-map';
import { foldedLead, fractionalResponses } from '../../src/separate/route-responses';
import { readyStretch } from '../../src/trust/match-score';
import { scoreMapInSteps } from '../../src/trust/score-map';
import { stretchProducts } from '../../src/trust/stretch-products';
import { inventedStudy, RATE_HZ } from './invented-study';
import {
  type Measured,
  medianTimed,
  type Part,
  ratioLine,
  type Timed,
  timed,
  timeLine,
} from './measured';
import { separate } from './separate-lead';

const PART = 'maps';
const ROUNDS = 7;
/** Stretches as the page takes them. */
const STRETCH_S: Readonly<Record<MapOrgan, number>> = { slow: 1200, heart: 600 };
const MOST_AHEAD_S: Readonly<Record<MapOrgan, number>> = { slow: 5, heart: 0.03 };

/** One map from a lead's samples on: folding, spectra, responses and all cells. */
function map(organ: MapOrgan, samples: Float64Array): number {
  const lead = atOnce(foldedLead(organ, samples, RATE_HZ));
  const turn = (2 * Math.PI * (organ === 'slow' ? 0.05 : 1.2)) / lead.rateHz;
  const target = lead.samples.map((_, i) => sin(turn * i) ** (organ === 'slow' ? 1 : 2));
  const products = stretchProducts(target, lead.samples, lead.rateHz);
  const ask = { organ, rateHz: RATE_HZ, freqsHz: products.freqsHz };
  const factors = fractionalResponses(DEFAULT_SETTINGS.fractional, ask);
  const stretch = readyStretch(products, MOST_AHEAD_S[organ]);
  const rows = atOnce(scoreMapInSteps(stretch, factors, MAP_ORDERS, MAP_WINDOWS_MS[organ]));
  return rows.reduce((cells, row) => cells + row.length, 0);
}

/** A map of each organ against two ordinary separations of the same stretch at 1 kHz, in turns. */
export const maps: Part = async ({ minutes }) => {
  const [signal] = inventedStudy(Math.max(minutes, 20)).signals;
  const lines: Measured[] = [];
  for (const organ of ['slow', 'heart'] as const) {
    const samples = signal.slice(0, STRETCH_S[organ] * RATE_HZ);
    const twice = () => {
      separate(samples, 'fractional', DEFAULT_SETTINGS);
      separate(samples, 'fractional', DEFAULT_SETTINGS);
    };
    const runs: Record<'map' | 'twice', Timed[]> = { map: [], twice: [] };
    let cells = 0;
    for (let round = 0; round <= ROUNDS; round += 1) {
      const one = await timed(() => map(organ, samples));
      cells = one.made;
      runs.map.push(one);
      runs.twice.push(await timed(twice));
    }
    const [ours, reference] = [medianTimed(runs.map.slice(1)), medianTimed(runs.twice.slice(1))];
    const what = `${organ === 'slow' ? 'slow wave' : 'heartbeat'}, ${STRETCH_S[organ] / 60} min at 1 kHz`;
    lines.push(
      timeLine(PART, `${what}: map of ${cells} cells, from the samples`, ours),
      timeLine(PART, `${what}: two separations of it`, reference),
      ratioLine(PART, `${what}: map quicker than two separations`, reference, ours, 'at least 1'),
    );
  }
  return lines;
};
