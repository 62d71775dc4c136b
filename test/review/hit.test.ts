import { describe, expect, it } from 'vitest';
import { endNear, nearestWithin, slotPart } from '../../src/review/hit';
import { edgeNear, movePhaseEdge, phaseEdges } from '../../src/review/phase-edges';

describe('what of a slot lies under the pointer', () => {
  it('is its edges within 6 px and its body between', () => {
    expect([93, 97, 105, 107, 150, 195, 205, 207].map((x) => slotPart(x, 100, 200))).toEqual([
      null,
      'left',
      'left',
      'body',
      'body',
      'right',
      'right',
      null,
    ]);
  });

  it('can still be moved and widened when it is only 7 px wide', () => {
    expect([91, 95, 99, 103, 108, 112, 117].map((x) => slotPart(x, 100, 107))).toEqual([
      null,
      'left',
      'body',
      'body',
      'body',
      'right',
      null,
    ]);
  });
});

describe('the nearest pin', () => {
  it('is taken within its reach only', () => {
    expect(nearestWithin(52, [10, 50, 60], 12)).toBe(1);
    expect(nearestWithin(56, [10, 50, 60], 12)).toBe(2);
    expect(nearestWithin(30, [10, 50, 60], 12)).toBeNull();
    expect(nearestWithin(62, [50], 12)).toBe(0);
    expect(nearestWithin(5, [], 12)).toBeNull();
  });

  it('of two ends of a stretch is the nearer', () => {
    expect(endNear(104, 100, 106)).toBe('right');
    expect(endNear(102, 100, 106)).toBe('left');
    expect(endNear(120, 100, 106)).toBeNull();
  });
});

describe('the borders of phases', () => {
  const phases = [
    { name: 'fasting', fromS: 0, toS: 1800 },
    { name: 'meal', fromS: 1800, toS: 2400 },
    { name: 'fed', fromS: 2520, toS: 5400 },
  ];
  const shared = phaseEdges(phases)[1];

  it('are one where phases touch and two where they do not', () => {
    expect(phaseEdges(phases).map((edge) => edge.atS)).toEqual([0, 1800, 2400, 2520, 5400]);
    expect(shared).toEqual({ atS: 1800, ends: 0, begins: 1 });
  });

  const moved = (edge: typeof shared, atS: number, durationS: number) =>
    movePhaseEdge(phases, edge, { atS, snap: null }, durationS).phases;

  it('move both phases that touch', () => {
    const [fasting, meal, fed] = moved(shared, 1912, 5400);
    expect([fasting.toS, meal.fromS]).toEqual([1912, 1912]);
    expect(fed).toBe(phases[2]);
  });

  it('are grasped within 6 px', () => {
    const xOf = (atS: number) => atS / 10;
    expect(edgeNear(phases, 185, xOf)).toEqual(shared);
    expect(edgeNear(phases, 187, xOf)).toBeNull();
    expect(edgeNear(phases, 247, xOf)?.atS).toBe(2520);
  });

  it('never swallow a phase, cross another or leave the study', () => {
    expect(moved(shared, 9000, 5400)[1]).toMatchObject({ fromS: 2390, toS: 2400 });
    expect(moved(shared, -5, 5400)[0]).toMatchObject({ fromS: 0, toS: 10 });
    const fedStart = phaseEdges(phases)[3];
    expect(moved(fedStart, 100, 5400)[2].fromS).toBe(2400);
    const end = phaseEdges(phases)[4];
    expect(moved(end, 9999, 5500)[2].toS).toBe(5500);
  });

  it('say what they were snapped to only where they got there', () => {
    const at = (atS: number) =>
      movePhaseEdge(phases, shared, { atS, snap: 'meal begins' }, 5400).moved;
    expect(at(1912.25)).toEqual({ atS: 1912.25, snap: 'meal begins' });
    expect(at(2395)).toEqual({ atS: 2390, snap: null });
  });
});
