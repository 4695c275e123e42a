import { engineVersion } from '../../shared/engine';
import { openApi } from '../openapi';
import { productVersion } from '../product';
import type { Route } from './route';

/** @param demo whether the demo accounts exist */
export function healthRoutes(demo: boolean, described: () => readonly Route[]): Route[] {
  return [
    {
      method: 'get',
      path: '/health',
      allowed: 'open',
      summary: 'Whether the server answers, and which versions it runs',
      handle(_req, res) {
        res.json({ status: 'ok', version: productVersion, engine: engineVersion, demo });
      },
    },
    {
      method: 'get',
      path: '/openapi.json',
      allowed: 'open',
      summary: 'This description, OpenAPI 3.1',
      handle(_req, res) {
        res.json(openApi(described()));
      },
    },
  ];
}
