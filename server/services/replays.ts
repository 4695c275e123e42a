import { engineVersion } from '../../shared/engine';
import type { ReplayPoint } from '../../shared/model/replay-point';
import type { ToleranceCheck } from '../../shared/model/tolerance-check';
import { assertAffordable, assertReplayable, pointCount } from '../../shared/replay/job';
import type { ReplayTrace } from '../../shared/replay/trace';
import { inTransaction } from '../db';
import { conflict, forbidden, invalidAt, notFound } from '../errors';
import { itemsOf, type Items, type Page } from '../page';
import type { ReplayEvents } from '../replay-queue/replay-events';
import type { ReplaySummary } from '../repositories/replay-rows';
import { repositories } from '../repositories/index';
import type { Context } from './context';
import { jobOf } from './replay-job';
import type { SignedIn } from './sessions';

export interface Replay extends ReplaySummary {
  /** Finished points, in the order of the grid. */
  points: ReplayPoint[];
}

export interface Request {
  revisionId: number;
  check: ToleranceCheck;
}

export function replaysService({ db, clock, replayQueue }: Context, events: ReplayEvents) {
  const { replayPoints, replays } = repositories(db);

  async function find(id: number): Promise<ReplaySummary> {
    const replay = await replays.find(id);
    if (!replay) throw notFound('replay');
    return replay;
  }

  async function get(id: number): Promise<Replay> {
    const replay = await find(id);
    const points = (await replayPoints.list(id)).map(({ point }) => point);
    return { ...replay, points: points.sort((one, other) => one.index - other.index) };
  }

  return {
    get,
    async list(revisionId: number | undefined, page: Page): Promise<Items<ReplaySummary>> {
      return itemsOf(await replays.list(revisionId, page), page);
    },
    /** Queues a check of a revision; nothing is worked out before this answers. */
    async create({ revisionId, check }: Request, by: SignedIn): Promise<Replay> {
      const revision = await repositories(db).revisions.find(revisionId);
      if (!revision) throw invalidAt('/revisionId', 'is not a revision');
      const job = jobOf(revision, check);
      assertAffordable(check);
      assertReplayable(job);
      const at = clock();
      const queued = { revisionId, check, engine: engineVersion, pointsTotal: pointCount(job), personId: by.id, at };
      const id = await inTransaction(db, async (trx) => {
        const { audit, replays } = repositories(trx);
        const id = await replays.insert(queued);
        const detail = { replay: id, revision: revisionId };
        await audit.append({ at, personId: by.id, action: 'replay.request', subject: check.name, detail });
        return id;
      });
      replayQueue.wake();
      return get(id);
    },
    async cancel(id: number, by: SignedIn): Promise<Replay> {
      const replay = await find(id);
      if (!(await replays.finish(id, { state: 'cancelled', at: clock() })))
        throw conflict('The replay has ended already.');
      replayQueue.cancel(id);
      const { audit } = repositories(db);
      const detail = { replay: id };
      await audit.append({ at: clock(), personId: by.id, action: 'replay.cancel', subject: replay.check.name, detail });
      events.publish(id, { type: 'state', replay: await find(id) });
      return get(id);
    },
    /** Removes a replay of one's own that was not begun. */
    async remove(id: number, by: SignedIn): Promise<void> {
      const replay = await find(id);
      if (replay.by.id !== by.id) throw forbidden('Only the person who asked for a replay can remove it.');
      if (!(await replays.remove(id))) throw conflict('The replay has begun: it can only be cancelled.');
    },
    /** Works one trial out again, from its seed. */
    async trace(id: number, point: number, trial: number): Promise<ReplayTrace> {
      const { check, pointsTotal, revision } = await find(id);
      if (point >= pointsTotal) throw invalidAt('/point', `must be below ${pointsTotal}`);
      if (trial >= check.trials!) throw invalidAt('/trial', `must be below ${check.trials}`);
      const stored = await repositories(db).revisions.find(revision.id);
      return replayQueue.trace(jobOf(stored!, check), point, trial);
    },
  };
}

export type ReplaysService = ReturnType<typeof replaysService>;
