import { describe, expect, test } from 'vitest';
import { beatTrain } from '../../src/heart/beat-train';
import { simulateSources } from '../../src/simulate/simulate-study';
import { PLAIN_LEAD, PLAIN_STUDY } from '../../src/simulate/spec';

/** What is not the truth in what was found, as a share of the truth's power. */
function restShare(found: Float64Array, truth: Float64Array): number {
  let [rest, all] = [0, 0];
  truth.forEach((value, i) => {
    rest += (found[i] - value) ** 2;
    all += value ** 2;
  });
  return rest / all;
}

function invented(heart: object) {
  const spec = {
    ...PLAIN_STUDY,
    seed: 11,
    durationS: 420,
    leads: [{ ...PLAIN_LEAD, heartUv: 250 }],
    heart: { ...PLAIN_STUDY.heart, ...heart } as (typeof PLAIN_STUDY)['heart'],
  };
  const { leads, truth } = simulateSources(spec);
  const [sources] = leads;
  const lead = new Float64Array(sources.heartbeat.length);
  for (const source of Object.values(sources))
    for (let i = 0; i < lead.length; i += 1) lead[i] += source[i];
  const places = Float64Array.from(truth.beats, ({ timeS }) => timeS * spec.rateHz);
  const classes = Uint8Array.from(truth.beats, ({ beatClass }) => (beatClass === 'N' ? 0 : 2));
  return { lead, places, classes, heartbeat: sources.heartbeat, rateHz: spec.rateHz };
}

describe('the average beats at their own times', () => {
  test('are the heartbeat that went into a lead of slow wave, breathing and drift', () => {
    const { lead, places, classes, heartbeat, rateHz } = invented({});
    const train = beatTrain(lead, rateHz, { places, classes });
    expect(train?.beats).toBeGreaterThan(0.97 * places.length);
    expect(restShare(train?.samples ?? lead, heartbeat)).toBeLessThan(0.005);
  });

  test('have an average for each class', () => {
    const { lead, places, classes, heartbeat, rateHz } = invented({ ventricularPerHour: 150 });
    const own = beatTrain(lead, rateHz, { places, classes });
    const mixed = beatTrain(lead, rateHz, { places, classes: classes.map(() => 0) });
    const rest = restShare(own?.samples ?? lead, heartbeat);
    expect(rest).toBeLessThan(0.02);
    expect(restShare(mixed?.samples ?? lead, heartbeat)).toBeGreaterThan(3 * rest);
  });

  test('are none where too few beats stand', () => {
    const { lead, places, rateHz } = invented({});
    const few = { places: places.slice(10, 14), classes: new Uint8Array(4) };
    expect(beatTrain(lead, rateHz, few)).toBeNull();
    expect(
      beatTrain(lead, rateHz, { places: new Float64Array(0), classes: new Uint8Array(0) }),
    ).toBeNull();
  });
});
