import type { ToleranceCheck } from '../../shared/model/tolerance-check';
import { iso, isoOrNull, parsed } from './columns';
import type { PersonName } from './people';
import type { TargetName } from './plans';

export type ReplayState = 'queued' | 'running' | 'done' | 'failed' | 'cancelled';
export type Verdict = 'pass' | 'fail' | 'undecided';

export interface ReplaySummary {
  id: number;
  revision: { id: number; number: number; plan: { id: number; name: string }; target: TargetName };
  check: ToleranceCheck;
  state: ReplayState;
  by: PersonName;
  createdAt: string;
  startedAt: string | null;
  finishedAt: string | null;
  pointsDone: number;
  pointsTotal: number;
  verdict: Verdict | null;
  digest: string | null;
  engine: string;
  error: string | null;
}

export interface NewReplay {
  revisionId: number;
  check: ToleranceCheck;
  engine: string;
  pointsTotal: number;
  personId: number;
  at: Date;
}

/** How the replays of a revision stand. */
export interface ReplaysOfRevision {
  total: number;
  lastVerdict: Verdict | null;
  lastId: number | null;
}

export interface ReplayRow {
  id: number;
  revision_id: number;
  revision_number: number;
  plan_id: number;
  plan_name: string;
  target_slug: string;
  target_name: string;
  tolerance_check: unknown;
  state: ReplayState;
  requested_by: number;
  requested_by_name: string;
  created_at: Date;
  started_at: Date | null;
  finished_at: Date | null;
  points_done: number;
  points_total: number;
  verdict: Verdict | null;
  digest: string | null;
  engine: string;
  error: string | null;
}

/** The replay of a row that joins its revision, plan, target and person. */
export const toSummary = (row: ReplayRow): ReplaySummary => ({
  id: row.id,
  revision: {
    id: row.revision_id,
    number: row.revision_number,
    plan: { id: row.plan_id, name: row.plan_name },
    target: { slug: row.target_slug, name: row.target_name },
  },
  check: parsed<ToleranceCheck>(row.tolerance_check),
  state: row.state,
  by: { id: row.requested_by, name: row.requested_by_name },
  createdAt: iso(row.created_at),
  startedAt: isoOrNull(row.started_at),
  finishedAt: isoOrNull(row.finished_at),
  pointsDone: row.points_done,
  pointsTotal: row.points_total,
  verdict: row.verdict,
  digest: row.digest,
  engine: row.engine,
  error: row.error,
});
