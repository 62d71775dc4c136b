import { describe, expect, it } from 'vitest';
import { coveredSeconds } from '../../src/recording/span';
import { DEMO_SPEC } from '../../src/simulate/demo';
import { simulateStudy } from '../../src/simulate/simulate-study';
import { createSpoilWatch } from '../../src/trust/spoil-watch';

function watched(x: Float64Array) {
  const watch = createSpoilWatch({
    lead: '#1',
    rateHz: DEMO_SPEC.rateHz,
    railsUv: [-3276.7, 3276.7],
    stepUv: 0.1,
  });
  watch.push(x);
  return watch.finish();
}

describe('the invented demo study, which the limits were not set on', () => {
  it('has every disturbance found for the heart on the leads it touches, talk and muscle wholly or not at all', () => {
    const { signals, truth } = simulateStudy(DEMO_SPEC);
    signals.forEach((signal, lead) => {
      const heart = watched(signal).filter((one) => one.target !== 'stomach');
      const onLead = truth.spoiled.filter((one) => one.leads === null || one.leads.includes(lead));
      for (const { cause, fromS, toS } of onLead) {
        const share = coveredSeconds(heart, fromS, toS) / (toS - fromS);
        if (cause === 'step' || share === 0) {
          expect(['step', 'talk', 'eat', 'burst']).toContain(cause);
          continue;
        }
        expect(share, `${cause} at ${fromS} s on lead ${lead}`).toBeGreaterThan(0.9);
      }
      const meant = truth.spoiled.map(({ fromS, toS }) => ({ fromS: fromS - 3, toS: toS + 3 }));
      for (const { cause, fromS, toS } of heart)
        expect(coveredSeconds(meant, fromS, toS), `${cause} ${fromS}`).toBeCloseTo(toS - fromS, 6);
    });
  }, 60000);

  it('has its movements, step, lifted electrode, rail and flat line found for the stomach', () => {
    const { signals, truth } = simulateStudy(DEMO_SPEC);
    signals.forEach((signal, lead) => {
      const stomach = watched(signal).filter((one) => one.target !== 'heart');
      const harmful = truth.spoiled.filter(
        ({ cause, leads }) =>
          ['move', 'electrode', 'rail', 'flat', 'step'].includes(cause) &&
          (leads === null || leads.includes(lead)),
      );
      for (const { cause, fromS, toS } of harmful) {
        const least = cause === 'step' ? 0.1 : 0.9;
        const share = coveredSeconds(stomach, fromS, toS) / (toS - fromS);
        expect(share, `${cause} at ${fromS} s on lead ${lead}`).toBeGreaterThan(least);
      }
    });
  }, 60000);

  it('has nothing found on any of its three leads where nothing was disturbed', () => {
    const { signals } = simulateStudy({ ...DEMO_SPEC, artefacts: [] });
    for (const signal of signals) expect(watched(signal)).toEqual([]);
  }, 60000);
});
