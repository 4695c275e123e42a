import type { Knex } from 'knex';
import type { ReplayPoint } from '../../shared/model/replay-point';
import { parsed } from './columns';

export interface StoredPoint {
  /** Place in the order in which the points were finished, from 1. */
  sequence: number;
  point: ReplayPoint;
}

/** Finished points of replays, and the count of them that each replay carries. */
export function replayPointsRepository(db: Knex) {
  return {
    async list(id: number, after = 0): Promise<StoredPoint[]> {
      const rows = db('replay_points').where({ replay_id: id }).where('sequence', '>', after).orderBy('sequence');
      const read = await rows.select<{ sequence: number; result: unknown }[]>('sequence', 'result');
      return read.map(({ sequence, result }) => ({ sequence, point: parsed<ReplayPoint>(result) }));
    },
    /** Stores a finished point and gives it the next place; undefined when the replay does not run any more. */
    async append(id: number, point: ReplayPoint): Promise<number | undefined> {
      const running = db('replays').where({ id, state: 'running' });
      const row = await running.forUpdate().first<{ points_done: number } | undefined>('points_done');
      if (!row) return undefined;
      const sequence = row.points_done + 1;
      const result = JSON.stringify(point);
      await db('replay_points').insert({ replay_id: id, point_index: point.index, sequence, result });
      await db('replays').where({ id }).update({ points_done: sequence });
      return sequence;
    },
    /** Throws its points away, for another engine to begin again. */
    async restart(id: number, engine: string): Promise<void> {
      await db('replay_points').where({ replay_id: id }).delete();
      await db('replays').where({ id }).update({ engine, points_done: 0 });
    },
  };
}
