import type { Release } from '../../../src/api/releases';

const by = { id: 3, name: 'Rui Adeyemi' };

/** A draft with one entry that can be frozen. */
export const release = (more: Partial<Release> = {}): Release => ({
  id: 2,
  target: { slug: 'corvid-c2', name: 'Corvid C2' },
  version: '2.4.0',
  state: 'draft',
  entryCount: 1,
  createdAt: '2026-11-17T10:00:00.000Z',
  createdBy: by,
  frozenAt: null,
  frozenBy: null,
  digest: null,
  rowVersion: 4,
  entries: [
    {
      slot: 'dl_qpsk',
      plan: { id: 3, name: 'Transponder 17, QPSK 27.5' },
      revision: {
        id: 14,
        number: 14,
        savedAt: '2026-11-27T10:00:00.000Z',
        by,
        note: '',
        digest: '9f3a51c7e2d8'.padEnd(64, '0'),
        engine: '1.0.0',
        counts: { pass: 24, caution: 2, fail: 0 },
        replays: { total: 1, lastVerdict: 'undecided', lastId: 118 },
      },
      newer: null,
    },
  ],
  gates: [{ state: 'open', text: 'The config set has 1 entry.' }],
  files: [],
  ...more,
});
