import { iso, parsed } from './columns';
import type { PersonName } from './people';

/** Findings of a design by severity. */
export interface FindingCounts {
  pass: number;
  caution: number;
  fail: number;
}

/** What a list says of the last stage of one loop. */
export interface LoopSummary {
  loop: 'carrier' | 'clock';
  /** Exact Bn·T, cycles per symbol; null where the loop is unstable. */
  noiseBandwidth: number | null;
  phaseMarginDeg: number | null;
  /** Phase step of the loop at 48 updates, spaced evenly on a log axis from 4 to 1200. */
  step: number[];
}

/** The newest revision of a plan, as a list of plans shows it. */
export interface RevisionHead {
  id: number;
  number: number;
  savedAt: string;
  by: PersonName;
  digest: string;
  engine: string;
  counts: FindingCounts;
  summary: LoopSummary | null;
}

export interface HeadRow {
  revision_id: number;
  number: number;
  saved_at: Date;
  saved_by: number;
  saved_by_name: string;
  digest: string;
  engine: string;
  pass_count: number;
  caution_count: number;
  fail_count: number;
  summary: unknown;
}

/** Columns of a HeadRow, for a query that joins `revisions` with `people` as those who saved them. */
export const headColumns = [
  'revisions.id as revision_id',
  'revisions.number',
  'revisions.saved_at',
  'revisions.saved_by',
  'people.name as saved_by_name',
  'revisions.digest',
  'revisions.engine',
  'revisions.pass_count',
  'revisions.caution_count',
  'revisions.fail_count',
  'revisions.summary',
];

export const toHead = (row: HeadRow): RevisionHead => ({
  id: row.revision_id,
  number: row.number,
  savedAt: iso(row.saved_at),
  by: { id: row.saved_by, name: row.saved_by_name },
  digest: row.digest,
  engine: row.engine,
  counts: { pass: row.pass_count, caution: row.caution_count, fail: row.fail_count },
  summary: parsed<LoopSummary | null>(row.summary),
});
