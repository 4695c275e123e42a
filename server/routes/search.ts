import { queryOf } from '../request';
import type { SearchService } from '../services/search';
import { everyone } from '../roles';
import { type Route } from './route';

export function searchRoutes(search: SearchService): Route[] {
  return [
    {
      method: 'get',
      path: '/search',
      allowed: everyone,
      summary: 'Plans, targets, releases and replays by name',
      query: ['q'],
      async handle(req, res) {
        res.json({ items: await search.find(queryOf(req, 'q') ?? '') });
      },
    },
  ];
}
