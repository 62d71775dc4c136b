import { describe, expect, it } from 'vitest';
import { phaseMark, phasesFromAnnotations } from '../../workers/propose-phases';

const mark = (onsetS: number, text: string, durationS: number | null = null) => ({
  onsetS,
  durationS,
  text,
});

describe('phases from annotations', () => {
  it('fasting, meal start, meal end: the fed phase begins two minutes after the meal', () => {
    expect(
      phasesFromAnnotations(
        [mark(0, 'fasting'), mark(1800, 'Meal start'), mark(2400, 'Meal end')],
        5400,
      ),
    ).toEqual([
      { name: 'fasting', fromS: 0, toS: 1800 },
      { name: 'meal', fromS: 1800, toS: 2400 },
      { name: 'fed', fromS: 2520, toS: 5400 },
    ]);
  });

  it('a meal with a duration ends by itself', () => {
    expect(phasesFromAnnotations([mark(1800, 'meal', 600)], 5400)).toEqual([
      { name: 'fasting', fromS: 0, toS: 1800 },
      { name: 'meal', fromS: 1800, toS: 2400 },
      { name: 'fed', fromS: 2520, toS: 5400 },
    ]);
  });

  it('a fed mark of its own decides where fed begins', () => {
    const phases = phasesFromAnnotations(
      [mark(60, 'Baseline'), mark(1800, 'meal start'), mark(2400, 'meal end'), mark(2460, 'fed')],
      5400,
    );
    expect(phases.at(-1)).toEqual({ name: 'fed', fromS: 2460, toS: 5400 });
    expect(phases[0]).toEqual({ name: 'fasting', fromS: 60, toS: 1800 });
  });

  it('a second meal gets its own names', () => {
    const names = phasesFromAnnotations(
      [mark(0, 'fasting'), mark(1800, 'meal', 600), mark(9000, 'meal', 600)],
      14400,
    ).map((phase) => phase.name);
    expect(names).toEqual(['fasting', 'meal', 'fed', 'meal-2', 'fed-2']);
  });

  it('events that name no phase propose none', () => {
    expect(phasesFromAnnotations([mark(10, 'turned over'), mark(20, 'drank 200 ml')], 600)).toEqual(
      [],
    );
    expect(phaseMark('mealtime chatter')).toBeNull();
  });

  it('phases never overlap', () => {
    const phases = phasesFromAnnotations([mark(0, 'fasting', 4000), mark(1800, 'meal', 600)], 5400);
    expect(phases[0]).toEqual({ name: 'fasting', fromS: 0, toS: 1800 });
  });
});
