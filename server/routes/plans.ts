import type { DraftBody } from '../../shared/model/draft';
import type { PlanCreate } from '../../shared/model/plan-create';
import type { PlanYaml } from '../../shared/model/plan-yaml';
import { yamlBody, yamlTypes } from '../middleware/validate-body';
import { idOf, pageOf, personOf } from '../request';
import type { PlansService } from '../services/plans';
import { planFromYaml } from '../services/yaml-plan';
import { everyone } from '../roles';
import { paging, tagged, type Route } from './route';

const engineer = ['engineer'] as const;

export function plansRoutes(plans: PlansService): Route[] {
  return [
    {
      method: 'get',
      path: '/plans',
      allowed: everyone,
      summary: 'All plans with their newest revision',
      query: paging,
      async handle(req, res) {
        res.json(await plans.list(personOf(req), pageOf(req)));
      },
    },
    {
      method: 'post',
      path: '/plans',
      allowed: engineer,
      summary: 'Create a plan, without a revision yet',
      body: 'plan-create',
      faultsWithin: 'plan',
      status: 201,
      async handle(req, res) {
        const plan = await plans.create((req.body as PlanCreate).plan, personOf(req));
        tagged(res, plan.version).status(201).json(plan);
      },
    },
    {
      method: 'post',
      path: '/plans/from-yaml',
      allowed: engineer,
      summary: 'Check a plan description in YAML and fill in its defaults; nothing is stored',
      textBody: yamlTypes.slice(0, 1),
      before: yamlBody(),
      handle(req, res) {
        res.json(planFromYaml((req.body as PlanYaml).yaml));
      },
    },
    {
      method: 'get',
      path: '/plans/:id',
      allowed: everyone,
      summary: 'A plan as it stands, with the draft of the person who asks',
      async handle(req, res) {
        const plan = await plans.get(idOf(req, 'plan'), personOf(req));
        tagged(res, plan.version).json(plan);
      },
    },
    {
      method: 'put',
      path: '/plans/:id/draft',
      allowed: engineer,
      summary: 'Keep what was typed and not saved',
      body: 'draft',
      status: 204,
      async handle(req, res) {
        await plans.putDraft(idOf(req, 'plan'), req.body as DraftBody, personOf(req));
        res.status(204).end();
      },
    },
    {
      method: 'delete',
      path: '/plans/:id/draft',
      allowed: engineer,
      summary: 'Throw away what was typed and not saved',
      status: 204,
      async handle(req, res) {
        await plans.removeDraft(idOf(req, 'plan'), personOf(req));
        res.status(204).end();
      },
    },
  ];
}
