import { existsSync } from 'node:fs';
import { join } from 'node:path';
import express, { Router } from 'express';
import { notFound } from '../errors';

const oneYear = 'public, max-age=31536000, immutable';

/**
 * Serves the built web application. Its own paths are known to its router only, so whatever is not a file is answered
 * with the page itself, which browsers ask for again each time; files under assets/ carry a hash in their names.
 *
 * @param folder where the build is, `dist/spa`
 */
export function webApp(folder: string): Router {
  const router = Router();
  const page = join(folder, 'index.html');
  const cacheOf = (path: string) => (path.includes('/assets/') ? oneYear : 'no-cache');
  router.use(
    express.static(folder, { index: false, setHeaders: (res, path) => res.set('Cache-Control', cacheOf(path)) }),
  );
  router.get('/{*path}', (req, res, next) => {
    if (req.path.startsWith('/assets/') || !existsSync(page)) return next(notFound('page'));
    res.set('Cache-Control', 'no-cache').sendFile(page);
  });
  return router;
}
