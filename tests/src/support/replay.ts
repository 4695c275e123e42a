import type { ReplayPoint } from '../../../shared/model/replay-point';
import type { CompleteCheck, Replay } from '../../../src/api/replays';

export const check: CompleteCheck = {
  name: 'Carrier offset, both ends',
  carrierOffsetHz: { start: -77_500, stop: 77_500, points: 5 },
  esN0Db: [6.5, 10],
  symbols: 20_000,
  trials: 400,
  seed: 65,
  limits: { lockProbability: 0.99, confidence: 0.95 },
};

/** A result with the interval that 400 trials at 95 % give (Clopper–Pearson, from binomial sums). */
export const result = (
  index: number,
  verdict: ReplayPoint['verdict'],
  more: Partial<ReplayPoint> = {},
): ReplayPoint => ({
  index,
  offsetHz: -77_500 + (index % 5) * 38_750,
  esN0Db: index < 5 ? 6.5 : 10,
  trials: 400,
  locks: { pass: 400, undecided: 399, fail: 386 }[verdict],
  falseLocks: 0,
  lockProbability: {
    pass: { estimate: 1, lower: 0.9908, upper: 1 },
    undecided: { estimate: 0.9975, lower: 0.9862, upper: 0.9999 },
    fail: { estimate: 0.965, lower: 0.942, upper: 0.9807 },
  }[verdict],
  lockTimeSymbols: { p50: 2971, p95: 5120 },
  residualOffsetHz: 12.5,
  phaseJitterDeg: 1.01,
  phaseBiasDeg: 0.02,
  cycleSlips: 0,
  verdict,
  checksum: '00c0ffee',
  ...more,
});

export const replay = (more: Partial<Replay> = {}): Replay => ({
  id: 118,
  revision: {
    id: 14,
    number: 14,
    plan: { id: 3, name: 'Transponder 17, QPSK 27.5' },
    target: { slug: 'corvid-c2', name: 'Corvid C2' },
  },
  check,
  state: 'running',
  by: { id: 2, name: 'Malin Duarte' },
  createdAt: '2026-11-29T09:00:00.000Z',
  startedAt: '2026-11-29T09:00:01.000Z',
  finishedAt: null,
  pointsDone: 0,
  pointsTotal: 10,
  verdict: null,
  digest: null,
  engine: '1.0.0',
  error: null,
  points: [],
  ...more,
});
