import type { Services } from '../services/index';
import { designsRoutes } from './designs';
import { healthRoutes } from './health';
import { peopleRoutes } from './people';
import { plansRoutes } from './plans';
import { releasesRoutes } from './releases';
import { replaysRoutes } from './replays';
import { revisionsRoutes } from './revisions';
import type { Route } from './route';
import { searchRoutes } from './search';
import { sessionsRoutes } from './sessions';
import { targetsRoutes } from './targets';

export interface RouteOptions {
  /** Browsers reach the server by https only. */
  secure: boolean;
  /** The demo accounts exist. */
  demo: boolean;
}

/** Every route of the API: what is mounted, described and tested. */
export function apiRoutes(services: Services, { secure, demo }: RouteOptions): Route[] {
  const routes: Route[] = [
    ...healthRoutes(demo, () => routes),
    ...sessionsRoutes(services.sessions, services.passwords, secure),
    ...peopleRoutes(services.people),
    ...targetsRoutes(services.targets),
    ...plansRoutes(services.plans),
    ...designsRoutes(services.designs),
    ...revisionsRoutes(services.revisions),
    ...releasesRoutes(services.releases),
    ...replaysRoutes(services.replays, services.replayStreams),
    ...searchRoutes(services.search),
  ];
  return routes;
}
