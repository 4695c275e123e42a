import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** A path without its query and without the token of a one-time link. */
const pathOf = (url = ''): string => url.split('?', 1)[0]!.replace(/^\/password\/.*/, '/password/…');

/** One line for each request: no headers and no bodies, so neither tokens nor passwords, and no query. */
export const requestLog = (logger: Logger) =>
  pinoHttp({
    logger,
    genReqId: (_req: IncomingMessage, res: ServerResponse) => {
      const id = randomUUID();
      res.setHeader('X-Request-Id', id);
      return id;
    },
    serializers: {
      req: ({ id, method, url }: { id: string; method: string; url?: string }) => ({
        id,
        method,
        url: pathOf(url),
      }),
      res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
    },
    customLogLevel: (_req, res, error) => (error || res.statusCode >= 500 ? 'error' : 'info'),
  });
