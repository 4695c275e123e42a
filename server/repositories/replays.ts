import type { Knex } from 'knex';
import { paged, type Page } from '../page';
import {
  toSummary,
  type NewReplay,
  type ReplayRow,
  type ReplaysOfRevision,
  type ReplaySummary,
  type Verdict,
} from './replay-rows';

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
    /** False when it had ended before. */
    async finish(id: number, { at, state, verdict, digest, error }: Finish): Promise<boolean> {
      const row = { state, verdict: verdict ?? null, digest: digest ?? null, error: error ?? null, finished_at: at };
      return (await replays().where({ id }).whereIn('state', ['queued', 'running']).update(row)) === 1;
    },
    async remove(id: number): Promise<boolean> {
      return (await replays().where({ id, state: 'queued' }).delete()) === 1;
    },
  };
}
