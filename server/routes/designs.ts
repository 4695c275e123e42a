import type { DesignRequest } from '../../shared/model/design-request';
import type { DesignsService } from '../services/designs';
import { everyone } from '../roles';
import { type Route } from './route';

export function designsRoutes(designs: DesignsService): Route[] {
  return [
    {
      method: 'post',
      path: '/designs',
      allowed: everyone,
      summary: 'Work a plan out; nothing is stored',
      body: 'design-request',
      faultsWithin: 'plan',
      async handle(req, res) {
        res.json({ design: await designs.workOut((req.body as DesignRequest).plan) });
      },
    },
  ];
}
