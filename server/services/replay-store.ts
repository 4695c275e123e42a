import { engineVersion } from '../../shared/engine';
import { digestContent } from '../../shared/replay/digest';
import { pointCount } from '../../shared/replay/job';
import { overallVerdict } from '../../shared/replay/verdict';
import { inTransaction } from '../db';
import type { ReplayEvents } from '../replay-queue/replay-events';
import type { ReplayStore, TakenReplay } from '../replay-queue/replay-queue';
import type { ReplaySummary } from '../repositories/replay-rows';
import { repositories } from '../repositories/index';
import type { Context } from './context';
import { digestOf } from './digest';
import { jobOf } from './replay-job';

/** Keeps replays in the database: a point that was stored is never worked out again. */
export function replayStore(
  { db, clock, logger }: Pick<Context, 'db' | 'clock' | 'logger'>,
  events: ReplayEvents,
): ReplayStore {
  const { replayPoints, replays, revisions } = repositories(db);

  async function tell(id: number): Promise<void> {
    const replay = await replays.find(id);
    if (replay) events.publish(id, { type: 'state', replay });
  }

  async function jobOfReplay({ check, revision }: ReplaySummary) {
    return jobOf((await revisions.find(revision.id))!, check);
  }

  async function fail(id: number, error: unknown): Promise<void> {
    logger.error({ err: error, replay: id }, 'a replay failed');
    const reason = error instanceof Error ? error.message.slice(0, 500) : 'unknown';
    await replays.finish(id, { state: 'failed', error: reason, at: clock() });
    await tell(id);
  }

  async function taken(replay: ReplaySummary): Promise<TakenReplay> {
    const job = await jobOfReplay(replay);
    // Points of two engines make no evidence: what an older one left is thrown away.
    if (replay.engine !== engineVersion) await replayPoints.restart(replay.id, engineVersion);
    const done = new Set((await replayPoints.list(replay.id)).map(({ point }) => point.index));
    const all = Array.from({ length: pointCount(job) }, (_, index) => index);
    return { id: replay.id, job, remaining: all.filter((index) => !done.has(index)) };
  }

  return {
    recover: () => replays.requeue(),
    async take() {
      for (;;) {
        const id = await replays.oldestQueued();
        if (id === undefined) return undefined;
        if (!(await replays.start(id, clock()))) continue;
        await tell(id);
        try {
          return await taken((await replays.find(id))!);
        } catch (error) {
          await fail(id, error);
        }
      }
    },
    async append(id, point) {
      const sequence = await inTransaction(db, (trx) => repositories(trx).replayPoints.append(id, point));
      if (sequence === undefined) return false;
      events.publish(id, { type: 'point', sequence, point });
      return true;
    },
    async finish(id) {
      const replay = (await replays.find(id))!;
      const job = await jobOfReplay(replay);
      const points = (await replayPoints.list(id)).map(({ point }) => point).sort((a, b) => a.index - b.index);
      const verdict = overallVerdict(points, pointCount(job));
      const digest = digestOf(digestContent(job, engineVersion, points));
      await replays.finish(id, { state: 'done', verdict, digest, at: clock() });
      await tell(id);
    },
    fail,
    async putBack(id) {
      await replays.requeue(id);
      await tell(id);
    },
  };
}
