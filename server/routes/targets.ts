import type { TargetBody } from '../../shared/model/target';
import { nameOf, pageOf, personOf, versionOf } from '../request';
import type { TargetsService } from '../services/targets';
import { everyone } from '../roles';
import { paging, tagged, type Route } from './route';

const engineer = ['engineer'] as const;

export function targetsRoutes(targets: TargetsService): Route[] {
  return [
    {
      method: 'get',
      path: '/targets',
      allowed: everyone,
      summary: 'All targets',
      query: paging,
      async handle(req, res) {
        res.json(await targets.list(pageOf(req)));
      },
    },
    {
      method: 'post',
      path: '/targets',
      allowed: engineer,
      summary: 'Create a target',
      body: 'target',
      status: 201,
      async handle(req, res) {
        const target = await targets.create(req.body as TargetBody, personOf(req));
        tagged(res, target.version).status(201).json(target);
      },
    },
    {
      method: 'get',
      path: '/targets/:slug',
      allowed: everyone,
      summary: 'A target with its register map',
      async handle(req, res) {
        const target = await targets.get(nameOf(req, 'target', 'slug'));
        tagged(res, target.version).json(target);
      },
    },
    {
      method: 'put',
      path: '/targets/:slug',
      allowed: engineer,
      summary: 'Change a target; a changed register map gets the next map number',
      body: 'target',
      ifMatch: true,
      async handle(req, res) {
        const slug = nameOf(req, 'target', 'slug');
        const target = await targets.update(slug, versionOf(req), req.body as TargetBody, personOf(req));
        tagged(res, target.version).json(target);
      },
    },
  ];
}
