import type { Knex } from 'knex';
import type { Logger } from 'pino';
import type { ReplayQueue } from '../replay-queue/replay-queue';

/** What services stand on; tests bring their own clock. */
export interface Context {
  db: Knex;
  clock: () => Date;
  logger: Logger;
  /** Signs access tokens. */
  secret: string;
  /** Where browsers reach the application; one-time links begin with it. */
  publicUrl: string;
  replayQueue: ReplayQueue;
}
