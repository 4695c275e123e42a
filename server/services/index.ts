import { ReplayEvents } from '../replay-queue/replay-events';
import type { ReplayQueue, ReplayStore } from '../replay-queue/replay-queue';
import type { Context } from './context';
import { designsService } from './designs';
import { passwordsService } from './passwords';
import { peopleService } from './people';
import { plansService } from './plans';
import { releasesService } from './releases';
import { replayStore } from './replay-store';
import { replayStreamsService } from './replay-stream';
import { replaysService } from './replays';
import { revisionsService } from './revisions';
import { searchService } from './search';
import { sessionsService } from './sessions';
import { targetsService } from './targets';

/**
 * All services, and the queue that must be started and stopped with them.
 *
 * @param queueOver makes the backing of the queue
 */
export function createServices(base: Omit<Context, 'replayQueue'>, queueOver: (store: ReplayStore) => ReplayQueue) {
  const events = new ReplayEvents();
  const replayQueue = queueOver(replayStore(base, events));
  const context: Context = { ...base, replayQueue };
  const passwords = passwordsService(context);
  return {
    designs: designsService(context),
    passwords,
    people: peopleService(context, passwords),
    plans: plansService(context),
    releases: releasesService(context),
    replayEvents: events,
    replayQueue,
    replays: replaysService(context, events),
    replayStreams: replayStreamsService(base.db, events),
    revisions: revisionsService(context),
    search: searchService(context),
    sessions: sessionsService(context),
    targets: targetsService(context),
  };
}

export type Services = ReturnType<typeof createServices>;
