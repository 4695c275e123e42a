import cookieParser from 'cookie-parser';
import express, { Router, type Express, type RequestHandler } from 'express';
import type { Logger } from 'pino';
import { notFound } from './errors';
import { authenticate } from './middleware/authenticate';
import { errorHandler } from './middleware/error-handler';
import { requestLog } from './middleware/request-log';
import { requireRole } from './middleware/require-role';
import { securityHeaders } from './middleware/security-headers';
import { validateBody } from './middleware/validate-body';
import { webApp } from './middleware/web-app';
import { apiRoutes, type RouteOptions } from './routes/index';
import type { Route } from './routes/route';
import type { Services } from './services/index';

export interface AppParts extends RouteOptions {
  services: Services;
  /** Signs access tokens. */
  secret: string;
  logger: Logger;
  /** Folder of the built web application. */
  webFolder: string;
}

const noStore: RequestHandler = (_req, res, next) => {
  res.set('Cache-Control', 'no-store');
  next();
};

/** The check of roles comes first: nobody's body is read who may not send one. */
function mount(router: Router, { method, path, allowed, body, faultsWithin, before = [], handle }: Route): void {
  const checks = body ? validateBody(body, faultsWithin) : [];
  router[method](path, requireRole(allowed), ...checks, ...before, handle);
}

function apiRouter(routes: readonly Route[]): Router {
  const router = Router({ caseSensitive: true, strict: true });
  for (const route of routes) mount(router, route);
  router.use(() => {
    throw notFound('path');
  });
  return router;
}

/** Builds the application; it does not listen. */
export function createApp({ services, secret, logger, webFolder, ...options }: AppParts): Express {
  const app = express();
  app.disable('x-powered-by').disable('etag');
  app.use(requestLog(logger), securityHeaders());
  const api = apiRouter(apiRoutes(services, options));
  app.use('/api/v1', noStore, cookieParser(), authenticate(services.sessions, secret), api);
  app.use('/api', () => {
    throw notFound('path');
  });
  app.use(webApp(webFolder));
  app.use(errorHandler);
  return app;
}
