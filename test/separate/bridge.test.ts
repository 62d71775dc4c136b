import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { createRandom } from '../../src/numeric/random';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { bridged } from '../../src/separate/bridge';
import { leadSpectra } from '../../src/separate/lead-spectra';
import { createSeparation, redrawSlowWave } from '../../src/separate/separation';
import { ALL_ROUTES } from './all-routes';

const RATE_HZ = 4;

/** A 3 cpm wave of 100 uV over white noise of 5 uV. */
function wavyLead(seconds: number): Float64Array {
  const random = createRandom(5);
  return Float64Array.from(
    { length: seconds * RATE_HZ },
    (_, i) => 100 * Math.sin((2 * Math.PI * 0.05 * i) / RATE_HZ) + 5 * random.gaussian(),
  );
}

function keptWithout(length: number, stretches: readonly (readonly [number, number])[]) {
  const kept = new Uint8Array(length).fill(1);
  for (const [fromS, toS] of stretches) kept.fill(0, fromS * RATE_HZ, toS * RATE_HZ);
  return kept;
}

function bridge(lead: Float64Array, kept: Uint8Array, margin = 0) {
  const spectra = atOnce(leadSpectra(lead, kept, RATE_HZ, 'zero'));
  if (!spectra) throw new Error('enough of the lead is there');
  return atOnce(bridged(lead, kept, RATE_HZ, spectra, margin));
}

const rootMeanSquare = (values: readonly number[]) =>
  Math.sqrt(values.reduce((sum, one) => sum + one * one, 0) / values.length);

describe('a bridged stretch', () => {
  it("takes the most likely course, to the digit of numpy's dense solution", () => {
    // test/reference/separate-bridge.py, numpy 1.24.
    const reference: {
      rate_hz: number;
      size: number;
      from: number;
      to: number;
      density: number[];
      lead: number[];
      filled: number[];
      filled_from: number;
      shift: number;
    } = JSON.parse(readFileSync('test/reference/separate-bridge.json', 'utf8'));
    const mean = Float64Array.from(reference.density);
    const { rate_hz, size, from, to, filled_from: first } = reference;
    const kept = new Uint8Array(reference.lead.length).fill(1).fill(0, from, to);
    const spectra = { windows: [mean], mean, binCpm: (60 * rate_hz) / size, size };
    const whole = atOnce(bridged(Float64Array.from(reference.lead), kept, rate_hz, spectra, 0));
    reference.filled.forEach((value, i) => {
      expect(Math.abs(whole[first + i] - value)).toBeLessThan(1e-6);
    });
    const next = first + reference.filled.length;
    expect(whole[next] - reference.lead[next]).toBeCloseTo(reference.shift, 6);
    expect(whole.slice(0, first)).toEqual(Float64Array.from(reference.lead.slice(0, first)));
  });

  it('carries a wave on across 15 s of nothing, near to what was there', () => {
    const lead = wavyLead(1200);
    const kept = keptWithout(lead.length, [[600, 615]]);
    const torn = lead.map((value, i) => (kept[i] === 0 ? Number.NaN : value));
    const whole = bridge(torn, kept);
    const misses = Array.from({ length: 60 }, (_, i) => whole[2400 + i] - lead[2400 + i]);
    expect(rootMeanSquare(misses)).toBeLessThan(15);
  });

  it('foretells the wave for half a cycle beyond the ends of the lead', () => {
    const lead = wavyLead(1200);
    const whole = bridge(lead, keptWithout(lead.length, []), 40);
    for (let i = 0; i < 40; i += 1)
      expect(
        Math.abs(whole[40 + lead.length + i] - 100 * Math.sin((2 * Math.PI * 0.05 * i) / RATE_HZ)),
      ).toBeLessThan(30);
  });

  it('joins stretches that only a few seconds part, whose level nothing tells', () => {
    const lead = wavyLead(1200);
    const disturbed = lead.map((value, i) => value + (i >= 2440 && i < 2452 ? 3000 : 0));
    const kept = keptWithout(lead.length, [
      [600, 610],
      [613, 620],
    ]);
    const whole = bridge(disturbed, kept);
    for (let i = 2400; i < 2480; i += 1) expect(Math.abs(whole[i])).toBeLessThan(200);
  });
});

describe('in the drawn wave', () => {
  const RATE = 50;
  const [FROM_S, TO_S] = [600, 630];
  const clean = Float64Array.from(
    { length: 1500 * RATE },
    (() => {
      const random = createRandom(9);
      return (_: unknown, i: number) =>
        100 * Math.sin((2 * Math.PI * 0.05 * i) / RATE) + 10 * random.gaussian();
    })(),
  );
  const draw = (lead: Float64Array, spoiledS: readonly (readonly [number, number])[]) => {
    const separation = createSeparation({
      lead: '#1',
      rateHz: RATE,
      sampleCount: lead.length,
      settings: DEFAULT_SETTINGS,
      routes: ALL_ROUTES,
      wants: { slow: true, heart: false },
    });
    separation.push(lead);
    const { slow } = separation.finish();
    if (!slow) throw new Error('a slow wave was asked for');
    const kept = keptWithout(slow.recorded.length, spoiledS);
    const drawing = { dfCpm: 3, kept, breathing: null, heartPart: null };
    return redrawSlowWave(slow, DEFAULT_SETTINGS, drawing, ALL_ROUTES).slowWave;
  };
  const plain = draw(clean, []);
  /** Root mean square of what an artefact changes in the two minutes on either side of its stretch. */
  const ringing = (drawn: Float64Array) =>
    rootMeanSquare(
      Array.from(drawn, (value, i) => value - plain[i]).filter(
        (_, i) =>
          (i > (FROM_S - 120) * RATE_HZ && i < FROM_S * RATE_HZ) ||
          (i > TO_S * RATE_HZ && i < (TO_S + 120) * RATE_HZ),
      ),
    );

  it.each([
    ['a step of 5 mV', (t: number) => (t < 610 ? 0 : 5000)],
    ['a pop of 4 mV', (t: number) => (t > 610 && t < 611 ? 4000 : 0)],
    ['a swing of 1 mV', (t: number) => (t > 605 && t < 625 ? 1000 * Math.sin(t) : 0)],
    ['an offset of 300 mV', (t: number) => (t < 610 ? 0 : 300_000)],
  ])('%s does not ring into the minutes beside it', (_, artefact) => {
    const lead = clean.map((value, i) => value + artefact(i / RATE));
    expect(ringing(draw(lead, []))).toBeGreaterThan(15);
    expect(ringing(draw(lead, [[FROM_S, TO_S]]))).toBeLessThan(15);
  });
});
