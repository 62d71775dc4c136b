import type { OverStretches, PlantedEvidence } from '../../src/recording/evidence/planted';

const over = (median: number, least: number, most: number): OverStretches => ({
  median,
  least,
  most,
});

/** A planted check of an invented study. */
export const INVENTED_PLANTED: PlantedEvidence = {
  slow: {
    kind: 'planted',
    lead: '#1',
    ownUv: 112.4,
    ownFrom: 'rhythm',
    stretches: 8,
    stretchS: 270,
    epochs: 31,
    restDb: 0.26,
    binCpm: 5,
    leftoverDb: Float32Array.of(20, 18, 16),
    waves: ([1.5, 3, 5.5] as const).flatMap((cpm) =>
      [112.4, 28.1].map((uv) => ({
        rate: { kind: 'steady' as const, cpm },
        uv,
        epochs: 31,
        right: uv > 100 ? 31 : 28,
        rightPct: over(100, uv > 100 ? 100 : 60, 100),
        dfErrorCpm: over(0.004, 0.001, 0.012),
        dpErrorDb: over(0.1, -0.5, 0.6),
        snrDb: uv > 100 ? over(25.6, 23.5, 27) : over(14.9, 10.7, 16.2),
        scale: over(0.98, 0.9, 1.02),
        delayS: over(0.01, -0.1, 0.12),
        picture: {
          fromS: 600,
          stepS: 0.5,
          plantedUv: Float32Array.of(0, 1, 0),
          drawnUv: Float32Array.of(0, 0.9, Number.NaN),
          spectrumDb: Float32Array.of(20, 30, 16),
        },
      })),
    ),
    smallest: [
      { cpm: 1.5, uv: 24, upToUv: 1000, mostPct: 100 },
      { cpm: 3, uv: 8.4, upToUv: 1000, mostPct: 100 },
      { cpm: 5.5, uv: null, upToUv: 1000, mostPct: 88 },
    ],
  },
  heart: {
    kind: 'planted',
    lead: '#2',
    stretches: 8,
    stretchS: 180,
    ownUv: 210,
    averaged: 600,
    rmssdMs: 31.4,
    meanRrMs: 906,
    beats: [1, 0.25].map((share) => ({
      share,
      planted: 1010,
      sensitivityPct: over(share === 1 ? 100 : 98.2, 95, 100),
      predictivityPct: over(99.5, 97, 100),
      timingMs: over(share === 1 ? 0.2 : 1.1, 0.1, 2),
      rmssdErrorMs: over(0.1, -0.4, 0.6),
    })),
    picture: {
      fromS: 700,
      stepS: 0.004,
      heartbeatUv: Float32Array.of(0, 10, 0),
      plantedS: [700.1],
      foundS: [700.1],
      leftOutS: [700.5],
    },
  },
};
