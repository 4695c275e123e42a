import type { Plan } from '../../shared/model/plan';
import { inTransaction } from '../db';
import { invalidAt, notFound } from '../errors';
import { itemsOf, type Items, type Page } from '../page';
import type { Draft, StoredDraft } from '../repositories/drafts';
import { repositories, type Repositories } from '../repositories/index';
import type { PlanListing, PlanRecord } from '../repositories/plans';
import type { ReleaseOfPlan } from '../repositories/releases';
import type { Target } from '../repositories/targets';
import type { Context } from './context';
import { completed } from './designs';
import { summaryOf, type RevisionSummary } from './revision-summaries';
import type { SignedIn } from './sessions';

export type PlanSummary = PlanListing & { release: ReleaseOfPlan | null };

export interface PlanAnswer extends Omit<PlanRecord, 'headRevisionId' | 'initial'> {
  /** Of the head revision, before the first one as the plan was created. */
  description: Plan;
  head: RevisionSummary | null;
  /** What the person who asks has typed and not saved. */
  draft: StoredDraft | null;
  release: ReleaseOfPlan | null;
}

/** What is stored of a plan now: answered to whoever saves over it. */
export type PlanState = Pick<PlanAnswer, 'version' | 'head' | 'description'>;

export async function targetOf(plan: Plan, { targets }: Repositories): Promise<Target> {
  const target = await targets.find(plan.target);
  if (!target) throw invalidAt('/target', 'is not the slug of a target');
  return target;
}

/** Version, head and description of a plan as they are stored. */
export async function stateOf({ version, headRevisionId, initial }: PlanRecord, all: Repositories): Promise<PlanState> {
  const revision = headRevisionId === null ? undefined : await all.revisions.find(headRevisionId);
  if (!revision) return { version, head: null, description: initial };
  return { version, head: await summaryOf(revision, all), description: revision.description };
}

export function plansService({ db, clock }: Context) {
  async function get(id: number, person: SignedIn): Promise<PlanAnswer> {
    const all = repositories(db);
    const plan = await all.plans.find(id);
    if (!plan) throw notFound('plan');
    const { headRevisionId: _head, initial: _initial, ...record } = plan;
    const draft = (await all.drafts.find(id, person.id)) ?? null;
    const release = (await all.releases.newestOfPlans([id])).get(id) ?? null;
    return { ...record, ...(await stateOf(plan, all)), draft, release };
  }

  return {
    get,
    async list(person: SignedIn, page: Page): Promise<Items<PlanSummary>> {
      const { plans, releases } = repositories(db);
      const { items, next } = itemsOf(await plans.list(person.id, page), page);
      const newest = await releases.newestOfPlans(items.map(({ id }) => id));
      return { items: items.map((plan) => ({ ...plan, release: newest.get(plan.id) ?? null })), next };
    },
    /** A plan without a revision. */
    async create(input: Plan, by: SignedIn): Promise<PlanAnswer> {
      const plan = completed(input);
      const id = await inTransaction(db, async (trx) => {
        const all = repositories(trx);
        const target = await targetOf(plan, all);
        const id = await all.plans.insert(plan, target.id, by.id, clock());
        await all.audit.append({
          at: clock(),
          personId: by.id,
          action: 'plan.create',
          subject: plan.name,
          detail: { id },
        });
        return id;
      });
      return get(id, by);
    },
    async putDraft(id: number, draft: Draft, person: SignedIn): Promise<void> {
      const { drafts, plans } = repositories(db);
      if (!(await plans.find(id))) throw notFound('plan');
      await drafts.put(id, person.id, draft, clock());
    },
    async removeDraft(id: number, person: SignedIn): Promise<void> {
      const { drafts, plans } = repositories(db);
      if (!(await plans.find(id))) throw notFound('plan');
      await drafts.remove(id, person.id);
    },
  };
}

export type PlansService = ReturnType<typeof plansService>;
