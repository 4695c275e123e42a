import type { Knex } from 'knex';
import type { ReplayPoint } from '../../shared/model/replay-point';
import type { ToleranceCheck } from '../../shared/model/tolerance-check';
import { paged, type Page } from '../page';
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

export interface StoredPoint {
  /** Place in the order in which the points were finished, from 1. */
  sequence: number;
  point: ReplayPoint;
}

interface ReplayRow {
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

const toSummary = (row: ReplayRow): ReplaySummary => ({
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

interface Finish {
  state: 'done' | 'failed' | 'cancelled';
  verdict?: Verdict;
  digest?: string;
  error?: string;
  at: Date;
}

export function replaysRepository(db: Knex) {
  const replays = () => db('replays');
  const summaries = () =>
    replays()
      .join('revisions', 'revisions.id', 'replays.revision_id')
      .join('plans', 'plans.id', 'revisions.plan_id')
      .join('targets', 'targets.id', 'revisions.target_id')
      .join('people', 'people.id', 'replays.requested_by')
      .select<ReplayRow[]>(
        'replays.*',
        'revisions.number as revision_number',
        'plans.id as plan_id',
        'plans.name as plan_name',
        'targets.slug as target_slug',
        'targets.name as target_name',
        'people.name as requested_by_name',
      );
  return {
    async find(id: number): Promise<ReplaySummary | undefined> {
      const [row] = await summaries().where('replays.id', id);
      return row && toSummary(row);
    },
    async list(revisionId: number | undefined, page: Page): Promise<ReplaySummary[]> {
      const query = revisionId === undefined ? summaries() : summaries().where({ revision_id: revisionId });
      return (await paged(query, 'replays.id', page, 'desc')).map(toSummary);
    },
    /** How many replays each revision has, and how the newest of them stands. */
    async ofRevisions(revisionIds: readonly number[]): Promise<Map<number, ReplaysOfRevision>> {
      const newest = replays().whereIn('revision_id', revisionIds).groupBy('revision_id');
      const counted = newest.select('revision_id').max('id as last_id').count('* as total').as('counted');
      const rows = await db
        .from(counted)
        .join('replays', 'replays.id', 'counted.last_id')
        .select<{ revision_id: number; last_id: number; total: number; verdict: Verdict | null }[]>(
          'counted.*',
          'replays.verdict',
        );
      return new Map(
        rows.map((row) => [row.revision_id, { total: row.total, lastVerdict: row.verdict, lastId: row.last_id }]),
      );
    },
    async insert(replay: NewReplay): Promise<number> {
      const [id] = await replays().insert({
        revision_id: replay.revisionId,
        tolerance_check: JSON.stringify(replay.check),
        engine: replay.engine,
        points_total: replay.pointsTotal,
        requested_by: replay.personId,
        created_at: replay.at,
      });
      return id!;
    },
    async oldestQueued(): Promise<number | undefined> {
      const row = await replays().where({ state: 'queued' }).orderBy('id').first<{ id: number } | undefined>('id');
      return row?.id;
    },
    /** False when it is not queued any more. */
    async start(id: number, at: Date): Promise<boolean> {
      const row = { state: 'running', started_at: db.raw('COALESCE(started_at, ?)', [at]) };
      return (await replays().where({ id, state: 'queued' }).update(row)) === 1;
    },
    /** Puts back what was running; its finished points stay. */
    async requeue(id?: number): Promise<void> {
      const running = replays().where({ state: 'running' });
      await (id === undefined ? running : running.where({ id })).update({ state: 'queued' });
    },
    /** Throws its points away, for another engine to begin again. */
    async restart(id: number, engine: string): Promise<void> {
      await db('replay_points').where({ replay_id: id }).delete();
      await replays().where({ id }).update({ engine, points_done: 0 });
    },
    /** False when it had ended before. */
    async finish(id: number, { at, state, verdict, digest, error }: Finish): Promise<boolean> {
      const row = { state, verdict: verdict ?? null, digest: digest ?? null, error: error ?? null, finished_at: at };
      return (await replays().where({ id }).whereIn('state', ['queued', 'running']).update(row)) === 1;
    },
    async points(id: number, after = 0): Promise<StoredPoint[]> {
      const rows = db('replay_points').where({ replay_id: id }).where('sequence', '>', after).orderBy('sequence');
      const read = await rows.select<{ sequence: number; result: unknown }[]>('sequence', 'result');
      return read.map(({ sequence, result }) => ({ sequence, point: parsed<ReplayPoint>(result) }));
    },
    /** Stores a finished point and gives it the next place; undefined when the replay does not run any more. */
    async appendPoint(id: number, point: ReplayPoint): Promise<number | undefined> {
      const running = replays().where({ id, state: 'running' });
      const row = await running.forUpdate().first<{ points_done: number } | undefined>('points_done');
      if (!row) return undefined;
      const sequence = row.points_done + 1;
      const result = JSON.stringify(point);
      await db('replay_points').insert({ replay_id: id, point_index: point.index, sequence, result });
      await replays().where({ id }).update({ points_done: sequence });
      return sequence;
    },
    async remove(id: number): Promise<boolean> {
      return (await replays().where({ id, state: 'queued' }).delete()) === 1;
    },
  };
}
