import type { PlanSummary } from '../../../src/api/plans';

export const plan = (more: Partial<PlanSummary> = {}): PlanSummary => ({
  id: 3,
  name: 'Transponder 17, QPSK 27.5',
  target: { slug: 'corvid-c2', name: 'Corvid C2' },
  modulation: 'QPSK',
  symbolRateBd: 27.5e6,
  version: 15,
  head: {
    id: 14,
    number: 14,
    savedAt: '2026-11-27T10:00:00.000Z',
    by: { id: 1, name: 'Ines Maro' },
    digest: '9f3a51c7e2d8'.padEnd(64, '0'),
    engine: '1.0.0',
    counts: { pass: 24, caution: 2, fail: 0 },
    summary: { loop: 'carrier', noiseBandwidth: 0.00101, phaseMarginDeg: 64.9, step: [0, 0.5, 1.2, 1] },
  },
  hasDraft: false,
  release: { version: '2.4.0', state: 'in-review', revisionNumber: 14 },
  changedAt: '2026-11-27T10:00:00.000Z',
  ...more,
});
