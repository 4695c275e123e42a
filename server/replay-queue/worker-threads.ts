import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { Logger } from 'pino';
import type { ReplayPoint } from '../../shared/model/replay-point';
import type { ReplayTrace } from '../../shared/replay/trace';
import type { ReplayQueue, ReplayStore, TakenReplay } from './replay-queue';
import type { PointTask, TraceTask } from './worker';

const beside = (name: string): string => fileURLToPath(new URL(name, import.meta.url));

/** From sources the worker needs a loader first; the build has the worker as a file of its own. */
const workerOptions = (): { filename: string; execArgv: string[] } =>
  import.meta.url.endsWith('.ts')
    ? { filename: beside('./worker.ts'), execArgv: ['--import', new URL('./source-loader.mjs', import.meta.url).href] }
    : { filename: beside('./replay-queue/worker.js'), execArgv: [] };

interface Running {
  id: number;
  abort: AbortController;
}

const isAbort = (error: unknown): boolean => error instanceof Error && error.name === 'AbortError';

/**
 * Works replays off one after the other, the points of one side by side in worker threads.
 *
 * @param options `threads`: one processor stays free for the requests when there are several
 */
export function workerThreadQueue(
  store: ReplayStore,
  logger: Logger,
  { threads = Math.max(1, availableParallelism() - 1) } = {},
): ReplayQueue {
  const pool = new Piscina({ ...workerOptions(), minThreads: 0, maxThreads: threads, idleTimeout: 60_000 });
  pool.on('error', (error: unknown) => logger.error(error, 'a worker thread ended'));
  let stopped = false;
  let running: Running | undefined;
  let work: Promise<void> | undefined;
  let woken = false;

  async function runPoints({ id, job, remaining }: TakenReplay, abort: AbortController): Promise<void> {
    const left = [...remaining];
    const lane = async () => {
      for (let index = left.shift(); index !== undefined && !abort.signal.aborted; index = left.shift()) {
        const task: PointTask = { job, index };
        const point = (await pool.run(task, { name: 'point', signal: abort.signal })) as ReplayPoint;
        if (!(await store.append(id, point))) abort.abort();
      }
    };
    await Promise.all(Array.from({ length: threads }, lane));
  }

  async function runReplay(taken: TakenReplay): Promise<void> {
    const abort = new AbortController();
    running = { id: taken.id, abort };
    try {
      await runPoints(taken, abort);
      if (!abort.signal.aborted) await store.finish(taken.id);
    } catch (error) {
      abort.abort();
      if (!isAbort(error)) await store.fail(taken.id, error);
    } finally {
      running = undefined;
      if (stopped) await store.putBack(taken.id);
    }
  }

  async function runAll(): Promise<void> {
    while (!stopped && woken) {
      woken = false;
      for (let taken = await store.take(); taken; taken = stopped ? undefined : await store.take()) {
        await runReplay(taken);
      }
    }
  }

  function wake(): void {
    woken = true;
    work ??= runAll()
      .catch((error: unknown) => logger.error(error, 'the replay queue came to a halt'))
      .finally(() => {
        work = undefined;
      });
  }

  return {
    async start() {
      await store.recover();
      wake();
    },
    wake,
    cancel(id) {
      if (running?.id === id) running.abort.abort();
    },
    trace(job, index, trial) {
      const task: TraceTask = { job, index, trial };
      return pool.run(task, { name: 'trace' }) as Promise<ReplayTrace>;
    },
    async stop() {
      stopped = true;
      running?.abort.abort();
      await work;
      await pool.destroy();
    },
  };
}
